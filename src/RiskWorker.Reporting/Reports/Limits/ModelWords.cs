using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>A model's settings in words.</summary>
internal static class ModelWords
{
    /// <summary>One line: name, kind, covariance, and whether it ages.</summary>
    public static string Line(ModelSettings model)
    {
        var kind = ModelKinds.NameOf(model.Kind);
        var name = model.Name == kind ? kind : $"{model.Name} ({kind})";
        return $"{name}, {Covariance(model)}{(model.Ages ? ", the valuation date moved by the horizon" : "")}";
    }

    public static string Covariance(ModelSettings model) => model.Covariance switch
    {
        CovarianceEstimator.Ewma => $"exponential weights {Numerals.Fixed(model.Lambda, Decimals(model.Lambda))} over {Phrases.Plural(model.Window, "day")}",
        CovarianceEstimator.Equal => $"equal weights over {Phrases.Plural(model.Window, "day")}",
        _ => "given covariance",
    };

    public static string Drift(ModelSettings model) => model.Drift switch
    {
        DriftKind.Zero => "zero expected return (log-drift minus half the variance)",
        DriftKind.Historical => "the mean shock of the window",
        _ => $"given for {Phrases.Plural(model.Drifts.Count, "factor")}, zero for the others",
    };

    public static string Ageing(ModelSettings model) => !model.Ages
        ? "The shock is instantaneous: nothing expires or pays inside the horizon."
        : "The valuation date moves by the horizon (Monday to Friday): what expires, pays or is fixed inside does so at a close on the way there, a Brownian bridge of all factors; "
            + "what is paid counts in V(h), as cash in its own currency without interest. Sensitivities are instantaneous.";

    private static int Decimals(double lambda)
    {
        var decimals = 2;
        while (decimals < 6 && Math.Abs((lambda * Scale(decimals)) - Math.Round(lambda * Scale(decimals))) > 1e-9 * Scale(decimals))
            decimals++;

        return decimals;
    }

    private static double Scale(int decimals) => decimals switch { 2 => 1e2, 3 => 1e3, 4 => 1e4, 5 => 1e5, _ => 1e6 };
}
