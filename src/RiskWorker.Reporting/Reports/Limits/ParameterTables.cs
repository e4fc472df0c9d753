using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>What models are made from, and the numbers that they were fitted to or given.</summary>
internal static class ParameterTables
{
    private const int MostParameters = 24;

    /// <summary>The parameters of the model of record, for the method page; nothing where it has none.</summary>
    public static Block[] OfRecord(RunReading run) =>
        run.Results.Calibration is { Parameters: { Count: > 0 } parameters }
            ? [new Heading($"Parameters of {run.Record.Settings.Model.Name}", 3), Table([Group(parameters, null)])]
            : [];

    /// <summary>A row a model: kind, data, how it is found, scenarios.</summary>
    public static Table Models(IReadOnlyList<ModelReading> models) => new(
        [new("Model", 1.7), new("Made from", 3.2), new("Days", 0.7, Alignment.Right), new("Span", 2), new("Scenarios", 1, Alignment.Right)],
        [new RowGroup([.. models.Select(Row)])], "");

    /// <summary>The parameters of all models that have some, grouped by model; nothing where none has.</summary>
    public static Block[] Of(IReadOnlyList<ModelReading> models)
    {
        var groups = models.Where(model => model.Calibration is { Parameters.Count: > 0 }).Select(model => Group(model.Calibration!.Parameters, model.Name)).ToList();
        return groups.Count == 0 ? [] : [new Heading("What the models were fitted to or given", 3), Table(groups)];
    }

    private static Row Row(ModelReading model)
    {
        var fit = model.Calibration;
        return new(
        [
            new TextCell(model.IsRecord ? RichText.Strong(model.Name) : model.Name, ModelWords.Kind(model.Kind) + (model.IsRecord ? ", model of record" : "")),
            model.Settings is { } settings ? new TextCell(Phrases.Sentence(ModelWords.Estimation(settings)), Drift(settings)) : new TextCell(Numerals.Missing),
            fit is null ? Numerals.Missing : Numerals.Count(fit.Shocks),
            fit is null ? new TextCell("no figures") : new TextCell(ModelFacts.Span(fit) is { Length: > 0 } span ? span : Numerals.Missing, fit.DroppedDays == 0 ? "" : $"{Phrases.Plural(fit.DroppedDays, "day")} incomplete"),
            model.Simulation is { } drawn ? Numerals.Count(drawn.Scenarios) : Numerals.Missing,
        ]);
    }

    private static string Drift(ModelSettings settings)
    {
        var moves = ModelWords.Moves(settings);
        return moves.Kind == ModelKind.Historical ? "past moves as they were"
            : !ModelFacts.HasCovariance(moves.Kind) || moves.Drift == DriftKind.Zero ? ""
            : $"drift: {ModelWords.Drift(moves)}";
    }

    private static Table Table(IReadOnlyList<RowGroup> groups) => new(
        [new("Parameter", 2.4), new("Value", 1, Alignment.Right), new("Interval from", 1, Alignment.Right), new("to", 1, Alignment.Right), new("Note", 3)], groups, "");

    private static RowGroup Group(IReadOnlyList<ModelParameter> parameters, string? title)
    {
        var rows = parameters.Take(MostParameters).Select(one => new Row(
            [Phrases.Sentence(one.Name), Significant.Text(one.Value), Significant.Text(one.Low), Significant.Text(one.High), one.Note ?? ""])).ToList();
        if (parameters.Count > rows.Count)
            rows.Add(new Row([$"{Phrases.Plural(parameters.Count - rows.Count, "further one")} in results.json", "", "", "", ""], Emphasis.Muted));
        return new RowGroup(rows, title);
    }
}
