using RiskWorker.Domain.Runs;

namespace RiskWorker.Domain.Tests.Runs;

public sealed class SnapshotHashTests
{
    private static SnapshotPart Leaf(string path) => new(path, SnapshotHash.OfText(path));

    private static readonly SnapshotPart[] s_leaves = [Leaf("books"), Leaf("observations/2026-11-26"), Leaf("observations/2026-11-27"), Leaf("positions/2026-11-27"), Leaf("Zones")];

    [Fact]
    public void Root_does_not_depend_on_the_order_of_leaves()
    {
        var expected = SnapshotHash.Of(s_leaves);
        for (var seed = 0; seed < 50; seed++)
        {
            var leaves = s_leaves.ToArray();
            new Random(seed).Shuffle(leaves);
            Assert.Equal(expected.Root, SnapshotHash.Of(leaves).Root);
            Assert.Equal(expected.Files, SnapshotHash.Of(leaves).Files);
        }
    }

    [Fact]
    public void Files_are_in_ordinal_order_and_hold_their_dates()
    {
        var whole = SnapshotHash.Of(s_leaves);
        Assert.Equal(["Zones", "books", "observations", "positions"], whole.Files.Select(f => f.Path));
        // Dates under files, files under the root: each level is the hash of its lines 'path hash'.
        var observations = SnapshotHash.OfText(string.Concat(s_leaves[1..3].Select(l => $"{l.Path} {l.Hash}\n")));
        Assert.Equal(observations, whole.Files[2].Hash);
        Assert.Equal(SnapshotHash.OfText(string.Concat(whole.Files.Select(f => $"{f.Path} {f.Hash}\n"))), whole.Root);
    }

    [Fact]
    public void Changed_leaf_changes_its_file_and_the_root_alone()
    {
        var before = SnapshotHash.Of(s_leaves);
        for (var i = 0; i < s_leaves.Length; i++)
        {
            var leaves = s_leaves.ToArray();
            leaves[i] = leaves[i] with { Hash = SnapshotHash.OfText("other") };
            var after = SnapshotHash.Of(leaves);
            Assert.NotEqual(before.Root, after.Root);
            Assert.Equal(leaves[i].Path.Split('/')[0], before.Files.Except(after.Files).Single().Path);
        }
    }

    [Fact]
    public void Leaf_left_out_or_under_another_path_changes_the_root()
    {
        var roots = new List<string> { SnapshotHash.Of(s_leaves).Root, SnapshotHash.Of(s_leaves[1..]).Root, SnapshotHash.Of([s_leaves[0] with { Path = "book" }, .. s_leaves[1..]]).Root, SnapshotHash.Of([]).Root };
        Assert.Equal(roots.Count, roots.Distinct().Count());
    }

    [Fact]
    public void Of_a_path_given_twice_is_refused() =>
        Assert.Contains("'books' stands twice", Assert.Throws<ArgumentException>(() => SnapshotHash.Of([.. s_leaves, Leaf("books")])).Message, StringComparison.Ordinal);

    // FIPS 180-4 examples: 'abc' and the empty message.
    [Theory]
    [InlineData("abc", "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad")]
    [InlineData("", "e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855")]
    public void OfText_is_SHA_256_in_lower_case_hex(string text, string expected) => Assert.Equal(expected, SnapshotHash.OfText(text));

    // A path longer than the buffer that lines are written to.
    [Fact]
    public void Of_a_long_path_is_the_hash_of_its_line()
    {
        var leaf = Leaf(new string('å', 400));
        var file = SnapshotHash.OfText($"{leaf.Path} {leaf.Hash}\n");
        Assert.Equal(SnapshotHash.OfText($"{leaf.Path} {file}\n"), SnapshotHash.Of([leaf]).Root);
    }
}
