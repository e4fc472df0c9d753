using System.Globalization;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Plans;

namespace RiskWorker.Engine.Runs;

/// <summary>
/// The span of the history that is worst for the top node: the model is calibrated to spans all over it, and the one whose measure is
/// largest on the same few draws is taken. The grid is refined around the worst twice, down to single days; between the points of the
/// first grid a short peak may be missed.
/// </summary>
internal sealed class StressedSpan
{
    private const int Scenarios = 4_096;

    // Days between the spans tried, pass by pass.
    private static readonly int[] s_steps = [25, 5, 1];

    private readonly ModelLines _lines;
    private readonly ModelSettings _model;
    private readonly ModelCalibration _calibration;
    private readonly SimulationSettings _settings;
    private readonly MeasureSpec _measure;
    private readonly Dictionary<int, double> _tried = [];
    private int _used;

    private StressedSpan(ModelLines lines, ModelSettings model, ModelCalibration calibration, SimulationSettings settings)
    {
        (_lines, _model, _calibration, _measure) = (lines with { Progress = null }, model, calibration, lines.Measures.Select(m => m.Kind == MeasureKind.Les ? m with { Kind = MeasureKind.Es } : m).First());
        _settings = settings with { Scenarios = Scenarios, Looks = 1, Cap = Scenarios, Precision = null, Revaluation = RevaluationKind.Full };
    }

    /// <summary>The model calibrated to the worst span.</summary>
    /// <exception cref="CalibrationException">The history is shorter than one span.</exception>
    public static CalibratedModel Find(ModelLines lines, ModelSettings model, ModelCalibration calibration, SimulationSettings settings) =>
        new StressedSpan(lines, model, calibration, settings).Find();

    private CalibratedModel Find()
    {
        var days = _calibration.LastDays(_model.Stressed!, _model.Span);
        var models = Grid(days.Count, s_steps[0]).ToDictionary(i => i, i => _calibration.Of(_model, days[i]));
        var plan = Widest([.. models.Values]);
        foreach (var step in s_steps)
        {
            var around = _tried.Count == 0 ? Grid(days.Count, step) : Around(Worst(), days.Count, step);
            foreach (var i in around)
            {
                _lines.Cancellation.ThrowIfCancellationRequested();
                if (_tried.ContainsKey(i)) continue;
                if (!models.TryGetValue(i, out var candidate)) models[i] = candidate = _calibration.Of(_model, days[i]);
                _tried[i] = MeasureOf(plan, candidate);
            }
        }
        var worst = Worst();
        return models[worst] with { Parameters = [.. Parameters(days, worst), .. models[worst].Parameters] };
    }

    private IEnumerable<ModelParameter> Parameters(IReadOnlyList<DateOnly> days, int worst)
    {
        yield return new("days of the span", _model.Span, Note: string.Create(CultureInfo.InvariantCulture, $"the worst of {_tried.Count} spans tried, by {_measure} of the top node; it ends on {days[worst]:yyyy-MM-dd}"));
        yield return new($"{_measure} of the top node on the worst span", _tried[worst], Note: $"from {_used} scenarios");
        yield return new($"{_measure} of the top node on the newest span", _tried[days.Count - 1], Note: $"from {_used} scenarios");
    }

    // From the newest back, so that the newest is among them.
    private static IEnumerable<int> Grid(int count, int step) => Enumerable.Range(0, ((count - 1) / step) + 1).Select(k => count - 1 - (k * step));

    private static IEnumerable<int> Around(int worst, int count, int step) =>
        Enumerable.Range(-5, 11).Select(k => worst + (k * step)).Where(i => i >= 0 && i < count);

    // Ties to the newest.
    private int Worst() => _tried.OrderByDescending(t => t.Value).ThenByDescending(t => t.Key).First().Key;

    // Tables of prices are built once, wide enough for the widest of the spans.
    private RevaluationPlan Widest(CalibratedModel[] models)
    {
        var deviations = Enumerable.Range(0, models[0].Deviations.Length).Select(j => models.Max(m => m.Deviations[j])).ToArray();
        var widest = models[0] with { Deviations = deviations };
        return ModelRun.PlanOf(_lines, widest, _settings);
    }

    private double MeasureOf(RevaluationPlan plan, CalibratedModel candidate)
    {
        var moved = plan with { Moves = FactorMoves.Of(candidate), Law = candidate.Law };
        var outcome = new LookedRun(_lines.Tree, moved, [], [_measure], _settings).Run(_lines.Threads, null, _lines.Cancellation);
        _used = outcome.Simulation.Scenarios;
        return outcome.Measures.Of(0, _measure, outcome.Level).Value;
    }
}
