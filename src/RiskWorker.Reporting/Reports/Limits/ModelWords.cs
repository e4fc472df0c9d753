using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>A model's settings in words.</summary>
internal static class ModelWords
{
    /// <summary>One line: name, kind, how it is found, and whether it ages.</summary>
    public static string Line(ModelSettings model) => $"{Name(model)}, {Estimation(model)}{(model.Ages ? ", the valuation date moved by the horizon" : "")}";

    /// <summary>The name with the kind behind it, unless the name is the kind's.</summary>
    public static string Name(ModelSettings model)
    {
        var kind = ModelKinds.NameOf(model.Kind);
        return model.Name == kind ? kind : $"{model.Name} ({kind})";
    }

    /// <summary>The model whose moves a scenario makes: of a stressed one, the model that it calibrates.</summary>
    public static ModelSettings Moves(ModelSettings model) => model is { Kind: ModelKind.Stressed, Stressed: { } calibrated } ? calibrated : model;

    /// <summary>How a kind is spoken of.</summary>
    public static string Kind(ModelKind kind) => kind switch
    {
        ModelKind.Lognormal => "log-normal",
        ModelKind.StudentT => "Student t",
        ModelKind.Historical => "historical simulation",
        ModelKind.FilteredHistorical => "filtered historical simulation",
        ModelKind.JumpDiffusion => "jump-diffusion",
        ModelKind.Stressed => "stressed",
        _ => ModelKinds.NameOf(kind),
    };

    /// <summary>What a model is found from, and how.</summary>
    public static string Estimation(ModelSettings model) => model.Kind switch
    {
        ModelKind.StudentT => $"{Covariance(model)}, {Freedom(model)}{(model.Margins == StudentMargins.Own ? ", own margins" : "")}",
        ModelKind.Historical => $"the moves of {Phrases.Plural(model.Window, "day")}, {AgeWeights(model)}",
        ModelKind.FilteredHistorical => $"residuals of {Phrases.Plural(model.Window, "day")}, volatility by {Filter(model)}",
        ModelKind.JumpDiffusion => $"{Covariance(model)}, {Jumps(model)}",
        ModelKind.Stressed => $"calibrated to the worst {Phrases.Plural(model.Span, "day")} of the history: {Base(model)}",
        _ => Covariance(model),
    };

    public static string Covariance(ModelSettings model) => model.Covariance switch
    {
        CovarianceEstimator.Ewma => $"exponential weights {Decay(model.Lambda)} over {Phrases.Plural(model.Window, "day")}",
        CovarianceEstimator.Equal => $"equal weights over {Phrases.Plural(model.Window, "day")}",
        CovarianceEstimator.Shrunk => $"equal weights over {Phrases.Plural(model.Window, "day")}, the correlation shrunk towards independence",
        _ => "given covariance",
    };

    public static string Drift(ModelSettings model) => model.Drift switch
    {
        DriftKind.Zero => "zero expected return (log-drift minus half the variance)",
        DriftKind.Historical => "the mean shock of the window",
        _ => $"given for {Phrases.Plural(model.Drifts.Count, "factor")}, zero for the others",
    };

    public static string Missing(ModelSettings model) => model.MissingDays == MissingDays.Pairwise
        ? "every pair of factors uses the days that both have"
        : "only days on which every factor moved are used";

    public static string Freedom(ModelSettings model) =>
        model.DegreesOfFreedom is { } given ? $"{Significant.Text(given)} degrees of freedom" : "degrees of freedom by profile likelihood";

    public static string Margins(ModelSettings model) => model.Margins == StudentMargins.Own
        ? "each factor its own degrees of freedom, joined by a t copula"
        : "one number of degrees of freedom for all factors: the multivariate t";

    public static string AgeWeights(ModelSettings model) => model.AgeWeight is { } decay ? $"weights falling by {Decay(decay)} a day" : "all of one weight";

    public static string Filter(ModelSettings model) => model.Volatility == VolatilityFilter.Garch
        ? "a GARCH(1,1) fitted by maximum likelihood"
        : $"exponential weights {Decay(model.Lambda)}";

    public static string Jumps(ModelSettings model) => !model.Jumps.AreGiven
        ? $"jumps found in the history: shocks beyond {Significant.Text(model.Jumps.Threshold)} deviations"
        : string.Join(" and ", ((string?[])
        [
            model.Jumps.CommonPerYear is { } rate ? $"common jumps of {Phrases.Plural(model.Jumps.Common.Count, "factor")}, {Significant.Text(rate)} a year" : null,
            model.Jumps.Own.Count > 0 ? $"own jumps of {Phrases.Plural(model.Jumps.Own.Count, "factor")}" : null,
        ]).OfType<string>()) + ", as given";

    /// <summary>What a horizon of several days is made of.</summary>
    public static string Horizon(ModelSettings model) => model.Kind switch
    {
        ModelKind.Stressed when Moves(model) != model => Horizon(Moves(model)),
        ModelKind.Historical => "h days are the sum of h consecutive days of the history, so scenarios of more than one day share days.",
        ModelKind.FilteredHistorical => "each of h days draws a past day anew, all factors together, and scales its residuals to volatilities that every day of the path updates.",
        ModelKind.StudentT => "h days have h times the daily covariance; each day has a mixing variable of its own.",
        ModelKind.JumpDiffusion => "h days have h times the daily covariance and h times as many jumps, days taken as independent.",
        _ => "h days have h times the daily covariance, days taken as independent.",
    };

    public static string Ageing(ModelSettings model) => !model.Ages
        ? "The shock is instantaneous: nothing expires or pays inside the horizon."
        : "The valuation date moves by the horizon (Monday to Friday): what expires, pays or is fixed inside does so at a close on the way there, a Brownian bridge of all factors; "
            + "what is paid counts in V(h), as cash in its own currency without interest. Sensitivities are instantaneous.";

    /// <summary>The model that a stressed one calibrates, by its name.</summary>
    private static string Base(ModelSettings model) => model.Stressed is { } calibrated ? Name(calibrated) : "another model";

    private static string Decay(double weight)
    {
        var decimals = 2;
        while (decimals < 6 && Math.Abs((weight * Scale(decimals)) - Math.Round(weight * Scale(decimals))) > 1e-9 * Scale(decimals))
            decimals++;

        return Numerals.Fixed(weight, decimals);
    }

    private static double Scale(int decimals) => decimals switch { 2 => 1e2, 3 => 1e3, 4 => 1e4, 5 => 1e5, _ => 1e6 };
}
