using RiskWorker.Domain.Runs;

namespace RiskWorker.Domain.Tests.Runs;

public sealed class ConfidenceTests
{
    [Theory]
    [InlineData("0")]
    [InlineData("1")]
    [InlineData("-0.5")]
    [InlineData("99")]
    public void Level_outside_zero_to_one_is_refused(string level)
    {
        var fault = Assert.Throws<ArgumentOutOfRangeException>(() => new Confidence(Of(level)));
        Assert.Equal("level", fault.ParamName);
        Assert.Contains("strictly between 0 and 1", fault.Message, StringComparison.Ordinal);
    }

    // Equal as numbers, and alike to the digits that hashes are made of.
    [Theory]
    [InlineData("0.99", "0.990")]
    [InlineData("0.5", "0.50000000000000000000")]
    public void Level_forgets_trailing_zeros(string one, string other)
    {
        var (a, b) = (new Confidence(Of(one)), new Confidence(Of(other)));
        Assert.Equal(a, b);
        Assert.Equal(decimal.GetBits(a.Level), decimal.GetBits(b.Level));
    }

    [Fact]
    public void Tail_is_exact_in_decimal() => Assert.Equal(1_000m, 100_000 * (1 - new Confidence(0.99m).Level));

    [Theory]
    [InlineData("0.99", "99%")]
    [InlineData("0.975", "97.5%")]
    [InlineData("0.9999", "99.99%")]
    [InlineData("0.9999999999", "99.99999999%")]
    public void ToString_shows_every_digit(string level, string expected) => Assert.Equal(expected, new Confidence(Of(level)).ToString());

    [Fact]
    public void CompareTo_orders_by_level() => Assert.Equal(["95%", "97.5%", "99%"], new[] { new Confidence(0.99m), new(0.95m), new(0.975m) }.Order().Select(c => c.ToString()));

    private static decimal Of(string text) => decimal.Parse(text, System.Globalization.CultureInfo.InvariantCulture);
}
