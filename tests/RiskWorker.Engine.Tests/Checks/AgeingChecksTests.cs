using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Checks;
using RiskWorker.Engine.Runs;
using RiskWorker.Engine.Tests.Ageing;

namespace RiskWorker.Engine.Tests.Checks;

public sealed class AgeingChecksTests
{
    private static readonly Instrument[] s_instruments =
    [
        AgedKinds.Call(AgedMarket.Close(4)),
        AgedKinds.Call(AgedKinds.Later, name: "LATER"),
        AgedKinds.Bond(AgedMarket.Close(5).AddYears(-3), AgedMarket.Close(5).AddYears(2)),
        AgedKinds.Floater(AgedMarket.Close(12).AddYears(-1), AgedMarket.Close(12).AddYears(1), 2),
        AgedKinds.Asian(AverageKind.Geometric, AgedKinds.Later, OptionRight.Call, 100, new(AgedMarket.Close(3), null), new(AgedKinds.Later, null)),
        new Asian(new("S", null), 100, AgedKinds.Later, OptionRight.Call, AgedKinds.Volatility, RateTerm.Of(0.03), null, AverageKind.Geometric, FixingSchedule.Continuous, AgedMarket.AsOf) { Name = "CONTINUOUS", Currency = "EUR" },
    ];

    [Fact]
    public void Run_names_what_ends_pays_or_is_fixed_inside_the_longest_horizon()
    {
        var finding = Findings(10).One(FindingCodes.LineExpires);
        Assert.Equal(FindingSeverity.Warning, finding.Severity);
        Assert.Equal("3 lines expire, pay or are fixed inside 10 days: ASIAN (is fixed on 2026-12-02), BOND (pays on 2026-12-04), CALL (expires on 2026-12-03); "
            + "nothing, where the dates are right; else correct them in instruments.csv.", finding.Message);
    }

    [Fact]
    public void Run_names_what_keeps_the_valuation_date()
    {
        var finding = Findings(10).One(FindingCodes.LineNotAged);
        Assert.Equal("1 line keeps the valuation date of today: CONTINUOUS (its continuous average runs inside the horizon); "
            + "read its figures as of an instantaneous shock, or set ageing to none.", finding.Message);
    }

    [Fact]
    public void Run_over_a_day_on_which_nothing_happens_names_none() => Findings(1).None(FindingCodes.LineExpires);

    [Fact]
    public void Model_without_ageing_ages_nothing()
    {
        var (aged, still) = (new AgedMarket().Holding(s_instruments), new AgedMarket { Ageing = AgeingKind.None }.Holding(s_instruments));
        Assert.Single(aged.Compile(10).Plan.Aged);
        Assert.Empty(still.Compile(10).Plan.Aged);
    }

    private static IReadOnlyList<Finding> Findings(int longest)
    {
        var snapshot = new AgedMarket().Holding(s_instruments).Snapshot();
        var tree = BookTree.Build(snapshot.Books).Tree!;
        var valued = new BookValuation(snapshot, tree, Calibrator.Calibrate(snapshot));
        return AgeingChecks.Run(valued.Ageing(snapshot), tree, valued.Today, new(longest), snapshot.Settings.Checks);
    }
}
