using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>Page 1 on how sure the figures are: what their intervals cover, and what no interval does.</summary>
internal static class Certainty
{
    public static Paragraph Of(RunReading run) => (run.Results.Simulation, run.Root) switch
    {
        ({ } simulation, { } root) => new Paragraph(run.IsHistory ? History(run, root, simulation) : Simulated(run, root, simulation)),
        _ => new Paragraph("No scenario was drawn."),
    };

    private static RichText Simulated(RunReading run, NodeResult root, SimulationSummary simulation)
    {
        var widths = run.HeadlineSpecs.Select(spec => RunReading.Find(root.Measures, spec)!).Select(HalfWidth).OfType<string>().ToList();
        var looks = simulation.LooksPlanned > 1 ? $" Each of up to {Phrases.Number(simulation.LooksPlanned)} looks holds that level, so that stopping early does not spoil it." : "";
        return RichText.Of(
            new TextRun("Intervals hold simulation noise only", Strong: true),
            new TextRun($", at {Phrases.Level(simulation.Level)}, from {Numerals.Count(simulation.Scenarios)} scenarios"
                + (widths.Count > 0 ? $": {string.Join(", ", widths)}" : "")
                + ". They do not hold model or estimation error. A limit that lies inside its interval is called inconclusive." + looks));
    }

    private static RichText History(RunReading run, NodeResult root, SimulationSummary simulation)
    {
        var sampled = run.HeadlineSpecs.Select(spec => RunReading.Find(root.Measures, spec)!).Where(measure => measure.Sample is { } sample && sample != new SampleInterval(null, null)).ToList();
        var longer = run.Specs.Any(spec => spec.Horizon.Days > 1) ? " Above one day the scenarios share days and depend on each other, so no interval is claimed there." : "";
        var sample = run.IsWeighted
            ? " Days that weigh differently are no sample of equal draws, so no interval is claimed."
            : (sampled.Count > 0
                ? $" What so few days, taken as independent, allow at {Phrases.Level(sampled[0].Level)} stands apart from the status of limits, which the value decides: "
                    + string.Join(", ", sampled.Select(measure => $"{Phrases.Short(measure.Spec)} {Phrases.Interval(run.Scale(), measure.Sample!.Low, measure.Sample.High)}")) + $" {run.Scale().Unit}."
                : "") + longer;
        return RichText.Of(
            new TextRun("These figures have no simulation noise", Strong: true),
            new TextRun($": their {Numerals.Count(simulation.Scenarios)} scenarios are past days, none is drawn.{sample} Moves that did not happen in the window are in no figure."));
    }

    private static string? HalfWidth(MeasureResult measure) =>
        measure is { Low: { } low, High: { } high } && measure.Value != 0
            ? $"{Phrases.Short(measure.Spec)} ±{Numerals.Percent(Math.Abs((high - low) / (2 * measure.Value)), 1)}"
            : null;
}
