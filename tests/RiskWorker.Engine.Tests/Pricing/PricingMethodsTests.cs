using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Runs;
using RiskWorker.Engine.Tests.Checks;

namespace RiskWorker.Engine.Tests.Pricing;

public sealed class PricingMethodsTests
{
    private static readonly DateOnly s_expiry = FridaySnapshot.Friday.AddYears(1);
    private static readonly VolatilityTerm s_volatility = new(0.2, null);
    private static readonly Underlying s_underlying = new("A", null);
    private static readonly RateTerm s_rate = RateTerm.Of(0.02);

    /// <summary>One of each kind, and of each term that tells two methods of a kind apart.</summary>
    private static readonly Instrument[] s_each =
    [
        new Spot("A") { Name = "spot", Currency = "EUR" },
        new Cash { Name = "fx", Currency = "EUR" },
        new Future("A") { Name = "future", Currency = "EUR" },
        new Forward(s_underlying, 100, s_expiry, null, null, null) { Name = "forward", Currency = "EUR" },
        new Bond(new(0.02, 1, DayCount.ActualActual), FridaySnapshot.Friday, s_expiry, s_rate, 100, null) { Name = "bond", Currency = "EUR" },
        new Floater(new(s_rate, 4, DayCount.Actual360, 0, 0.02), FridaySnapshot.Friday, s_expiry, s_rate, 100, null) { Name = "floater", Currency = "EUR" },
        new Swap(ReceivedLeg.Fixed, new(0.02, 1, DayCount.Thirty360), new(s_rate, 2, DayCount.Actual360, 0, 0.02), FridaySnapshot.Friday, s_expiry, s_rate, 100) { Name = "swap", Currency = "EUR" },
        new Option(s_underlying, 100, s_expiry, OptionRight.Call, ExerciseStyle.European, s_volatility, null, null) { Name = "option, european", Currency = "EUR" },
        new Option(s_underlying, 100, s_expiry, OptionRight.Put, ExerciseStyle.American, s_volatility, s_rate, null) { Name = "option, american", Currency = "EUR" },
        new Digital(s_underlying, 100, s_expiry, OptionRight.Call, s_volatility, null, null, DigitalPayoff.Asset, null) { Name = "digital", Currency = "EUR" },
        Barrier("barrier, continuous", Monitoring.Continuous),
        Barrier("barrier, daily", Monitoring.Daily),
        Asian("asian, arithmetic", AverageKind.Arithmetic),
        Asian("asian, geometric", AverageKind.Geometric),
        new Lookback(s_underlying, null, s_expiry, OptionRight.Call, s_volatility, null, null, Monitoring.Continuous, FridaySnapshot.Friday) { Name = "lookback, continuous", Currency = "EUR" },
        new Lookback(s_underlying, 100, s_expiry, OptionRight.Call, s_volatility, null, null, Monitoring.Daily, FridaySnapshot.Friday) { Name = "lookback, daily", Currency = "EUR" },
    ];

    [Fact]
    public void All_has_one_row_of_its_own_for_each_method_and_says_all_of_each()
    {
        Assert.Equal(InstrumentKinds.TermsByKind.Keys.Order(), s_each.Select(i => i.Kind).Distinct().Order());
        Assert.All(s_each, instrument => Assert.Equal(instrument.Name, PricingMethods.All.Last(m => m.Covers(instrument)).Kind));
        Assert.All(s_each, instrument => Assert.InRange(PricingMethods.All.Count(m => m.Covers(instrument)), 1, 2));
        Assert.Equal(s_each.Length + 2, PricingMethods.All.Count);
        Assert.All(PricingMethods.All, m => Assert.All([m.Kind, m.Model, m.Method, m.Source, m.Caution], text => Assert.Matches("^\\S(.*[^.\\s])?$", text)));
        Assert.All(PricingMethods.All, m => Assert.DoesNotContain('|', m.Model + m.Method + m.Source + m.Caution));
    }

    [Fact]
    public void Held_of_every_kind_gives_each_method_with_the_lines_that_the_figures_hold()
    {
        var builder = FridaySnapshot.Sound();
        foreach (var instrument in s_each) builder.Instrument(instrument).Position("FIRM", instrument.Name, 1);
        builder.Position("FIRM", "digital", 2).Position("LOST", "bond", 2).Position("FIRM", "GONE", 1).Instrument(Barrier("GONE", Monitoring.Daily) with { Expiry = FridaySnapshot.Friday.AddDays(-1) });

        var snapshot = builder.Build();
        var tree = BookTree.Build(snapshot.Books).Tree!;
        var methods = PricingMethods.Held(new BookValuation(snapshot, tree, Calibrator.Calibrate(snapshot)).Today, tree);

        Assert.Equal(PricingMethods.All.Select(m => m.Kind), methods.Select(m => m.Kind));
        // 'A-UNIT' of the sound book beside 'spot'; the second line of the digital; the families hold the sum of theirs.
        Assert.Equal([2, 1, 1, 1, 3, 1, 1, 1, 10, 1, 1, 2, 1, 1, 1, 1, 1, 1], methods.Select(m => m.Lines));
        var row = PricingMethods.All.Single(m => m.Kind == "option, american");
        Assert.Equal(new ValuationMethod(row.Kind, row.Model, row.Method, row.Source, row.Caution, 1), methods.Single(m => m.Kind == row.Kind));
    }

    [Fact]
    public void Run_records_the_methods_of_what_it_holds_and_nothing_of_other_kinds() =>
        Assert.Equal([("spot", 1), ("bond, floater, swap", 1), ("bond", 1)], new RunCalculator(
            FridaySnapshot.Sound().Instrument(s_each[4]).Position("FIRM", "bond", 1).Settings(s => s with { Simulation = s.Simulation with { Scenarios = 1000, Cap = 1000 } }).Build(),
            1, null, CancellationToken.None).Calculate().Methods.Select(m => (m.Kind, m.Lines)));

    private static SingleBarrier Barrier(string name, Monitoring monitoring) =>
        new(s_underlying, 100, s_expiry, OptionRight.Call, s_volatility, null, null, 80, BarrierKind.DownOut, 0, monitoring, FridaySnapshot.Friday, null) { Name = name, Currency = "EUR" };

    private static Asian Asian(string name, AverageKind average) =>
        new(s_underlying, 100, s_expiry, OptionRight.Call, s_volatility, null, null, average, FixingSchedule.Of(new Fixing(s_expiry, null)), null) { Name = name, Currency = "EUR" };
}
