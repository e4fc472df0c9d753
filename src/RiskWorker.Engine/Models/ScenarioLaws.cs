using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Models;

/// <summary>From settings and shocks to the law of the joint moves.</summary>
internal static class ScenarioLaws
{
    /// <summary>Whether the law is estimated from shocks, whatever the covariance is from.</summary>
    public static bool NeedShocks(ModelSettings model) => model.Kind switch
    {
        ModelKind.Lognormal => false,
        ModelKind.StudentT => model.DegreesOfFreedom is null || model.Margins == StudentMargins.Own,
        ModelKind.JumpDiffusion => !model.Jumps.AreGiven,
        _ => true,
    };

    /// <summary>The law of <paramref name="model"/>.</summary>
    /// <param name="model">The settings.</param>
    /// <param name="window">The shocks; null where the model is estimated from none.</param>
    /// <param name="jumps">Jumps found in them, where they are wanted.</param>
    /// <param name="factors">The factors.</param>
    /// <param name="moving">The factors that move, in the order of the plan's rows.</param>
    /// <param name="deviations">Standard deviation of each factor.</param>
    /// <param name="longest">The longest horizon in days.</param>
    /// <exception cref="CalibrationException">The shocks do not suffice.</exception>
    public static ScenarioLaw Of(
        ModelSettings model, ShockWindow? window, JumpEstimation? jumps, IReadOnlyList<Factor> factors, int[] moving, double[] deviations, int longest)
    {
        return model.Kind switch
        {
            ModelKind.Lognormal => LognormalLaw.Instance,
            ModelKind.StudentT => StudentEstimation.Of(model, window, moving, deviations),
            ModelKind.FilteredHistorical => FilteredHistoryEstimation.Of(model, window!, moving),
            ModelKind.Historical => HistoricalLaw.Of(window!, moving, deviations, model, longest),
            ModelKind.JumpDiffusion => JumpEstimation.WithinReach(jumps?.Law(moving, deviations) ?? JumpEstimation.Given(model, factors, moving, deviations), model, longest),
            _ => throw new InvalidOperationException($"No law is known for {model.Kind}."),
        };
    }
}
