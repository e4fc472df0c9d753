using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>The last page: model, parameters, conventions, hashes, cautions.</summary>
internal static class MethodSection
{
    public static IReadOnlyList<Block> Blocks(RunReading run) =>
    [
        new Heading("Method"),
        new Columns(
            [new Heading("Model", 3), ModelFacts.Of(run.Record.Settings.Model, run.Results.Calibration)],
            [new Heading("Simulation", 3), Simulation(run)],
            0.54),
        .. ParameterTables.OfRecord(run),
        new Heading("Conventions", 3),
        Conventions(run),
        .. RulesSection.Blocks(run),
        .. MethodsTable.Blocks(run),
        new Heading("Hashes", 3),
        Identity.Full(run),
        new Heading("Cautions", 3),
        .. Cautions(run.Record.Settings.Model),
    ];

    private static Facts Simulation(RunReading run)
    {
        var settings = run.Record.Settings.Simulation;
        if (run.Results.Simulation is not { } drawn)
            return new Facts([new("Scenarios", "none")]);

        var precision = drawn.PrecisionReached is { } reached
            ? $"{Numerals.Percent(settings.Precision ?? 0, 2)} wanted, {(reached ? "reached" : "not reached at the cap")}"
            : "none asked for";
        if (run.IsHistory)
            return new Facts([new("Scenarios", Identity.Scenarios(run.Record.Settings.Model, drawn)), new("Interval level", $"{Phrases.Level(drawn.Level)}, each figure alone"), .. Run(run)]);

        return new Facts(
        [
            new("Scenarios", $"{Numerals.Count(drawn.Scenarios)} used, at most {Numerals.Count(settings.Cap)}"),
            new("Seed", drawn.Seed.ToString(System.Globalization.CultureInfo.InvariantCulture)),
            new("Looks", $"{Numerals.Count(drawn.Looks)} of {Numerals.Count(drawn.LooksPlanned)}"),
            new("Interval level", $"{Phrases.Level(drawn.Level)}, each figure alone"),
            new("Precision", precision),
            .. Run(run),
        ]);
    }

    private static Fact[] Run(RunReading run) =>
    [
        new("Made", Phrases.Utc(run.Record.Started, run.Record.Finished)),
        new("Version", $"{run.Record.Version}, numerics epoch {Numerals.Count(run.Record.Epoch)}"),
    ];

    private static Facts Conventions(RunReading run) => new(
    [
        new("Loss", "L = −(V(h) − V(0)), in the currency of the figure: a positive figure is a loss."),
        new("VaR", run.IsWeighted
            ? "the smallest loss such that the losses beyond it weigh at most 1 − α, days weighted by age."
            : "the smallest l with P(L ≤ l) ≥ α: the ceil(N α)-th smallest of N losses, ties by scenario number."),
        new("ES", run.IsWeighted
            ? "the mean of the worst losses up to a weight of 1 − α, the loss at the boundary weighted by the part needed."
            : "the mean of the worst N (1 − α) losses, the loss at the boundary weighted by the fraction needed (Acerbi and Tasche 2002)."),
        .. run.Specs.Any(spec => spec.Kind == MeasureKind.Les)
            ? [new Fact("LES", "expected shortfall with each factor at its liquidity horizon, by the cascade of MAR33; the horizon printed is the base.")] : (Fact[])[],
        new("Intervals", Intervals(run)),
        new("Revaluation", Revaluation(run)),
        new("Horizon", $"{ModelWords.Horizon(run.Record.Settings.Model)} {ModelWords.Ageing(run.Record.Settings.Model)}"),
        new("Shocks", "ln(S(t) / S(t−1)) for prices, differences for rates; only between consecutive observed business days of a factor's calendar."),
        new("Exceptions", "loss strictly greater than the VaR of the previous close; a missing VaR or P&L counts. Hypothetical P&L: yesterday's positions at today's prices"
            + (run.Record.Settings.TimeEffectsIncluded ? ", the valuation date moved too." : ", the valuation date held.")),
        new("Curves", run.Record.Settings.CurveInterpolation == CurveInterpolation.LinearZero
            ? "zero rates linear in time between two tenors, flat beyond the first and the last."
            : "discount factors log-linear in time between two tenors (constant forward rates), zero rates flat beyond the first and the last."),
        new("Year", "252 business days; option time in calendar days / 365."),
    ]);

    private static string Intervals(RunReading run)
    {
        const string Formulas = "of VaR: distribution-free, from order statistics of the binomial; of ES: asymptotic variance (Manistre and Hancock 2005).";
        return !run.IsHistory ? Formulas
            : run.IsWeighted ? "none: past days are no draws, and days of different weight are no sample of equal draws."
            : $"none of simulation, since past days are no draws. As a sample of independent days, over one day alone, {Formulas}";
    }

    private static string Revaluation(RunReading run)
    {
        const string Unscaled = "the measure is never scaled from another horizon.";
        if (run.Results.Simulation?.Surfaces is not { } surfaces) return $"every position valued anew in every scenario at the horizon; {Unscaled}";
        if (surfaces == SurfaceSummary.Refused) return $"every position valued anew in every scenario at the horizon, since on the scenarios that check it a price surface lay outside its bound; {Unscaled}";
        var drawn = $"{Phrases.Plural(surfaces.Count, "price surface")} stand for {Numerals.Count(surfaces.Options)} options beyond the first 4,096 scenarios (error checked on a grid and on these)";
        return run.Record.Settings.Simulation.ExactTail
            ? $"{drawn}; {Numerals.Count(surfaces.Revalued)} of {Numerals.Count(surfaces.Scenarios)} scenarios by node might belong to a tail and were revalued fully: VaR, ES and their intervals "
                + $"are those of full revaluation to the last bit. Mean, deviation and histogram come from the surfaces; {Unscaled}"
            : $"{drawn}; the settings leave the tails to them, so all figures carry their error; {Unscaled}";
    }

    private static IEnumerable<Block> Cautions(ModelSettings model) =>
    [
        new Paragraph($"These figures are estimates of a model from past prices, not guarantees: losses beyond them occur. {ModelCautions.Sentences(model)} Nothing here prices the cost of leaving a position."),
        new Paragraph("This report is no investment advice. Local regulation, the firm's own risk policy and its qualified staff come first."),
        new Paragraph("Designed with reference to: Delegated Regulations (EU) 2024/1085 and 2022/2059, Regulation (EU) 575/2013 Article 325bf. No conformity is claimed.", Voice.Note),
    ];
}
