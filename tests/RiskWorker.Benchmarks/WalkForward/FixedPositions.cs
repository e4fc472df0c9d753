using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Simulation;
using RiskWorker.Storage.Feed;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Benchmarks.WalkForward;

/// <summary>VaR 99% and ES 97.5% of the whole firm on one past day.</summary>
internal readonly record struct DayMeasures(DateOnly Date, MeasureResult Var, MeasureResult Es);

/// <summary>
/// Today's positions measured day by day on what was known then: the engine's calibration, plan and sampler for each day. As in NumPy,
/// only log-normal factors, and cash, spot, futures, forwards and European options at flat rates.
/// </summary>
internal sealed class FixedPositions
{
    private const decimal Level = 0.95m;

    private static readonly MeasureSpec s_var = new(MeasureKind.Var, new(0.99m), new(1));
    private static readonly MeasureSpec s_es = new(MeasureKind.Es, new(0.975m), new(1));

    private readonly TailDemand _demand = new([s_var, s_es], [Level]);
    private readonly Snapshot _today;
    private readonly BookTree _tree;
    private readonly int _scenarios;
    private readonly ulong _seed;

    public FixedPositions(string configFolder, int scenarios, ulong seed)
    {
        (_scenarios, _seed) = (scenarios, seed);
        _today = Plain(SnapshotOf(configFolder));
        _tree = BookTree.Build(_today.Books).Tree!;
    }

    /// <summary>The last <paramref name="days"/> dates with observations.</summary>
    public DateOnly[] Dates(int days) => _today.Observations.Dates[Math.Max(0, _today.Observations.Count - days)..].ToArray();

    /// <summary>Day after day, the scenarios of each over all cores.</summary>
    public DayMeasures[] DayByDay(DateOnly[] dates)
    {
        var workspace = new SimulationWorkspace(Environment.ProcessorCount);
        return Array.ConvertAll(dates, day => Measure(day, workspace));
    }

    /// <summary>As many days at a time as there are cores, each on one of them: for many days, where no single one is waited for.</summary>
    public DayMeasures[] SideBySide(DateOnly[] dates)
    {
        var (measures, next) = (new DayMeasures[dates.Length], -1);
        Parallel.For(0, Environment.ProcessorCount, _ =>
        {
            var workspace = new SimulationWorkspace(1);
            for (var i = Interlocked.Increment(ref next); i < dates.Length; i = Interlocked.Increment(ref next)) measures[i] = Measure(dates[i], workspace);
        });
        return measures;
    }

    /// <summary>One day, every book included; returns the firm's.</summary>
    private DayMeasures Measure(DateOnly day, SimulationWorkspace workspace)
    {
        var known = _today with { AsOf = day, Observations = _today.Observations.UpTo(day), Adjustments = [.. _today.Adjustments.Where(a => a.Date <= day)] };
        var model = Calibrator.Calibrate(known);
        var binder = new InstrumentBinder(_tree.ReportingCurrency, model.Factors);
        var lines = LineValuation.Of(known.Positions, known.Instruments, binder, model.Levels, day);
        var plan = new PlanCompiler(_tree, model, binder.Currencies, [s_var.Horizon]).Compile(_seed, lines);
        var sampler = new LossSampler(plan, workspace, _demand, new() { Scenarios = _scenarios }, null, CancellationToken.None);
        var measures = new NodeMeasures(plan, sampler.Look(_scenarios).Series);
        var all = Enumerable.Range(0, plan.Nodes.Count).Select(node => new DayMeasures(day, measures.Of(node, s_var, Level), measures.Of(node, s_es, Level))).ToList();
        return all[0];
    }

    private static Snapshot Plain(Snapshot all)
    {
        Factor[] factors = [.. all.Factors.Where(f => f.Shock == ShockKind.Lognormal)];
        var observations = new List<Observation>();
        foreach (var factor in factors)
        {
            var column = all.Observations.Column(all.Observations.ColumnOf(factor.Name));
            for (var t = 0; t < column.Length; t++)
            {
                if (!double.IsNaN(column[t])) observations.Add(new(all.Observations.Dates[t], factor.Name, column[t]));
            }
        }
        return all with
        {
            Factors = factors,
            Observations = ObservationHistory.From(factors.Select(f => f.Name), observations),
            Positions = [.. all.Positions.Where(p => IsPlain(all.Instruments[p.Instrument]))],
        };
    }

    private static bool IsPlain(Instrument instrument) => instrument switch
    {
        Cash or Spot or Future => true,
        Forward f => f.Curve?.Curve is null && f.Carry?.Curve is null,
        Option o => o.Style == ExerciseStyle.European && o.Curve?.Curve is null && o.Carry?.Curve is null,
        _ => false,
    };

    private static Snapshot SnapshotOf(string configFolder)
    {
        var folder = Directory.CreateTempSubdirectory("riskworker-walk-");
        try
        {
            using var store = RiskStore.Open(Path.Combine(folder.FullName, "store.db"));
            var outcome = FeedLoader.Load(Path.Combine(configFolder, "feed"), store, TimeProvider.System.GetUtcNow());
            if (outcome.Faults.Count > 0) throw new InvalidOperationException(string.Join('\n', outcome.Sentences()));
            var reader = new SnapshotReader(store);
            return reader.Take(reader.PositionDates[^1], new RunSettings(), "lognormal");
        }
        finally
        {
            folder.Delete(recursive: true);
        }
    }
}
