using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Charts;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>The models of a run side by side; left out where there is only the one of record.</summary>
internal static class ModelsSection
{
    private const int MostRows = 36;
    private const float RowHeight = 13;
    private const float TallestChart = 560;

    public static IReadOnlyList<Block> Blocks(RunReading run)
    {
        var models = ModelReading.Of(run);
        if (models.Count == 0)
            return [];

        return
        [
            new Heading("Models side by side"),
            .. Sentences(run, models),
            .. Charts(run, models),
            .. ModelTables.Of(run, models),
            new Heading("What the models are made from", 3),
            ParameterTables.Models(models),
            .. Cautions(models),
            .. ParameterTables.Of(models),
            .. ModelBacktestTable.Blocks(run),
        ];
    }

    /// <summary>What page 1 says of the other models; nothing where there are none with figures.</summary>
    public static IEnumerable<Block> Glance(RunReading run)
    {
        if (ModelSentences.Range(run, ModelReading.Of(run)) is { } range)
            yield return new Paragraph(RichText.Of(new TextRun("Other models: ", Strong: true), new TextRun(range)));
    }

    private static IEnumerable<Block> Sentences(RunReading run, IReadOnlyList<ModelReading> models)
    {
        if (ModelSentences.Lead(run, models) is { } lead)
            yield return new Paragraph(lead, Voice.Lead);
        if (ModelSentences.Differences(run, models) is { Length: > 0 } differences)
            yield return new Paragraph(differences);
        foreach (var failed in ModelSentences.Failed(run, models))
            yield return new Paragraph(failed);
    }

    // The method page has those of the model of record.
    private static IEnumerable<Block> Cautions(IReadOnlyList<ModelReading> models) => models
        .Where(model => model.Settings is not null)
        .GroupBy(model => ModelCautions.Sentences(model.Settings!))
        .Where(group => !group.Any(model => model.IsRecord))
        .Select(group => new Paragraph(RichText.Of(new TextRun(string.Join(", ", group.Select(model => model.Name)) + ": ", Strong: true), new TextRun(group.Key)), Voice.Note));

    // One scale for all figures, so that they are read together.
    private static IEnumerable<Block> Charts(RunReading run, IReadOnlyList<ModelReading> models)
    {
        var measured = models.Where(model => model.HasFigures).ToList();
        if (run.Root is not { } root || measured.Count < 2 || run.Specs.Count == 0)
            yield break;

        var panels = run.Specs.Select(spec => Panel(root, spec, measured)).ToList();
        var figures = panels.Chunk(Math.Max(1, MostRows / (measured.Count + 1))).ToList();
        var (low, high) = ModelChart.Range(panels);
        for (var i = 0; i < figures.Count; i++)
        {
            var rows = figures[i].Sum(panel => panel.Rows.Count + 1);
            yield return new Figure(
                $"Measures of {root.Name} by model" + (i > 0 ? ", continued" : ""),
                new ModelChart(figures[i], root.Currency, low, high), Math.Min(30 + (RowHeight * rows), TallestChart), i == figures.Count - 1 ? Caption(root, measured) : "");
        }
    }

    private static ModelPanel Panel(NodeResult root, MeasureSpec spec, List<ModelReading> models)
    {
        var record = models[0].Measure(root.Book, spec);
        return new(spec.ToString(), [.. models.Select(model => (model, Measure: model.Measure(root.Book, spec))).Where(one => one.Measure is not null).Select(one => Row(one.model, one.Measure!, record))]);
    }

    private static ModelRow Row(ModelReading model, MeasureResult measure, MeasureResult? record)
    {
        var (low, high) = measure.Sample is { } sample ? (sample.Low, sample.High) : (measure.Low, measure.High);
        return new(model.Name, measure.Value, low, high, model.IsRecord, model.IsRecord ? "" : ModelComparison.Times(ModelComparison.Ratio(record, measure)));
    }

    private static string Caption(NodeResult root, List<ModelReading> models)
    {
        var measures = models.Select(model => model.Measure(root.Book, root.Measures[0].Spec)).OfType<MeasureResult>().ToList();
        var levels = measures.Select(measure => measure.Level).Distinct().ToList();
        var at = levels.Count == 1 ? Phrases.Level(levels[0]) : $"{Phrases.Level(levels[0])} for {models[0].Name}, {string.Join(" or ", levels.Skip(1).Select(Phrases.Level))} for the others";
        return $"Filled dot and upright line: the model of record, {models[0].Name}; open dots: the others, with their ratio to it. Bar: interval, at {at}"
            + (measures.Any(measure => measure.Sample is not null) ? "; of a history, what its days allow as a sample, and no bar where none is claimed; a bar that ends at its dot has its other end beyond the sample" : "")
            + ". Models that are simulated share their draws, so the noise in a difference between two of them is usually smaller than their bars.";
    }
}
