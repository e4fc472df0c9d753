using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>The model of record on the method page: of each kind what applies to it, and nothing else.</summary>
internal static class ModelFacts
{
    public static Facts Of(ModelSettings model, CalibrationSummary? fit)
    {
        var facts = new List<Fact> { new("Name, kind", $"{model.Name}, {ModelKinds.NameOf(model.Kind)}") };
        var found = ModelWords.Moves(model);
        if (found != model)
            facts.Add(new("Calibrates", $"{ModelWords.Name(found)}, to the {Phrases.Plural(model.Span, "day")} of the history that are worst for the top node"));
        facts.AddRange(Settings(found));
        if (fit is not null)
            facts.AddRange(Fit(found, fit));
        return new Facts(facts);
    }

    /// <summary>Whether a kind's moves have a covariance and a drift; past days are used as they are.</summary>
    public static bool HasCovariance(ModelKind kind) => kind is not (ModelKind.Historical or ModelKind.FilteredHistorical);

    private static IEnumerable<Fact> Settings(ModelSettings model)
    {
        if (HasCovariance(model.Kind))
        {
            yield return new("Covariance", ModelWords.Covariance(model));
            yield return new("Drift", ModelWords.Drift(model));
        }

        switch (model.Kind)
        {
            case ModelKind.StudentT:
                yield return new("Freedom", ModelWords.Freedom(model));
                yield return new("Margins", ModelWords.Margins(model));
                break;
            case ModelKind.Historical:
                yield return new("Moves", $"the joint moves of {Phrases.Plural(model.Window, "day")} as they were, no drift taken out or put in");
                yield return new("Weights", model.AgeWeight is null ? "all days of one weight" : $"{ModelWords.AgeWeights(model)} (Boudoukh, Richardson and Whitelaw 1998)");
                break;
            case ModelKind.FilteredHistorical:
                yield return new("Moves", $"residuals of {Phrases.Plural(model.Window, "day")}, scaled to the volatility of today (Barone-Adesi, Giannopoulos and Vosper 1999)");
                yield return new("Volatility", ModelWords.Filter(model) + (model.Volatility == VolatilityFilter.Garch ? " (Bollerslev 1986)" : ""));
                break;
            case ModelKind.JumpDiffusion:
                yield return new("Jumps", $"{ModelWords.Jumps(model)} (Merton 1976)");
                break;
        }
    }

    private static IEnumerable<Fact> Fit(ModelSettings model, CalibrationSummary fit)
    {
        var isEstimated = !HasCovariance(model.Kind) || model.Covariance != CovarianceEstimator.Given;
        if (isEstimated || fit.Shocks > 0)
            yield return new("Shocks", Data(fit));
        if (isEstimated)
            yield return new("Missing days", $"{ModelWords.Missing(model)}; {Phrases.Plural(fit.DroppedDays, "day")} {(model.MissingDays == MissingDays.Pairwise ? "incomplete" : "dropped")}");
        yield return new("Factors", $"{Numerals.Count(fit.Factors)}, of them {Numerals.Count(fit.Still)} without any move");
        if (HasCovariance(model.Kind))
            yield return new("Correlation", $"rank {Numerals.Count(fit.Rank)}; " + (fit.RepairDistance is { } distance ? $"repaired, Frobenius distance {Numerals.Fixed(distance, 6)}" : "no repair needed"));
    }

    /// <summary>Days of shocks and their span.</summary>
    public static string Data(CalibrationSummary fit) => $"{Phrases.Plural(fit.Shocks, "day")}{(Span(fit) is { Length: > 0 } span ? ", " + span : "")}";

    /// <summary>The first and last date of the shocks; empty where there is none.</summary>
    public static string Span(CalibrationSummary fit) => fit is { From: { } from, To: { } to } ? $"{Numerals.Date(from)} to {Numerals.Date(to)}" : "";
}
