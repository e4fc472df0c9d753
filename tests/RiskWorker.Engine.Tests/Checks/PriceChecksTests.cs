using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Checks;
using static RiskWorker.Engine.Tests.Checks.FridaySnapshot;

namespace RiskWorker.Engine.Tests.Checks;

public sealed class PriceChecksTests
{
    private static readonly DateOnly s_thursday = Friday.AddDays(-1);

    /// <summary>A sound snapshot with a second factor B, its 61 prices changed as told.</summary>
    private static FridaySnapshot WithB(Action<double[]> change, ShockKind shock = ShockKind.Lognormal, string? calendar = null)
    {
        var prices = Wave(61);
        change(prices);
        return Sound().Factor("B", shock: shock, calendar: calendar).Prices("B", prices);
    }

    [Fact]
    public void Run_without_a_price_on_the_open_day_blocks_and_tells_the_age()
    {
        var finding = FindingsOf.Feed(WithB(p => p[^1] = p[^2] = double.NaN)).One(FindingCodes.FactorMissing);

        Assert.Equal(FindingSeverity.Blocking, finding.Severity);
        Assert.Equal("observations.csv", finding.Subject);
        Assert.StartsWith("1 factor has no observation on 2026-11-27 although the calendar is open (B 2 days old)", finding.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_without_a_price_on_a_holiday_warns_and_tells_the_age()
    {
        var findings = FindingsOf.Feed(WithB(p => p[^1] = double.NaN, calendar: "NYSE").Holiday("NYSE", Friday));

        findings.None(FindingCodes.FactorMissing);
        var finding = findings.One(FindingCodes.FactorClosed);
        Assert.Equal(FindingSeverity.Warning, finding.Severity);
        Assert.Contains("(B 1 day old), so the last price is used", finding.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_a_price_on_the_holiday_itself_uses_the_open_day_before()
    {
        var findings = FindingsOf.Feed(WithB(_ => { }, calendar: "NYSE").Holiday("NYSE", Friday));

        Assert.Contains("(B 1 day old)", findings.One(FindingCodes.FactorClosed).Message, StringComparison.Ordinal);
        Assert.Contains("(B 1 day)", findings.One(FindingCodes.DayClosed).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_on_a_Sunday_uses_the_prices_of_Friday()
    {
        var builder = Sound();
        builder.AsOf = Friday.AddDays(2);

        Assert.Contains("(A 2 days old)", FindingsOf.Feed(builder).One(FindingCodes.FactorClosed).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_a_factor_never_observed_blocks_by_one_code_alone()
    {
        var findings = FindingsOf.Feed(Sound().Factor("B"));

        Assert.Equal(FindingCodes.FactorUnobserved.Code, Assert.Single(findings).Code);
        Assert.Equal(FindingSeverity.Blocking, findings[0].Severity);
    }

    [Theory]
    [InlineData(0.0)]
    [InlineData(-37.63)]
    public void Run_with_a_price_that_has_no_logarithm_blocks(double price)
    {
        var finding = FindingsOf.Feed(WithB(p => p[^2] = price)).One(FindingCodes.PriceNotPositive);

        Assert.Equal(FindingSeverity.Blocking, finding.Severity);
        Assert.Contains("(B on 2026-11-26)", finding.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_negative_values_under_normal_shocks_says_nothing() =>
        Assert.Empty(FindingsOf.Feed(WithB(p => { for (var i = 0; i < p.Length; i++) p[i] -= 150; }, ShockKind.Normal)));

    [Fact]
    public void Run_with_a_negative_price_before_the_window_says_nothing() =>
        Assert.Empty(FindingsOf.Feed(new FridaySnapshot().Factor("A").Prices("A", [-5, .. Wave(61)]).Spot("A-UNIT", "A").Position("FIRM", "A-UNIT", 1)));

    [Fact]
    public void Run_with_a_negative_price_at_the_base_of_the_window_blocks() =>
        FindingsOf.Feed(WithB(p => p[0] = -5)).One(FindingCodes.PriceNotPositive);

    [Fact]
    public void Run_with_a_price_unchanged_for_exactly_three_days_warns()
    {
        var finding = FindingsOf.Feed(WithB(p => p[^4] = p[^3] = p[^2] = p[^1] = 77)).One(FindingCodes.PriceStale);

        Assert.Equal(FindingSeverity.Warning, finding.Severity);
        Assert.Contains("(B for 3)", finding.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_a_price_unchanged_for_two_days_says_nothing() =>
        FindingsOf.Feed(WithB(p => p[^3] = p[^2] = p[^1] = 100)).None(FindingCodes.PriceStale);

    [Fact]
    public void Run_with_a_price_that_was_unchanged_and_moved_says_nothing() =>
        FindingsOf.Feed(WithB(p => { Array.Fill(p, 100, 40, 20); p[^1] = 101; })).None(FindingCodes.PriceStale);

    [Fact]
    public void Run_counts_own_business_days_alone_for_staleness()
    {
        // Unchanged from Monday to Friday with the Wednesday closed, whatever stands there: three of its business days.
        var builder = WithB(p => { p[^5] = p[^4] = p[^2] = p[^1] = 77; p[^3] = 80; }, calendar: "NYSE").Holiday("NYSE", Friday.AddDays(-2));

        Assert.Contains("(B for 3)", FindingsOf.Feed(builder).One(FindingCodes.PriceStale).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_a_day_missing_in_an_unchanged_row_neither_counts_nor_ends_it() =>
        Assert.Contains("(B for 3)", FindingsOf.Feed(WithB(p => { p[^5] = p[^4] = p[^2] = p[^1] = 77; p[^3] = double.NaN; })).One(FindingCodes.PriceStale).Message, StringComparison.Ordinal);

    [Fact]
    public void Run_with_a_split_that_did_not_move_the_price_is_no_staleness() =>
        FindingsOf.Feed(WithB(p => p[^4] = p[^3] = p[^2] = p[^1] = 77).Adjustment("B", s_thursday, 0.5)).None(FindingCodes.PriceStale);

    [Fact]
    public void Run_reads_the_number_of_stale_days_from_the_settings() =>
        Assert.Contains("(B for 2)", FindingsOf.Feed(WithB(p => p[^3] = p[^2] = p[^1] = 77).Checks(c => c with { StaleDays = 2 })).One(FindingCodes.PriceStale).Message, StringComparison.Ordinal);

    [Fact]
    public void Run_takes_severities_from_the_settings()
    {
        var builder = WithB(p => p[^1] = double.NaN).Checks(c => c with { Severity = new Dictionary<string, FindingSeverity> { ["factor-missing"] = FindingSeverity.Warning } });

        Assert.Equal(FindingSeverity.Warning, FindingsOf.Feed(builder).One(FindingCodes.FactorMissing).Severity);
    }
}
