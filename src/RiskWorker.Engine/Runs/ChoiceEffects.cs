using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Plans;

namespace RiskWorker.Engine.Runs;

/// <summary>Tries the choices behind the model of record the other way, on the pilot's draws, and the classes of factors one by one.</summary>
internal sealed class ChoiceEffects
{
    private static readonly Horizon s_oneDay = new(1);

    private readonly ModelLines _lines;
    private readonly ModelSettings _model;
    private readonly ModelCalibration _calibration;
    private readonly ModelRun _run;
    private readonly SimulationSettings _settings;
    private readonly List<MeasureSpec> _measures;

    private ChoiceEffects(ModelLines lines, RunSettings settings, ModelCalibration calibration, ModelRun run)
    {
        (_lines, _model, _calibration, _run) = (lines, settings.Model, calibration, run);
        var scenarios = Math.Min(settings.Simulation.Scenarios, LossSampler.PilotScenarios);
        _settings = settings.Simulation with { Scenarios = scenarios, Cap = scenarios, Looks = 1, Precision = null };
        _measures = [.. lines.Measures.Where(m => m.Kind != MeasureKind.Les)];
    }

    /// <summary>The effects on the top node.</summary>
    /// <param name="lines">What is held.</param>
    /// <param name="settings">The model of record, and how to simulate.</param>
    /// <param name="calibration">Calibrates it otherwise.</param>
    /// <param name="run">The run of the model of record.</param>
    public static RunEffects Of(ModelLines lines, RunSettings settings, ModelCalibration calibration, ModelRun run) => new ChoiceEffects(lines, settings, calibration, run).All();

    private RunEffects All()
    {
        var (asIs, scenarios) = Measured(_run.Plan);
        return new()
        {
            Scenarios = scenarios,
            Choices = [.. Alternatives().Select(other => Choice(asIs, other)).OfType<ChoiceEffect>()],
            Classes = [.. Classes(asIs)],
            RootsOfTime = [.. RootsOfTime()],
            Fills = _model.Kind == ModelKind.Stressed ? [] : _calibration.FillEffects(_model),
        };
    }

    private IEnumerable<(string Choice, string Instead, ModelSettings Model, bool IsAroundMean)> Alternatives()
    {
        if (_model.Kind is ModelKind.Historical or ModelKind.FilteredHistorical or ModelKind.Stressed) yield break;
        const string Zero = "zero expected return", Mean = "the mean shock of the window as drift";
        var isEstimated = _model.Covariance != CovarianceEstimator.Given;
        if (_model.Drift == DriftKind.Zero) yield return (Zero, Mean, _model with { Drift = DriftKind.Historical }, false);
        else yield return (_model.Drift == DriftKind.Historical ? Mean : "drift as given", Zero, _model with { Drift = DriftKind.Zero, Drifts = new SortedDictionary<string, double>(StringComparer.Ordinal) }, false);
        if (isEstimated && _model.MissingDays == MissingDays.Complete) yield return ("covariance around zero", "covariance around the mean", _model, true);
        if (!isEstimated || _model.Covariance == CovarianceEstimator.Shrunk || (_run.Model.DroppedDays.Count == 0 && _model.MissingDays == MissingDays.Complete)) yield break;
        const string Complete = "days complete over all factors", Pairwise = "every pair of factors over its own days";
        if (_model.MissingDays == MissingDays.Complete) yield return (Complete, Pairwise, _model with { MissingDays = MissingDays.Pairwise }, false);
        else yield return (Pairwise, Complete, _model with { MissingDays = MissingDays.Complete }, false);
    }

    // What cannot be estimated otherwise has no effect to show.
    private ChoiceEffect? Choice(IReadOnlyList<double> asIs, (string Choice, string Instead, ModelSettings Model, bool IsAroundMean) other)
    {
        CalibratedModel model;
        try
        {
            model = _calibration.Of(other.Model, isAroundMean: other.IsAroundMean);
        }
        catch (CalibrationException)
        {
            return null;
        }
        var values = Measured(_run.Plan with { Moves = FactorMoves.Of(model), Law = model.Law }).Values;
        return new(other.Choice, other.Instead, Paired(asIs, values));
    }

    private IEnumerable<ClassEffect> Classes(IReadOnlyList<double> asIs)
    {
        var factors = _run.Model.Factors;
        FactorClass[] moving = [.. _run.Model.Moving.Select(j => factors[j].Class).Distinct().Order()];
        if (moving.Length < 2) yield break;
        foreach (var one in moving)
            yield return new(one, Paired(asIs, Measured(_run.Plan with { Moves = _run.Plan.Moves.Only(j => factors[j].Class == one) }).Values));
    }

    private IEnumerable<RootOfTime> RootsOfTime()
    {
        var longer = _measures.Where(m => m.Horizon.Days > 1).ToList();
        if (longer.Count == 0) yield break;
        var outcome = _run.Plan.Horizons.Contains(s_oneDay) ? _run.Outcome : OneDay([.. longer.Select(OneDay).Distinct()]);
        foreach (var spec in longer)
        {
            yield return new(spec, _run.Outcome.Measures.Of(0, spec, _run.Outcome.Level).Value,
                outcome.Measures.Of(0, OneDay(spec), outcome.Level).Value * Math.Sqrt(spec.Horizon.Days));
        }
    }

    private static MeasureSpec OneDay(MeasureSpec spec) => spec with { Horizon = s_oneDay };

    // Where nothing is measured over one day it is drawn for the comparison.
    private LookOutcome OneDay(IReadOnlyList<MeasureSpec> measures)
    {
        var plan = ModelRun.PlanOf(_lines with { Measures = measures }, _run.Model, _settings);
        return new LookedRun(_lines.Tree, plan, [], measures, _settings).Run(_lines.Threads, null, _lines.Cancellation);
    }

    private PairedMeasure[] Paired(IReadOnlyList<double> asIs, IReadOnlyList<double> otherwise) => [.. _measures.Select((spec, i) => new PairedMeasure(spec, asIs[i], otherwise[i]))];

    private (IReadOnlyList<double> Values, int Scenarios) Measured(RevaluationPlan plan)
    {
        _lines.Cancellation.ThrowIfCancellationRequested();
        var outcome = new LookedRun(_lines.Tree, plan, [], _measures, _settings).Run(_lines.Threads, null, _lines.Cancellation);
        return ([.. _measures.Select(m => outcome.Measures.Of(0, m, outcome.Level).Value)], outcome.Simulation.Scenarios);
    }
}
