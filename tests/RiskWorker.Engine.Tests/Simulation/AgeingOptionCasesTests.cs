using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Pricing.Ageing;

namespace RiskWorker.Engine.Tests.Simulation;

/// <summary>
/// Options that age by trading days, through plan, simulation, full revaluation and measures: S0 = 100, K = 100, T = 0.5, r = 0.03,
/// sigma = 0.25 (pricing and simulation), real drift 0.08, h = 10/252, revalued at T - h. Expected values: rows OPV, OPE
/// (monotone mapping of the log-normal quantile, quadrature) and STV, STE (root-finding, quadrature) of the worked examples.
/// </summary>
public sealed class AgeingOptionCasesTests
{
    private const int Scenarios = 1_000_000;
    private static readonly DateOnly s_asOf = new(2026, 11, 27);

    [Theory]
    [InlineData("0.975", false, 6.740746681774546, 8.438412610767463)]
    [InlineData("0.99", false, 8.347834655252406, 9.946510306063669)]
    [InlineData("0.975", true, 3.1481559048495558, 4.421129980888338)]
    [InlineData("0.99", true, 4.319188294994869, 5.584643235693814)]
    public void Short_options_meet_the_exact_measures(string level, bool straddle, double var, double es)
    {
        var confidence = new Confidence(decimal.Parse(level, System.Globalization.CultureInfo.InvariantCulture));
        var sample = Sample(straddle, confidence);
        AssertInside(var, sample.Var(confidence), sample.VarInterval(confidence, 0.95m));
        var (low, high) = sample.ExpectedShortfallInterval(confidence, 0.95m);
        AssertInside(es, sample.ExpectedShortfall(confidence), (low, high));
    }

    private static SampledLoss Sample(bool straddle, Confidence confidence)
    {
        var snapshot = SnapshotOf(straddle ? [OptionRight.Call, OptionRight.Put] : [OptionRight.Call]);
        var (tree, _) = BookTree.Build(snapshot.Books);
        var model = Calibrator.Calibrate(snapshot);
        var binder = new InstrumentBinder("EUR", model.Factors);
        LineValue[] lines = [.. snapshot.Positions.Select(p => new LineValue(p, null, Bound(p, 0.5), p.Quantity * Bound(p, 0.5).Value(model.Levels), 0, 0, null))];
        var aged = snapshot.Positions.ToDictionary(p => (p.Instrument, 10), p => new AgedInstrument { Rest = Bound(p, 0.5 - (10 / 252.0)) });
        var plan = new PlanCompiler(tree!, model, binder.Currencies, [new(10)]).Compile(1, lines, ageing: new(aged));
        var demand = new TailDemand([new(MeasureKind.Var, confidence, new(10)), new(MeasureKind.Es, confidence, new(10))], [0.95m]);
        return new LossSampler(plan, Environment.ProcessorCount, demand, Scenarios, null, CancellationToken.None).Look(Scenarios).Series[0];
    }

    private static BoundEuropean Bound(Position held, double years) => new(0, 1, UnderlyingKey.Of(0), 100, years, 0.03, 0, held.Instrument == nameof(OptionRight.Call), 0.25, -1);

    private static Snapshot SnapshotOf(OptionRight[] rights) => new SnapshotBuilder
    {
        AsOf = s_asOf,
        Settings = new() { Model = new() { Covariance = CovarianceEstimator.Given, Drift = DriftKind.Explicit, Drifts = new Dictionary<string, double> { ["S"] = 0.08 } } },
        Factors = [new("S", FactorClass.Equity, ShockKind.Lognormal, "EUR")],
        Observations = [new(s_asOf, "S", 100)],
        Covariance = [new("S", "S", 0.25 * 0.25 / 252)],
        Positions = [.. rights.Select(right => new Position("ALL", right.ToString(), -1))],
    }.Build();

    // Four standard errors against a 95% interval, each side by its own end.
    private static void AssertInside(double expected, double value, (double? Low, double? High) interval)
    {
        var side = expected < value ? value - interval.Low!.Value : interval.High!.Value - value;
        Assert.True(Math.Abs(expected - value) <= 4 / 1.959963984540054 * side, $"{value:r} against {expected:r}, interval {interval}");
    }
}
