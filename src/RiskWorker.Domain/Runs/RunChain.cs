namespace RiskWorker.Domain.Runs;

/// <summary>What a chain entry vouches for.</summary>
public enum ChainEntryKind
{
    /// <summary>The results of a run; its hash is the head that the documents print.</summary>
    Results,

    /// <summary>The documents rendered from a run.</summary>
    Documents,
}

/// <summary>One link: its hash covers the previous hash, so nothing before it can change unseen.</summary>
/// <param name="Sequence">1 for the first, one more for each.</param>
/// <param name="Kind">What it vouches for.</param>
/// <param name="Run">The run.</param>
/// <param name="Content">Hash of the content.</param>
/// <param name="Previous">Hash of the entry before; 64 zeros for the first.</param>
/// <param name="Hash">Hash of this entry.</param>
public sealed record ChainEntry(long Sequence, ChainEntryKind Kind, string Run, string Content, string Previous, string Hash);

/// <summary>The append-only chain of run records.</summary>
public static class RunChain
{
    /// <summary>What stands before the first entry.</summary>
    public static string Origin { get; } = new('0', 64);

    /// <summary>The entry that follows <paramref name="last"/> (null for the first).</summary>
    public static ChainEntry Append(ChainEntry? last, ChainEntryKind kind, string run, string content)
    {
        var (sequence, previous) = (last is null ? 1 : last.Sequence + 1, last?.Hash ?? Origin);
        return new(sequence, kind, run, content, previous, HashOf(sequence, kind, run, content, previous));
    }

    /// <summary>The first thing wrong with <paramref name="entries"/> in stored order, or null when the chain is whole.</summary>
    public static string? FirstBreak(IEnumerable<ChainEntry> entries)
    {
        ChainEntry? last = null;
        foreach (var entry in entries)
        {
            var expected = last is null ? 1 : last.Sequence + 1;
            if (entry.Sequence != expected) return $"Entry {expected} of the record is missing: entry {entry.Sequence} (run {entry.Run}) follows instead.";
            if (entry.Previous != (last?.Hash ?? Origin)) return $"Entry {entry.Sequence} (run {entry.Run}) does not follow the entry before it: one of the two was altered, removed or moved.";
            if (entry.Hash != HashOf(entry.Sequence, entry.Kind, entry.Run, entry.Content, entry.Previous)) return $"Entry {entry.Sequence} (run {entry.Run}) was altered: its hash does not match its content.";
            last = entry;
        }
        return null;
    }

    private static string HashOf(long sequence, ChainEntryKind kind, string run, string content, string previous) =>
        SnapshotHash.OfText($"{previous}\n{sequence}\n{kind}\n{run}\n{content}\n");
}
