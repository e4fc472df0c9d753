using RiskWorker.Domain.Runs;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>Where each kind of model should not be trusted.</summary>
internal static class ModelCautions
{
    /// <summary>Whole sentences for the cautions of the method page.</summary>
    public static string Sentences(ModelSettings model) => model.Kind switch
    {
        ModelKind.Lognormal => "A log-normal model has thinner tails than markets show, and correlations rise when they matter.",
        ModelKind.StudentT => "A Student-t model has the same tails for gains as for losses"
            + (model.Margins == StudentMargins.Common ? ", and one thickness of tail for all factors. " : ". ")
            + "Its mixing variable is capped at its 1e−7 quantile, since the exponential of a t variable has no mean; for the same reason the log-drift −σ²/2 is a convention, not a zero expected return. Correlations rise when they matter.",
        ModelKind.Historical => "Historical simulation knows only moves that happened in its window: what did not happen there has no scenario, and the far tail rests on a handful of days."
            + (model.AgeWeight is null ? "" : " With weights by age it rests on fewer still."),
        ModelKind.FilteredHistorical => "Filtered historical simulation knows only residuals of its window, and is as good as the filter that says how volatile each day was.",
        ModelKind.JumpDiffusion => (model.Jumps.AreGiven ? "The jumps of this model were given, not estimated." : "Jumps are few in any history: their rate and size rest on a handful of days.")
            + " Between jumps its tails are normal, and correlations rise when they matter.",
        ModelKind.Stressed => "A stressed model says what today's positions would face in the worst span of the known history. It is no forecast, and no worst case: worse spans than those on record can come."
            + (model.Stressed is { } calibrated ? " " + Sentences(calibrated) : ""),
        _ => "",
    };

    /// <summary>What a model does not know, for page 1.</summary>
    public static string Unknown(ModelSettings model) => model.Kind switch
    {
        ModelKind.Lognormal => "jumps, changing volatility within the horizon",
        ModelKind.StudentT => "changing volatility within the horizon, tails that differ between gains and losses",
        ModelKind.Historical => "moves that did not happen in its window",
        ModelKind.FilteredHistorical => "residuals that did not happen in its window",
        ModelKind.JumpDiffusion => "changing volatility within the horizon, jumps unlike those that it was given or found",
        ModelKind.Stressed => "spans worse than any in the history",
        _ => "moves unlike those that it was calibrated to",
    };
}
