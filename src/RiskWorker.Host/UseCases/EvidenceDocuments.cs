using System.Text.Json;
using RiskWorker.Domain.Evidence;

namespace RiskWorker.Host.UseCases;

/// <summary>temporary</summary>
public static class EvidenceDocuments
{
    /// <summary>temporary</summary>
    public static WrittenDocuments Write(BacktestEvidence evidence, string outFolder, object? signing)
    {
        return new(outFolder, [], [], JsonSerializer.Serialize(evidence.Series.Select(s => new { s.Book, c = s.Confidence.Level, k = s.Profit.ToString(), n = s.Days.Count, s.Count, z = s.Zone?.ToString(), t = s.Tests.Select(t => $"{t.Name} {t.Statistic:g5} {t.PValue:g4} {t.Method} {t.Note}") })));
    }
}
