using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Checks;

namespace RiskWorker.Engine.Tests.Checks;

public sealed class FactorChecksTests
{
    private static FridaySnapshot With(string name, Func<FridaySnapshot, FridaySnapshot> factor) => factor(FridaySnapshot.Sound()).Prices(name, FridaySnapshot.Wave(61));

    [Fact]
    public void Run_with_a_calendar_without_holidays_warns()
    {
        var builder = With("B", b => b.Factor("B", calendar: "LSE"));

        Assert.Contains("(LSE)", FindingsOf.Feed(builder).One(FindingCodes.CalendarUnknown).Message, StringComparison.Ordinal);
        FindingsOf.Feed(builder.Holiday("LSE", new(2026, 12, 25))).None(FindingCodes.CalendarUnknown);
    }

    [Theory]
    [InlineData("NOWHERE", 1.0)]
    [InlineData("B", 1.0)]
    [InlineData("A", null)]
    public void Run_with_a_proxy_that_cannot_stand_in_warns(string proxy, double? beta) =>
        Assert.Contains($"(B by {proxy})", FindingsOf.Feed(With("B", b => b.Factor("B", proxy: proxy, beta: beta))).One(FindingCodes.ProxyUnusable).Message, StringComparison.Ordinal);

    [Fact]
    public void Run_with_a_usable_proxy_says_nothing() => Assert.Empty(FindingsOf.Feed(With("B", b => b.Factor("B", proxy: "A", beta: 0.5))));

    [Fact]
    public void Run_with_factors_that_make_no_curve_warns_of_each_curve()
    {
        var builder = FridaySnapshot.Sound();
        Factor[] points =
        [
            new("N1", FactorClass.Rate, ShockKind.Normal, "EUR", "NOWHEN", 1), new("N2", FactorClass.Rate, ShockKind.Normal, "EUR", "NOWHEN"),
            new("T1", FactorClass.Rate, ShockKind.Normal, "EUR", "TWICE", 2), new("T2", FactorClass.Rate, ShockKind.Normal, "EUR", "TWICE", 2),
            new("M1", FactorClass.Rate, ShockKind.Normal, "EUR", "MIXED", 1), new("M2", FactorClass.Credit, ShockKind.Normal, "EUR", "MIXED", 2),
            new("S1", FactorClass.Rate, ShockKind.Normal, "EUR", "SOUND", 1), new("S2", FactorClass.Rate, ShockKind.Normal, "EUR", "SOUND", 2),
        ];
        foreach (var point in points) builder.Factor(point).Prices(point.Name, FridaySnapshot.Wave(61));

        var finding = FindingsOf.Feed(builder).One(FindingCodes.CurveUnusable);
        Assert.Equal((FindingSeverity.Warning, "factors.csv"), (finding.Severity, finding.Subject));
        Assert.StartsWith("3 curves cannot be used (MIXED: its factor 'M1' is of class rate and 'M2' of class credit, NOWHEN: its factor 'N2' has no tenor_years, "
            + "TWICE: its factors 'T1' and 'T2' have the same tenor of 2 years), so no instrument that names them is in a figure; ", finding.Message, StringComparison.Ordinal);
        FindingsOf.Feed(FridaySnapshot.Sound().Factor(points[6]).Prices("S1", FridaySnapshot.Wave(61))).None(FindingCodes.CurveUnusable);
    }

    [Fact]
    public void Run_with_fx_factors_that_nothing_reads_warns()
    {
        var builder = FridaySnapshot.Sound();
        foreach (var (name, currency) in new[] { ("E", "EUR"), ("U1", "USD"), ("U2", "USD"), ("X", null) })
            builder.Factor(name, FactorClass.Fx, currency: currency).Prices(name, FridaySnapshot.Wave(61));

        Assert.StartsWith("3 fx factors name", FindingsOf.Feed(builder).One(FindingCodes.FxFactorUnused).Message, StringComparison.Ordinal);
        Assert.Contains("(E for EUR, U2 for USD, X for no currency)", FindingsOf.Feed(builder).One(FindingCodes.FxFactorUnused).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_an_adjustment_of_an_unknown_factor_warns() =>
        Assert.Contains("(Z)", FindingsOf.Feed(FridaySnapshot.Sound().Adjustment("Z", FridaySnapshot.Friday, 0.5)).One(FindingCodes.AdjustmentUnknown).Message, StringComparison.Ordinal);

    [Fact]
    public void Run_with_a_drift_of_an_unknown_factor_blocks_when_drifts_are_read()
    {
        var builder = FridaySnapshot.Sound().Model(m => m with { Drifts = new Dictionary<string, double> { ["A"] = 0.05, ["Z"] = 0.05 } });
        FindingsOf.Feed(builder).None(FindingCodes.DriftUnknown);

        var finding = FindingsOf.Feed(builder.Model(m => m with { Drift = DriftKind.Explicit })).One(FindingCodes.DriftUnknown);
        Assert.Equal(FindingSeverity.Blocking, finding.Severity);
        Assert.Throws<CalibrationException>(() => Calibrator.Calibrate(builder.Build()));
    }

    [Fact]
    public void Run_with_a_given_covariance_needs_each_variance_and_pair_of_moving_factors()
    {
        var builder = With("B", b => b.Factor("B")).Model(m => m with { Covariance = CovarianceEstimator.Given }).Covariance("A", "A", 1e-4);

        Assert.Contains("B, B (The variance is not given)", FindingsOf.Feed(builder).One(FindingCodes.CovarianceUnusable).Message, StringComparison.Ordinal);
        Assert.Contains("A, B (The covariance is not given)", FindingsOf.Feed(builder.Covariance("B", "B", 1e-4)).One(FindingCodes.CovarianceUnusable).Message, StringComparison.Ordinal);
        Assert.Empty(FindingsOf.Feed(builder.Covariance("B", "A", 5e-5)));
        Assert.Contains("(Z)", FindingsOf.Feed(builder.Covariance("Z", "A", 5e-5)).One(FindingCodes.CovarianceUnknown).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_an_estimated_covariance_reads_no_given_one() => Assert.Empty(FindingsOf.Feed(FridaySnapshot.Sound().Covariance("Z", "Z", 1)));
}
