using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Models;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Simulation;
using RiskWorker.Numerics.Estimation;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>
/// One long position of 1 in a factor of 25% a year and a drift of 8% under one law, whose VaR 99% and ES 97.5% are known. The benchmarks' command
/// <c>coverage</c> is built with this file too.
/// </summary>
/// <param name="Name">The law and the horizon.</param>
/// <param name="Plan">The position under it.</param>
/// <param name="Var">Exact VaR.</param>
/// <param name="Es">Exact ES.</param>
/// <param name="IsAtom">Whether the exact VaR has a probability of its own: the law is a list of equally likely moves. It is then covered where it equals an end
/// of the interval, so that intervals cover it at least as often as their level says, and by how much more hangs on how many moves there are.</param>
internal sealed record CoverageCase(string Name, RevaluationPlan Plan, double Var, double Es, bool IsAtom = false)
{
    /// <summary>Level of the intervals.</summary>
    public const decimal Level = 0.95m;

    private const double Volatility = 0.25, Mu = 0.08, JumpsPerYear = 20, JumpMean = -0.03, JumpDeviation = 0.02;

    private static readonly DateOnly s_asOf = new(2026, 11, 27);
    private static readonly double s_deviation = Volatility / Math.Sqrt(252);

    /// <summary>Every law that is simulated.</summary>
    public static IReadOnlyList<CoverageCase> All { get; } =
    [
        Merton("log-normal, 1 day", 1, new()),
        Merton("log-normal, 10 days", 10, new()),
        // The inverted characteristic function: Data/models/make_exact.py, rows T-4-1-long and T-4-10-long.
        Student("Student-t of 4, 1 day", 1, null, 0.040681484725232586, 0.043158667330840395),
        Student("Student-t of 4, 10 days", 10, null, 0.11207934684355769, 0.11462363336237236),
        Student("t copula with a margin of 4, 10 days", 10, [4], 0.11207934684355769, 0.11462363336237236),
        Merton("jump-diffusion, 1 day", 1, new() { Kind = ModelKind.JumpDiffusion, Jumps = new() { Own = new Dictionary<string, OwnJumps> { ["X"] = new(JumpsPerYear, new(JumpMean, JumpDeviation)) } } }),
        Merton("jump-diffusion, 10 days", 10, new() { Kind = ModelKind.JumpDiffusion, Jumps = new() { Own = new Dictionary<string, OwnJumps> { ["X"] = new(JumpsPerYear, new(JumpMean, JumpDeviation)) } } }),
        Filtered("filtered historical, 1 day"),
    ];

    /// <summary>How many of the intervals of seeds 1, 2, ... hold the exact measures.</summary>
    /// <param name="seeds">Number of seeds.</param>
    /// <param name="scenarios">Scenarios of each.</param>
    public (int Var, int Es) Covered(int seeds, int scenarios)
    {
        var horizon = Plan.Horizons[0];
        var (var, es) = (new MeasureSpec(MeasureKind.Var, new(0.99m), horizon), new MeasureSpec(MeasureKind.Es, new(0.975m), horizon));
        var (workspace, demand, settings) = (new SimulationWorkspace(1), new TailDemand([var, es], [Level]), new SimulationSettings { Scenarios = scenarios, Revaluation = RevaluationKind.Full });
        var covered = (Var: 0, Es: 0);
        for (var seed = 1; seed <= seeds; seed++)
        {
            var series = new LossSampler(Plan with { Seed = (ulong)seed }, workspace, demand, settings, null, CancellationToken.None).Look(scenarios).Series[0];
            if (Holds(series.Measure(var, Level), Var)) covered.Var++;
            if (Holds(series.Measure(es, Level), Es)) covered.Es++;
        }
        return covered;
    }

    // An atom is reckoned from residuals in another order of operations than a scenario's: equal to rounding is equal.
    private bool Holds(MeasureResult measure, double exact)
    {
        var rounding = IsAtom ? 1e-12 : 0;
        return measure.Low - rounding <= exact && exact <= measure.High + rounding;
    }

    // Without jumps the mixture is a normal: the closed forms of the log-normal law.
    private static CoverageCase Merton(string name, int days, ModelSettings model)
    {
        var rate = model.Kind == ModelKind.JumpDiffusion ? JumpsPerYear / 252 : 0;
        var drift = (Mu / 252) - (s_deviation * s_deviation / 2) - (rate * (Math.Exp(JumpMean + (JumpDeviation * JumpDeviation / 2)) - 1));
        var law = new MertonReturn(drift, s_deviation, rate, JumpMean, JumpDeviation, days);
        return new(name, PlanOf(model, days), law.LongLoss(0.01).ValueAtRisk, law.LongLoss(0.025).Shortfall);
    }

    private static CoverageCase Student(string name, int days, double[]? margins, double var, double es) =>
        new(name, PlanOf(new(), days) with { Law = new StudentLaw(4, margins, null, null) }, var, es);

    // 1,950 residuals, a tail of 19.5 and one of 48.75 of them; no drift.
    private static CoverageCase Filtered(string name)
    {
        const int Days = 1_950;
        var random = new Random(9);
        var residuals = new double[Days];
        for (var t = 0; t < Days; t++) residuals[t] = (random.NextDouble() + random.NextDouble() + random.NextDouble() - 1.5) * (random.NextDouble() < 0.1 ? 3 : 1);
        var (mean, variance) = (residuals.Average(), 0.0);
        foreach (var z in residuals) variance += (z - mean) * (z - mean) / Days;
        for (var t = 0; t < Days; t++) residuals[t] = (residuals[t] - mean) / Math.Sqrt(variance);
        var law = new FilteredHistoryLaw(Days, residuals, [EwmaVariance.AsProcess(0.94)], [s_deviation * s_deviation], [], residuals.Max(Math.Abs));
        var losses = residuals.Select(z => 1 - Math.Exp(s_deviation * z)).OrderDescending().ToArray();
        return new(name, PlanOf(new(), 1) with { Law = law }, losses[19], (losses.Take(48).Sum() + (0.75 * losses[48])) / 48.75, IsAtom: true);
    }

    private static RevaluationPlan PlanOf(ModelSettings model, int days)
    {
        var snapshot = new Snapshot
        {
            AsOf = s_asOf,
            Settings = new() { Model = model with { Covariance = CovarianceEstimator.Given, Drift = DriftKind.Explicit, Drifts = new Dictionary<string, double> { ["X"] = Mu } }, Measures = [new(MeasureKind.Var, new(0.99m), new(days))] },
            Books = [new("ALL", null, "All", "EUR")],
            Factors = [new("X", FactorClass.Equity, ShockKind.Lognormal, "EUR")],
            Observations = ObservationHistory.From(["X"], [new(s_asOf, "X", 1)]),
            Adjustments = [],
            Holidays = [],
            Instruments = new Dictionary<string, Instrument> { ["UNIT"] = new Spot("X") { Name = "UNIT", Currency = "EUR" } },
            Positions = [new("ALL", "UNIT", 1)],
            Limits = [],
            ProfitAndLoss = [],
            Covariance = [new("X", "X", s_deviation * s_deviation)],
            Hash = SnapshotHash.Of([]),
        };
        var calibrated = Calibrator.Calibrate(snapshot);
        var tree = BookTree.Build(snapshot.Books).Tree!;
        var binder = new InstrumentBinder(tree.ReportingCurrency, calibrated.Factors, new ClosingLevels(snapshot));
        var lines = LineValuation.Of(snapshot.Positions, snapshot.Instruments, binder, calibrated.Levels, s_asOf);
        return new PlanCompiler(tree, calibrated, binder.Currencies, [new Horizon(days)]).Compile(1, lines);
    }
}
