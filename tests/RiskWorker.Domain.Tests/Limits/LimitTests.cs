using RiskWorker.Domain.Limits;

namespace RiskWorker.Domain.Tests.Limits;

public sealed class LimitTests
{
    private static readonly DateOnly s_from = new(2026, 1, 5), s_to = new(2026, 6, 30);

    [Theory]
    [InlineData(true, true, "2026-01-04", false)]
    [InlineData(true, true, "2026-01-05", true)]
    [InlineData(true, true, "2026-06-30", true)]
    [InlineData(true, true, "2026-07-01", false)]
    [InlineData(false, true, "1990-01-01", true)]
    [InlineData(true, false, "2090-01-01", true)]
    [InlineData(true, false, "2026-01-04", false)]
    [InlineData(false, false, "2026-03-01", true)]
    public void IsValidOn_counts_both_ends_and_lets_an_open_end_be_open(bool hasFrom, bool hasTo, string date, bool expected)
    {
        var limit = new Limit("line", "desk", default, 1, ValidFrom: hasFrom ? s_from : null, ValidTo: hasTo ? s_to : null);
        Assert.Equal(expected, limit.IsValidOn(DateOnly.Parse(date, System.Globalization.CultureInfo.InvariantCulture)));
    }
}
