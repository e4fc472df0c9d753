using RiskWorker.Domain.Runs;

namespace RiskWorker.Domain.Tests.Runs;

public sealed class RunChainTests
{
    private const int Length = 6;

    private static List<ChainEntry> Chain()
    {
        var entries = new List<ChainEntry>();
        for (var i = 0; i < Length; i++)
            entries.Add(RunChain.Append(entries.LastOrDefault(), i % 2 == 0 ? ChainEntryKind.Results : ChainEntryKind.Documents, $"run{i / 2}", SnapshotHash.OfText($"content {i}")));
        return entries;
    }

    public static TheoryData<int> Places => [.. Enumerable.Range(0, Length)];

    [Fact]
    public void Whole_chain_has_no_break()
    {
        Assert.Null(RunChain.FirstBreak(Chain()));
        Assert.Null(RunChain.FirstBreak([]));
    }

    [Fact]
    public void Append_numbers_entries_and_links_each_to_the_one_before()
    {
        var chain = Chain();
        Assert.Equal([1, 2, 3, 4, 5, 6], chain.Select(e => e.Sequence));
        Assert.Equal(chain.Select(e => e.Hash).Prepend(RunChain.Origin).Take(Length), chain.Select(e => e.Previous));
        Assert.Equal(Length, chain.Select(e => e.Hash).Distinct().Count());
        Assert.Equal(new string('0', 64), RunChain.Origin);
    }

    // SHA-256 of 64 zeros, "1", "Results", "r", "c", each on a line of its own, by sha256sum.
    [Fact]
    public void Append_first_hash_is_that_of_its_canonical_text() =>
        Assert.Equal("87c9bd71d8592b7a11b12519136861e3193563990617e733c0b3c30ee2d6c723", RunChain.Append(null, ChainEntryKind.Results, "r", "c").Hash);

    // The end of the chain is the one place that nothing follows: its removal shows against the head that documents print.
    [Theory]
    [MemberData(nameof(Places))]
    public void Removed_record_breaks_the_chain(int place)
    {
        var chain = Chain();
        chain.RemoveAt(place);
        var fault = RunChain.FirstBreak(chain);
        if (place == Length - 1) Assert.Null(fault);
        else Assert.Equal($"Entry {place + 1} of the record is missing: entry {place + 2} (run run{(place + 1) / 2}) follows instead.", fault);
    }

    // Removed, and the rest numbered again as if nothing had been there.
    [Theory]
    [MemberData(nameof(Places))]
    public void Removed_record_with_the_rest_renumbered_breaks_the_chain(int place)
    {
        var chain = Chain();
        chain.RemoveAt(place);
        for (var i = place; i < chain.Count; i++) chain[i] = chain[i] with { Sequence = i + 1 };
        Assert.Equal(place == Length - 1, RunChain.FirstBreak(chain) is null);
    }

    [Theory]
    [MemberData(nameof(Places))]
    public void Altered_record_breaks_the_chain_where_it_stands(int place)
    {
        foreach (var alter in new Func<ChainEntry, ChainEntry>[]
        {
            e => e with { Content = SnapshotHash.OfText("other") },
            e => e with { Run = e.Run + "x" },
            e => e with { Kind = 1 - e.Kind },
            e => e with { Hash = SnapshotHash.OfText("other") },
        })
        {
            var chain = Chain();
            chain[place] = alter(chain[place]);
            Assert.Equal($"Entry {place + 1} (run {chain[place].Run}) was altered: its hash does not match its content.", RunChain.FirstBreak(chain));
        }
    }

    // Altered and hashed again: the entry is sound in itself, but the next one does not follow it.
    [Theory]
    [MemberData(nameof(Places))]
    public void Altered_record_with_its_hash_made_anew_breaks_the_chain_behind_it(int place)
    {
        var chain = Chain();
        chain[place] = RunChain.Append(place == 0 ? null : chain[place - 1], chain[place].Kind, chain[place].Run, SnapshotHash.OfText("other"));
        var fault = RunChain.FirstBreak(chain);
        if (place == Length - 1) Assert.Null(fault);
        else Assert.StartsWith($"Entry {place + 2} (run run{(place + 1) / 2}) does not follow the entry before it", fault, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(0, 1)]
    [InlineData(2, 5)]
    [InlineData(4, 5)]
    public void Reordered_records_break_the_chain(int first, int second)
    {
        var chain = Chain();
        (chain[first], chain[second]) = (chain[second], chain[first]);
        Assert.StartsWith($"Entry {first + 1} of the record is missing", RunChain.FirstBreak(chain), StringComparison.Ordinal);
        for (var i = 0; i < Length; i++) chain[i] = chain[i] with { Sequence = i + 1 };
        Assert.StartsWith($"Entry {first + 1} (run", RunChain.FirstBreak(chain), StringComparison.Ordinal);
    }

    [Fact]
    public void Doubled_record_breaks_the_chain()
    {
        var chain = Chain();
        chain.Insert(2, chain[1]);
        Assert.NotNull(RunChain.FirstBreak(chain));
    }
}
