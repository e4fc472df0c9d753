using RiskWorker.Domain.Limits;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Tests.Sqlite;

public sealed class CanonicalRowTests
{
    [Theory]
    [InlineData("plain")]
    [InlineData("")]
    [InlineData(null)]
    [InlineData("\\0")]
    [InlineData("\\")]
    [InlineData("a\tb\nc\\td\\\\n\r")]
    [InlineData("é\U0001F600")]
    public void Text_comes_back_as_it_was_written(string? text)
    {
        var row = Assert.Single(Rows(new CanonicalText().Text(text).Text("end")));

        Assert.Equal(text, row.Text());
        Assert.Equal("end", row.Text());
    }

    [Theory]
    [InlineData(0.1)]
    [InlineData(-0.0)]
    [InlineData(double.Epsilon)]
    [InlineData(double.NaN)]
    [InlineData(double.NegativeInfinity)]
    [InlineData(null)]
    public void Number_comes_back_to_the_bit(double? number) => BitEqual.Assert(number, Assert.Single(Rows(new CanonicalText().Number(number))).Number());

    [Fact]
    public void Typed_fields_come_back()
    {
        var row = Assert.Single(Rows(new CanonicalText().Date(new DateOnly(2026, 11, 27)).Date(null).Value<int>(-3).Value<int>(null).Value<ulong>(ulong.MaxValue).Value<decimal>(0.975m).Text("nav").Text("a").Text(null)));

        Assert.Equal((new DateOnly(2026, 11, 27), null, -3, null), (row.Date(), row.Date(), row.Value<int>(), row.Value<int>()));
        Assert.Equal((ulong.MaxValue, 0.975m, LimitBasis.Nav), (row.Whole<ulong>(), row.Whole<decimal>(), row.Choice<LimitBasis>()));
        Assert.Equal(["a", null], row.Rest());
    }

    [Fact]
    public void Of_text_without_rows_has_none() => Assert.Empty(CanonicalRow.Of(Text(new())));

    [Fact]
    public void Of_row_of_nothing_but_an_empty_field_is_a_row() => Assert.Equal("", Assert.Single(Rows(new CanonicalText().Text(""))).Text());

    private static CanonicalRow[] Rows(CanonicalText text)
    {
        text.End();
        return [.. CanonicalRow.Of(Text(text))];
    }

    private static string Text(CanonicalText text) => System.Text.Encoding.UTF8.GetString(text.Leaf("any").Text);
}
