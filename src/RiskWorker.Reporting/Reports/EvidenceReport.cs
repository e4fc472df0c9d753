using RiskWorker.Domain.Evidence;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Reports.Evidence;

namespace RiskWorker.Reporting.Reports;

/// <summary>The evidence that a model works, or that it does not: page 1 answers, a page a book shows, the register explains.</summary>
public static class EvidenceReport
{
    private const string Foot = "Model estimates, not guarantees. No investment advice.";

    /// <summary>Builds the report from the evidence alone: no clock, no store.</summary>
    /// <param name="evidence">The evidence.</param>
    /// <returns>The document; a section that has nothing to say is left out.</returns>
    public static ReportDocument Build(BacktestEvidence evidence)
    {
        ArgumentNullException.ThrowIfNull(evidence);
        var reading = new EvidenceReading(evidence);
        var title = $"Backtest evidence, {EvidenceWords.Kind(evidence)}";
        var running = $"{evidence.Firm.Name} · {Numerals.Date(evidence.From)} to {Numerals.Date(evidence.To)}";
        return new ReportDocument(title, running, Foot,
        [
            new([.. EvidenceHeadline.Blocks(reading), EvidenceIdentity.Of(evidence), .. CountsTable.Blocks(reading)]),
            .. reading.Paged.Select(BookPage.Of),
            new(ExceptionRegister.Blocks(reading), StartsPage: true),
            new(ModelCountsSection.Blocks(reading)),
            new(EvidenceMethod.Blocks(reading), StartsPage: true),
            new(EvidenceCautions.Blocks(reading)),
            new(RunsSection.Blocks(reading)),
        ]);
    }
}
