using System.Text;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Tests.Sqlite;

public sealed class CanonicalTextTests
{
    // U+FFFD and U+E000 stand after every surrogate in UTF-16, and their UTF-8 before that of U+10000 on.
    private static readonly string[] s_names =
        ["", "A", "A1", "A10", "B", "a", "z", "é", "\u07FF", "\u0800", "\uD7FF", "\uE000", "\uE000x", "\uEFFF", "\uF000", "\uFFFD", "\U00010000", "\U0001F600", "\U0001F600x", "\U0010FFFF"];

    [Fact]
    public void Compare_is_that_of_the_UTF_16_units_for_every_pair()
    {
        foreach (var x in s_names)
        {
            foreach (var y in s_names)
                Assert.Equal(Math.Sign(string.CompareOrdinal(x, y)), Math.Sign(CanonicalOrder.Compare(Encoding.UTF8.GetBytes(x), Encoding.UTF8.GetBytes(y))));
        }
    }

    [Theory]
    [InlineData(1)]
    [InlineData(7)]
    [InlineData(11)]
    [InlineData(499)]
    public void Leaf_rows_stand_in_ordinal_order_whatever_the_order_they_were_added_in(int stride)
    {
        var rows = s_names.SelectMany(name => Enumerable.Range(0, 25).Select(n => $"{name}{n}\t")).ToArray();
        var text = new CanonicalText();
        for (var i = 0; i < rows.Length; i++) text.Text(rows[i * stride % rows.Length][..^1]).End();

        var leaf = text.Leaf("any");

        Assert.Equal(string.Join('\n', rows.Order(StringComparer.Ordinal)), Encoding.UTF8.GetString(leaf.Text));
        Assert.Equal(RiskWorker.Domain.Runs.SnapshotHash.OfBytes(leaf.Text), leaf.Part.Hash);
    }

    [Fact]
    public void Leaf_second_holds_only_what_was_added_after_the_first()
    {
        var text = new CanonicalText();
        text.Text("first").Number(1).End();
        text.Leaf("one");
        text.Text("second").End();

        Assert.Equal("second\t", Encoding.UTF8.GetString(text.Leaf("two").Text));
        Assert.Empty(text.Leaf("three").Text);
    }
}
