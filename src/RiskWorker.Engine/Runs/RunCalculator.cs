using System.Diagnostics;
using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Checks;
using RiskWorker.Engine.Limits;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Sensitivities;

namespace RiskWorker.Engine.Runs;

/// <summary>
/// One run from snapshot to results: checks, calibration, plan, simulation by looks, measures, limits, sensitivities, exception counts.
/// A pure function of the snapshot; threads and progress change no bit.
/// </summary>
public sealed class RunCalculator
{
    private readonly Snapshot _snapshot;
    private readonly int _threads;
    private readonly IProgress<RunProgress>? _progress;
    private readonly CancellationToken _cancellation;
    private readonly List<Finding> _findings;

    /// <summary>Takes what the run needs.</summary>
    /// <param name="snapshot">The frozen inputs.</param>
    /// <param name="threads">Threads to use.</param>
    /// <param name="progress">Told how far the run has come, or null.</param>
    /// <param name="cancellation">Stops the run.</param>
    public RunCalculator(Snapshot snapshot, int threads, IProgress<RunProgress>? progress, CancellationToken cancellation)
    {
        (_snapshot, _threads, _progress, _cancellation) = (snapshot, threads, progress, cancellation);
        _findings = [.. snapshot.FeedWarnings.Select(w => FindingCodes.Under(snapshot.Settings.Checks, w))];
    }

    /// <summary>Seconds spent calibrating and simulating; the other phases are not this class's.</summary>
    public Timings Timings { get; private set; } = new(0, 0, 0, 0);

    /// <summary>Whether the run is evidence only: then it has no sensitivities and tries no other choices.</summary>
    public bool IsEvidenceOnly { get; init; }

    /// <summary>Runs.</summary>
    public RunResults Calculate()
    {
        _findings.AddRange(FeedChecks.Run(_snapshot));
        var (tree, _) = BookTree.Build(_snapshot.Books);
        if (tree is null || Blocked) return Failed(tree);
        var clock = Stopwatch.StartNew();
        var calibration = new ModelCalibration(_snapshot, LongestHorizon);
        var model = Calibrated(() => calibration.Of(_snapshot.Settings.Model));
        if (model is null) return Failed(tree);
        Timings = Timings with { Calibrate = clock.Elapsed.TotalSeconds };

        var valued = new BookValuation(_snapshot, tree, model);
        _findings.AddRange(ValuationChecks.Run(_snapshot, tree, valued.Today, valued.Previous));
        if (Blocked) return Failed(tree) with { Holdings = valued.Holdings };
        return Simulate(tree, model, valued, calibration);
    }

    // What no check foresaw: what a model asks of the history beyond the days that all of them need.
    private CalibratedModel? Calibrated(Func<CalibratedModel> calibrate)
    {
        try
        {
            return calibrate();
        }
        catch (CalibrationException refusal)
        {
            var name = _snapshot.Settings.Model.Name;
            _findings.Add(FindingCodes.ModelUnusable.Found(_snapshot.Settings.Checks, name, $"The model of record '{name}' cannot be calibrated: {refusal.Message}"));
            return null;
        }
    }

    private int LongestHorizon => _snapshot.Settings.Measures.Concat(_snapshot.ValidLimits.Select(l => l.Measure)).Max(m => m.Horizon.Days);

    private bool Blocked => _findings.Exists(f => f.Severity == FindingSeverity.Blocking);

    private RunResults Failed(BookTree? tree) => new() { Findings = FindingList.InOrder(_findings), Firm = tree is null ? null : FirmOf(tree) };

    private static FirmIdentity FirmOf(BookTree tree) => new(tree.Books[0].DisplayName, tree.ReportingCurrency);

    private RunResults Simulate(BookTree tree, CalibratedModel model, BookValuation valued, ModelCalibration calibration)
    {
        var valid = _snapshot.ValidLimits.ToLookup(l => tree.IndexOf(l.Book) >= 0 && (l.ReferenceBook is null || tree.IndexOf(l.ReferenceBook) >= 0));
        var limits = valid[true].ToList();
        var measures = _snapshot.Settings.Measures.Concat(limits.Select(l => l.Measure)).Distinct().Order().ToList();
        var clock = Stopwatch.StartNew();
        var isAged = _snapshot.Settings.Challengers.Prepend(_snapshot.Settings.Model).Any(m => m.Ages);
        var ageing = isAged ? valued.Ageing(_snapshot) : null;
        if (ageing is not null) _findings.AddRange(AgeingChecks.Run(ageing, tree, valued.Today, new(LongestHorizon), _snapshot.Settings.Checks));
        if (Blocked) return Failed(tree) with { Holdings = valued.Holdings }; // where the settings make such a finding block
        var lines = new ModelLines(tree, valued.Binder.Currencies, valued.Today, ageing, measures, _threads, _progress, _cancellation);
        // The levels of the newest span have valued the lines; the moves come from the worst one.
        var stressed = _snapshot.Settings.Model.Kind == ModelKind.Stressed ? Calibrated(() => StressedSpan.Find(lines, _snapshot.Settings.Model, calibration, _snapshot.Settings.Simulation)) : model;
        if (stressed is null) return Failed(tree) with { Holdings = valued.Holdings };
        model = stressed;
        var run = ModelRun.Of(lines, model, limits, _snapshot.Settings.Simulation);
        var (plan, outcome) = (run.Plan, run.Outcome);
        IReadOnlyList<Sensitivity> sensitivities = IsEvidenceOnly ? [] : BookSensitivities.Of(plan, model.Factors);
        Timings = Timings with { Simulate = clock.Elapsed.TotalSeconds };
        _findings.AddRange(UndecidableLimits.Of(outcome, limits, _snapshot.Settings.Checks));
        if (Blocked) return Failed(tree) with { Holdings = valued.Holdings }; // where the settings make that finding block
        var challengers = Challengers.Run(_snapshot.Settings, lines, calibration, _findings);
        if (Blocked) return Failed(tree) with { Holdings = valued.Holdings }; // where the settings make a challenger that fails block
        var effects = IsEvidenceOnly || challengers.Count == 0 ? null : ChoiceEffects.Of(lines, _snapshot.Settings, calibration, run);
        var hypothetical = HypotheticalProfits.Of(_snapshot, tree);
        var count = new ExceptionCount(_snapshot, tree, hypothetical);
        return new RunResults
        {
            Findings = FindingList.InOrder(_findings),
            Firm = FirmOf(tree),
            Calibration = run.Calibration,
            Simulation = outcome.Simulation,
            Nodes = NodeResults.Of(tree, plan, outcome, measures, _snapshot.Positions),
            Limits = [.. outcome.Limits.Concat(valid[false].Select(l => LimitEvaluator.WithoutBook(l, tree.ReportingCurrency, (double)outcome.Level))).OrderBy(l => l.Limit.Name, StringComparer.Ordinal)],
            Sensitivities = sensitivities,
            Models = challengers,
            Effects = effects,
            Hypothetical = hypothetical,
            Backtest = count.Results(measures),
            ModelBacktests = ModelBacktests.Of(count, _snapshot.Settings, tree, measures),
            Holdings = valued.Holdings,
            Methods = PricingMethods.Held(valued.Today, tree),
            Adjustments = model.Adjustments,
        };
    }
}
