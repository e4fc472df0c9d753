using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Tests.Document;

public sealed class NumeralsTests
{
    [Theory]
    [InlineData(1234567.891, 1, "1,234,567.9")]
    [InlineData(-1234.5, 2, "−1,234.50")]
    [InlineData(-0.04, 1, "0.0")]
    [InlineData(0, 0, "0")]
    [InlineData(double.NaN, 1, "–")]
    [InlineData(double.PositiveInfinity, 1, "–")]
    [InlineData(1e15, 0, "1,000,000,000,000,000")]
    public void Fixed_prints_commas_and_true_minus(double value, int decimals, string text) => Assert.Equal(text, Numerals.Fixed(value, decimals));

    [Theory]
    [InlineData(2.26, 1, "+2.3")]
    [InlineData(-2.26, 1, "−2.3")]
    [InlineData(0.04, 1, "0.0")]
    public void Signed_prints_a_sign_only_where_a_digit_shows(double value, int decimals, string text) => Assert.Equal(text, Numerals.Signed(value, decimals));

    [Fact]
    public void Confidence_prints_as_typed() => Assert.Equal(["99%", "97.5%", "99.97%"], new[] { 0.99m, 0.975m, 0.9997m }.Select(Numerals.Confidence));

    [Theory]
    [InlineData(0, 1, 0, "EUR")]
    [InlineData(99_999, 1, 0, "EUR")]
    [InlineData(100_000, 1e3, 1, "thousand EUR")]
    [InlineData(99_999_999, 1e3, 0, "thousand EUR")]
    [InlineData(-250e6, 1e6, 1, "million EUR")]
    [InlineData(3e12, 1e9, 1, "billion EUR")]
    [InlineData(double.NaN, 1, 0, "EUR")]
    public void MoneyScale_keeps_figures_short(double largest, double divisor, int decimals, string unit) =>
        Assert.Equal(new MoneyScale(divisor, decimals, unit), MoneyScale.For(largest, "EUR"));
}
