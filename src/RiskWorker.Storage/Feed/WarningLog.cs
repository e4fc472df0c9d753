using System.Globalization;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Feed;

/// <summary>Codes of the findings that reading a feed may raise; all are warnings.</summary>
public static class FeedWarningCodes
{
    /// <summary>A column that the format does not know; it is ignored.</summary>
    public const string UnknownColumn = "unknown-column";

    /// <summary>A CSV file that no format has; it is ignored.</summary>
    public const string UnknownFile = "unknown-file";

    /// <summary>A term that the instrument's kind does not use; it is ignored.</summary>
    public const string UnusedTerm = "unused-term";

    /// <summary>An option without a curve or a carry, which counts as 0.</summary>
    public const string AssumedZeroRate = "assumed-zero-rate";
}

/// <summary>Warnings of one file: per code a count and the ten subjects that come first in ordinal order, so that the order of rows does not matter.</summary>
internal sealed class WarningLog(string file)
{
    private const int Named = 10;

    private readonly SortedDictionary<string, (long Count, SortedSet<string> First)> _byCode = new(StringComparer.Ordinal);

    public void Add(string code, string subject)
    {
        if (!_byCode.TryGetValue(code, out var known)) known = (0, new(StringComparer.Ordinal));
        var (count, first) = known;
        if (first.Count < Named || string.CompareOrdinal(subject, first.Max) < 0) first.Add(subject);
        if (first.Count > Named) first.Remove(first.Max!);
        _byCode[code] = (count + 1, first);
    }

    public IEnumerable<Finding> Findings() =>
        _byCode.Select(w => new Finding(FindingSeverity.Warning, w.Key, file, Sentence(w.Key, w.Value.Count, w.Value.First)));

    private static string Sentence(string code, long count, SortedSet<string> first)
    {
        var names = string.Join(", ", first) + (count > first.Count ? ", …" : "");
        var number = count.ToString(CultureInfo.InvariantCulture);
        return code switch
        {
            FeedWarningCodes.UnknownColumn => $"{number} {(count == 1 ? "column is" : "columns are")} not part of this file's format and ignored: {names}.",
            FeedWarningCodes.UnknownFile => $"{number} {(count == 1 ? "file is" : "files are")} not part of the feed and ignored: {names}.",
            FeedWarningCodes.UnusedTerm => $"{number} {(count == 1 ? "term is" : "terms are")} not used by the instrument's kind and ignored: {names}.",
            _ => $"{number} {(count == 1 ? "option has" : "options have")} no curve or no carry, which counts as 0: {names}.",
        };
    }
}
