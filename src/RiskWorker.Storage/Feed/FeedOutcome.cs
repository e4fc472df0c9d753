using System.Globalization;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Feed;

/// <summary>What became of one file.</summary>
/// <param name="File">Its name.</param>
/// <param name="Read">Rows read.</param>
/// <param name="Added">Rows that were not stored before.</param>
/// <param name="Changed">Rows that replaced a stored one.</param>
/// <param name="Removed">Stored rows that the file no longer has, where it replaces its table whole.</param>
/// <param name="Unchanged">Rows that were stored already.</param>
/// <param name="Faults">All its faults, those beyond the first 50 too.</param>
public sealed record FeedFileOutcome(string File, long Read, long Added, long Changed, long Removed, long Unchanged, long Faults);

/// <summary>What came of a feed folder: faults and nothing stored, or everything stored.</summary>
public sealed record FeedOutcome
{
    /// <summary>What is wrong, by file and line, at most 50 a file; empty when the feed is sound.</summary>
    public required IReadOnlyList<FeedFault> Faults { get; init; }

    /// <summary>What is odd but can be loaded; runs carry these on.</summary>
    public required IReadOnlyList<Finding> Warnings { get; init; }

    /// <summary>Per file; empty when the feed was loaded before.</summary>
    public required IReadOnlyList<FeedFileOutcome> Files { get; init; }

    /// <summary>Whether every file's content is what was loaded last, so that nothing was read further.</summary>
    public bool AlreadyLoaded { get; init; }

    /// <summary>Whether anything that the store holds became different.</summary>
    public bool Changed => Files.Any(f => f.Added + f.Changed + f.Removed > 0);

    /// <summary>One sentence a fault, and per file with more than 50 one that says how many more.</summary>
    public IEnumerable<string> Sentences()
    {
        foreach (var file in Faults.GroupBy(f => f.File, StringComparer.Ordinal))
        {
            foreach (var fault in file) yield return fault + ".";
            var rest = (Files.FirstOrDefault(f => f.File == file.Key)?.Faults ?? 0) - file.Count();
            if (rest > 0) yield return string.Create(CultureInfo.InvariantCulture, $"{file.Key}: and {rest} more.");
        }
    }
}
