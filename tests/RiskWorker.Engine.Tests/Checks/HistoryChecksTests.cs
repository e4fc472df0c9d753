using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Checks;
using static RiskWorker.Engine.Tests.Checks.FridaySnapshot;

namespace RiskWorker.Engine.Tests.Checks;

public sealed class HistoryChecksTests
{
    private static FridaySnapshot WithB(double[] prices, ShockKind shock = ShockKind.Lognormal, string? proxy = null, double? beta = null) =>
        new FridaySnapshot().Factor("A").Prices("A", Wave(101)).Spot("A-UNIT", "A").Position("FIRM", "A-UNIT", 1)
            .Factor("B", shock: shock, proxy: proxy, beta: beta).Prices("B", prices).Model(m => m with { Window = 100 });

    [Fact]
    public void Run_with_exactly_sixty_shocks_warns_that_the_window_is_not_filled()
    {
        var findings = FindingsOf.Feed(WithB(Wave(61)));

        findings.None(FindingCodes.HistoryShort);
        Assert.Contains("fewer shocks than the window of 100 (B 60)", findings.One(FindingCodes.HistoryPartial).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_fifty_nine_shocks_blocks()
    {
        var findings = FindingsOf.Feed(WithB(Wave(60)));

        Assert.Equal(FindingSeverity.Blocking, findings.One(FindingCodes.HistoryShort).Severity);
        Assert.Contains("(B 59)", findings.One(FindingCodes.HistoryShort).Message, StringComparison.Ordinal);
        Assert.Single(findings);
    }

    [Fact]
    public void Run_with_as_many_shocks_as_the_window_says_nothing() => Assert.Empty(FindingsOf.Feed(WithB(Wave(101))));

    // A model that pairs days keeps what a factor's gap would make others drop.
    [Fact]
    public void Run_with_paired_days_says_nothing_of_days_that_are_not_complete()
    {
        double[] gap = [.. Wave(101).Select((price, t) => t == 50 ? double.NaN : price)];
        FindingsOf.Feed(WithB(gap)).One(FindingCodes.DaysDropped);
        var paired = FindingsOf.Feed(WithB(gap).Model(m => m with { MissingDays = MissingDays.Pairwise }));
        paired.None(FindingCodes.DaysDropped);
        paired.None(FindingCodes.DaysFew);
    }

    [Fact]
    public void Run_with_a_proxy_and_a_beta_warns_and_sizes_what_rests_on_it()
    {
        var builder = WithB(Wave(26), proxy: "A", beta: 0.8);
        var findings = FindingsOf.Feed(builder);

        Assert.Equal(FindingSeverity.Warning, findings.One(FindingCodes.HistoryProxied).Severity);
        Assert.Contains("(B 25 of its own, 0.8 times A on 75 of 100 days, 75% of the window)", Assert.Single(findings).Message, StringComparison.Ordinal);
        Assert.Equal(new UsedProxy("B", "A", 0.8, 75, 0.75), Assert.Single(Calibrator.Calibrate(builder.Build()).Proxies));
    }

    [Fact]
    public void Run_with_a_proxy_without_a_beta_blocks()
    {
        var findings = FindingsOf.Feed(WithB(Wave(26), proxy: "A"));

        findings.One(FindingCodes.ProxyUnusable);
        Assert.Equal(FindingSeverity.Blocking, findings.One(FindingCodes.HistoryShort).Severity);
    }

    [Fact]
    public void Run_with_a_short_history_let_pass_can_be_calibrated()
    {
        var builder = WithB(Wave(26)).Checks(c => c with { Severity = new Dictionary<string, FindingSeverity> { ["history-short"] = FindingSeverity.Warning } });

        Assert.Equal(FindingSeverity.Warning, Assert.Single(FindingsOf.Feed(builder)).Severity);
        Assert.Equal(25, Calibrator.Calibrate(builder.Build()).Shocks);
    }

    [Fact]
    public void Run_with_few_days_in_common_blocks()
    {
        // A stops for a while where B begins: each has enough, together they have 40.
        double[] a = [.. Wave(100), .. Enumerable.Repeat(double.NaN, 30), .. Wave(41)];
        double[] b = [.. Enumerable.Repeat(double.NaN, 100), .. Wave(71)];
        var builder = new FridaySnapshot().Factor("A").Prices("A", a).Factor("B").Prices("B", b).Spot("A-UNIT", "A").Position("FIRM", "A-UNIT", 1);

        Assert.StartsWith("40 days are complete over all factors, of at least 60 wanted", FindingsOf.Feed(builder).One(FindingCodes.DaysFew).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_a_given_covariance_asks_for_no_history()
    {
        var builder = WithB(Wave(2)).Model(m => m with { Covariance = CovarianceEstimator.Given })
            .Covariance("A", "A", 1e-4).Covariance("B", "B", 1e-4).Covariance("A", "B", 0);

        Assert.Empty(FindingsOf.Feed(builder));
        FindingsOf.Feed(builder.Model(m => m with { Drift = DriftKind.Historical })).One(FindingCodes.HistoryShort);
    }

    [Theory]
    [InlineData(8.0, false)]
    [InlineData(8.001, true)]
    [InlineData(-8.0, false)]
    [InlineData(-8.001, true)]
    public void Run_with_a_move_of_more_than_eight_deviations_of_the_others_warns(double move, bool isJump)
    {
        var findings = FindingsOf.Feed(WithB(OneMove(move), ShockKind.Normal));

        if (isJump) Assert.Contains($"(B on {Weekdays(Friday, 101)[51]:yyyy-MM-dd} by 8.0)", findings.One(FindingCodes.PriceJump).Message, StringComparison.Ordinal);
        else Assert.Empty(findings);
    }

    /// <summary>101 values whose shocks are all 1 or -1 but the 51st: the root mean square of the others is exactly 1.</summary>
    private static double[] OneMove(double move)
    {
        var (values, value) = (new double[101], 0.0);
        for (var i = 1; i < values.Length; i++) values[i] = value += i == 51 ? move : i % 2 == 0 ? 1 : -1;
        return values;
    }

    [Fact]
    public void Run_with_one_move_among_still_days_warns_without_a_multiple()
    {
        var prices = new double[101];
        Array.Fill(prices, 5.0, 50, 51);

        Assert.Contains("where no other day moved", FindingsOf.Feed(WithB(prices, ShockKind.Normal)).One(FindingCodes.PriceJump).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_a_huge_move_names_that_day_alone()
    {
        // Subtracting the move's square from the total would leave nothing of the others.
        Assert.StartsWith("1 move is larger", FindingsOf.Feed(WithB(OneMove(1e12), ShockKind.Normal)).One(FindingCodes.PriceJump).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_a_split_finds_a_jump_unless_it_is_adjusted()
    {
        var prices = Wave(101);
        for (var i = 90; i < prices.Length; i++) prices[i] /= 4;

        FindingsOf.Feed(WithB(prices)).One(FindingCodes.PriceJump);
        Assert.Empty(FindingsOf.Feed(WithB(prices).Adjustment("B", Weekdays(Friday, 11)[0], 0.25)));
    }

    [Fact]
    public void Run_with_a_jump_before_the_window_says_nothing()
    {
        double[] prices = [.. Wave(20).Select(p => p * 50), .. Wave(101)];

        Assert.Empty(FindingsOf.Feed(WithB(prices)));
    }
}
