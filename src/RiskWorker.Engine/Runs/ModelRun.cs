using RiskWorker.Domain.Books;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Pricing.Ageing;

namespace RiskWorker.Engine.Runs;

/// <summary>One model on the lines of a date: compiled and simulated.</summary>
internal sealed class ModelRun
{
    private ModelRun(CalibratedModel model, RevaluationPlan plan, IReadOnlyList<MeasureSpec> measures, LookOutcome outcome) =>
        (Model, Plan, Measures, Outcome) = (model, plan, measures, outcome);

    /// <summary>The model.</summary>
    public CalibratedModel Model { get; }

    /// <summary>What it was compiled to.</summary>
    public RevaluationPlan Plan { get; }

    /// <summary>What was measured.</summary>
    public IReadOnlyList<MeasureSpec> Measures { get; }

    /// <summary>What was drawn.</summary>
    public LookOutcome Outcome { get; }

    /// <summary>The model after calibration, for the record.</summary>
    public CalibrationSummary Calibration => new()
    {
        Shocks = Model.Shocks,
        DroppedDays = Model.DroppedDays.Count,
        From = Model.From,
        To = Model.To,
        Factors = Model.Factors.Count,
        Still = Model.Factors.Count - Model.Moving.Length,
        Rank = Model.Rank,
        RepairDistance = Model.RepairDistance,
        Parameters = [.. Model.Parameters, .. Model.Law.Parameters(Model)],
        Plan = Plan.Hash,
    };

    /// <summary>The plan of <paramref name="model"/>.</summary>
    public static RevaluationPlan PlanOf(ModelLines lines, CalibratedModel model, SimulationSettings settings) =>
        new PlanCompiler(lines.Tree, model, lines.Currencies, lines.Measures.Select(m => m.Horizon)).Compile(settings.Seed, lines.Values, lines.Threads, model.Ages ? lines.Ageing : null, lines.Cancellation);

    /// <summary>Runs <paramref name="model"/>.</summary>
    /// <param name="lines">What is held, and how to run it.</param>
    /// <param name="model">The model.</param>
    /// <param name="limits">Limits to decide; without any the run looks once.</param>
    /// <param name="settings">Scenarios and looks.</param>
    public static ModelRun Of(ModelLines lines, CalibratedModel model, IReadOnlyList<Limit> limits, SimulationSettings settings)
    {
        var plan = PlanOf(lines, model, settings);
        var outcome = new LookedRun(lines.Tree, plan, limits, lines.Measures, settings).Run(lines.Threads, lines.Progress, lines.Cancellation);
        var cascades = LiquidityCascades.Of(lines, model.Factors, plan, outcome, settings);
        return new(model, plan, lines.Measures, cascades.Count == 0 ? outcome : outcome with { Measures = outcome.Measures.With(cascades) });
    }
}

/// <summary>What every model of a run is run on, and with.</summary>
/// <param name="Tree">The books.</param>
/// <param name="Currencies">The currencies known.</param>
/// <param name="Values">The lines, valued.</param>
/// <param name="Ageing">What the instruments turn into by a horizon, for models that move the valuation date; null where none does.</param>
/// <param name="Measures">The measures.</param>
/// <param name="Threads">Threads to use.</param>
/// <param name="Progress">Told how far it has come, or null.</param>
/// <param name="Cancellation">Stops it.</param>
internal sealed record ModelLines(
    BookTree Tree, CurrencyTable Currencies, IReadOnlyList<LineValue> Values, BookAgeing? Ageing, IReadOnlyList<MeasureSpec> Measures, int Threads, IProgress<RunProgress>? Progress, CancellationToken Cancellation);
