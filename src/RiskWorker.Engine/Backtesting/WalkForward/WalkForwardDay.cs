using RiskWorker.Domain.Books;
using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting.Evidence;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Models;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Simulation;

namespace RiskWorker.Engine.Backtesting.WalkForward;

/// <summary>
/// One day of a walk-forward: the model estimated from what was known at a close, its figures for the next one, and the profit that came.
/// A pure function of the snapshot and the next close; days may be computed in any order, on any thread.
/// </summary>
public sealed class WalkForwardDay
{
    private const decimal DeepestTail = 0.05m;
    private const int FactorsNamed = 3;
    private static readonly Horizon s_oneDay = new(1);

    private readonly BookTree _tree;
    private readonly IReadOnlyList<Confidence> _confidences;
    private readonly ActualProfits _actual;
    private readonly ClosingLevels _levels;

    /// <summary>Takes what all days share.</summary>
    /// <param name="whole">A snapshot that holds every observation and all profit, whatever its date.</param>
    /// <param name="tree">Its books.</param>
    /// <param name="confidences">Confidences, ascending.</param>
    public WalkForwardDay(Snapshot whole, BookTree tree, IReadOnlyList<Confidence> confidences) =>
        (_tree, _confidences, _actual, _levels) = (tree, confidences, new(whole, tree), new(whole));

    /// <summary>Computes a day.</summary>
    /// <param name="known">What was known at the close, with the positions to hold.</param>
    /// <param name="next">The next close.</param>
    /// <param name="workspace">Threads and buffers.</param>
    /// <param name="cancellation">Stops it.</param>
    /// <returns>Null where what was known is too little to estimate the model from: fewer days than the checks' minimum.</returns>
    public DayForecast? Of(Snapshot known, DateOnly next, SimulationWorkspace workspace, CancellationToken cancellation)
    {
        ArgumentNullException.ThrowIfNull(known);
        var settings = known.Settings;
        if (Calibrated(known) is not { } model) return null;
        var plan = Compiled(known, model, workspace.Threads, cancellation);
        var realised = new RealisedProfits(plan, model.Factors, _levels.At(next, known.AsOf));
        var theoretical = realised.Together();
        var scenarios = plan.Law.ScenarioCount ?? settings.Simulation.Scenarios;
        var sampler = new LossSampler(plan, workspace, TailDemandOf(plan), settings.Simulation with { Scenarios = scenarios, Revaluation = RevaluationKind.Full }, null, cancellation, Probes(plan, theoretical, next));
        var (record, sampled) = sampler.Look(scenarios);
        var books = new List<BookForecast>(_tree.Books.Count);
        for (var node = 0; node < _tree.Books.Count; node++) books.Add(Book(node, plan, sampler, record, SeriesOf(plan, record, sampled, RowOf(plan, node)), theoretical, next));
        return new(known.AsOf, next, scenarios, WithFactors(plan, model, realised, books));
    }

    /// <summary>The factors that cost books most from a close to the next when each moves alone, the costliest first.</summary>
    /// <param name="known">What was known at the close, with the positions held.</param>
    /// <param name="next">The next close.</param>
    /// <param name="books">The books.</param>
    /// <param name="cancellation">Stops it.</param>
    public IReadOnlyDictionary<string, IReadOnlyList<FactorAmount>> FactorsOf(Snapshot known, DateOnly next, IReadOnlyList<string> books, CancellationToken cancellation)
    {
        ArgumentNullException.ThrowIfNull(known);
        ArgumentNullException.ThrowIfNull(books);
        if (Calibrated(known) is not { } model) return new Dictionary<string, IReadOnlyList<FactorAmount>>();
        var plan = Compiled(known, model, 1, cancellation);
        var realised = new RealisedProfits(plan, model.Factors, _levels.At(next, known.AsOf));
        var alone = realised.Alone([.. books.Select(book => RowOf(plan, _tree.IndexOf(book)))]);
        return books.Index().ToDictionary(b => b.Item, b => (IReadOnlyList<FactorAmount>)Costliest(model, alone[b.Index]), StringComparer.Ordinal);
    }

    private static CalibratedModel? Calibrated(Snapshot known)
    {
        try
        {
            var model = Calibrator.Calibrate(known, ShockTable.From(known), known.Settings.Model, s_oneDay.Days);
            return known.Settings.Model.Covariance == CovarianceEstimator.Given || model.Shocks >= known.Settings.Checks.MinimumHistory ? model : null;
        }
        catch (CalibrationException)
        {
            return null;
        }
    }

    private RevaluationPlan Compiled(Snapshot known, CalibratedModel model, int threads, CancellationToken cancellation)
    {
        var settings = known.Settings;
        var binder = new InstrumentBinder(_tree.ReportingCurrency, model.Factors, new ClosingLevels(known), settings.Simulation.Seed, settings.CurveInterpolation);
        var lines = LineValuation.Of(known.Positions, known.Instruments, binder, model.Levels, known.AsOf);
        return new PlanCompiler(_tree, model, binder.Currencies, [s_oneDay]).Compile(settings.Simulation.Seed, lines, threads, null, cancellation);
    }

    // Losses to count against, for each row: the theoretical profit's, and the actual one's.
    private double[][] Probes(RevaluationPlan plan, double[] theoretical, DateOnly next) =>
        [.. plan.Rows.Select((row, i) => new[] { 0 - theoretical[i], _actual.Of(row.Node, next) is { } actual ? 0 - actual : double.PositiveInfinity })];

    private TailDemand TailDemandOf(RevaluationPlan plan) => plan.Law.ScenarioCount is not null ? TailDemand.Whole : new(
        _confidences.SelectMany(c => new MeasureSpec[] { new(MeasureKind.Var, c, s_oneDay), new(MeasureKind.Es, c, s_oneDay) }).Append(new(MeasureKind.Es, new(1 - DeepestTail), s_oneDay)), []);

    private static LossSeries SeriesOf(RevaluationPlan plan, TailRecord record, IReadOnlyList<SampledLoss> sampled, int row) =>
        plan.Law is HistoricalLaw law ? new HistoricalLoss(record.SortedTail(row), law.Weights, isOverlapping: false) : sampled[row];

    private static int RowOf(RevaluationPlan plan, int node)
    {
        var own = plan.Nodes[node].Currency != 0;
        for (var row = 0; row < plan.Rows.Count; row++)
        {
            if (plan.Rows[row].Node == node && plan.Rows[row].InOwnCurrency == own) return row;
        }
        throw new InvalidOperationException($"Node {node} has no series.");
    }

    private BookForecast Book(int node, RevaluationPlan plan, LossSampler sampler, TailRecord record, LossSeries series, double[] theoretical, DateOnly next)
    {
        var row = RowOf(plan, node);
        var sums = record.Sums.Total();
        var distribution = DistributionSummary.Of(s_oneDay, sums[row], sums[plan.Rows.Count + row], record.Histogram(row), sampler.Edges[row], series);
        return new()
        {
            Book = _tree.Books[node].Name,
            Levels = [.. _confidences.Select(c => new LevelForecast(c, Value(MeasureKind.Var, c), Value(MeasureKind.Es, c)))],
            Theoretical = theoretical[row],
            PTheoretical = ProbabilityOf(record.ProbeOf(row, 0, 2)),
            PActual = _actual.Of(node, next) is null ? null : ProbabilityOf(record.ProbeOf(row, 1, 2)),
            Tail = [.. distribution.Quantiles.TakeWhile(q => q.Probability <= (double)DeepestTail)],
        };

        // A list of scenarios has steps: where a profit stands in one is drawn.
        double ProbabilityOf(ProbeCount loss) => plan.Law.ScenarioCount is null
            ? Probability(loss, series.Count)
            : ForecastProbabilities.Randomised(loss.Beyond, loss.Equal, series.Count, ForecastProbabilities.Position(plan.Seed, next, node));

        double Value(MeasureKind kind, Confidence confidence) => series.Measure(new(kind, confidence, s_oneDay), 0.95m).Value;
    }

    // (scenarios at or below + 1/2) / (N + 1): never 0 or 1.
    private static double Probability(ProbeCount loss, int scenarios) => (loss.Beyond + loss.Equal + 0.5) / (scenarios + 1);

    // Only where a loss is beyond a VaR does anybody ask what it came from.
    private static List<BookForecast> WithFactors(RevaluationPlan plan, CalibratedModel model, RealisedProfits realised, List<BookForecast> books)
    {
        var beyond = Enumerable.Range(0, books.Count).Where(node => books[node].Levels.Any(level => -books[node].Theoretical > level.Var)).ToList();
        if (beyond.Count == 0) return books;
        var alone = realised.Alone([.. beyond.Select(node => RowOf(plan, node))]);
        for (var i = 0; i < beyond.Count; i++) books[beyond[i]] = books[beyond[i]] with { Factors = Costliest(model, alone[i]) };
        return books;
    }

    private static FactorAmount[] Costliest(CalibratedModel model, double[] alone) =>
        [.. alone.Select((amount, factor) => new FactorAmount(model.Factors[factor].Name, amount)).Where(f => f.Amount < 0)
            .OrderBy(f => f.Amount).ThenBy(f => f.Factor, StringComparer.Ordinal).Take(FactorsNamed)];
}
