using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>The models of a run in plain words: which says most, which least, and what their intervals let one say.</summary>
internal static class ModelSentences
{
    /// <summary>The one sentence on the first measure of the top node; null where the models have no figure of it.</summary>
    public static string? Lead(RunReading run, IReadOnlyList<ModelReading> models)
    {
        if (Figures(run, models) is not { } found)
            return null;

        var (spec, record, others) = found;
        var (scale, top) = (run.Scale(), run.Root!.Name);
        string Money((ModelReading Model, MeasureResult Measure) one) => scale.Text(one.Measure.Value);
        if (others is [var only])
        {
            return ModelComparison.Ratio(record.Measure, only.Measure) is { } ratio
                ? $"On {spec} of {top}, {only.Model.Name} says {Money(only)} {scale.Unit}, {Numerals.Fixed(ratio, 2)} times the {Money(record)} of the model of record, {record.Model.Name}."
                : $"On {spec} of {top}, {only.Model.Name} says {Money(only)} {scale.Unit}; the model of record, {record.Model.Name}, says {Money(record)}.";
        }

        var all = others.Prepend(record).ToList();
        var most = all.MaxBy(one => one.Measure.Value);
        var least = all.MinBy(one => one.Measure.Value);
        if (most.Measure.Value == least.Measure.Value)
            return $"On {spec} of {top}, all {Phrases.Number(all.Count)} models say {Money(record)} {scale.Unit}.";
        if (most.Model.IsRecord)
            return $"On {spec} of {top}, the model of record, {record.Model.Name}, says most, {Money(record)} {scale.Unit}; {least.Model.Name} says least, {Money(least)}{Times(record, least)}.";

        if (least.Model.IsRecord)
            return $"On {spec} of {top}, the model of record, {record.Model.Name}, says least, {Money(record)} {scale.Unit}; {most.Model.Name} says most, {Money(most)}{Times(record, most)}.";

        var both = $"On {spec} of {top}, {most.Model.Name} says most, {Money(most)} {scale.Unit}, and {least.Model.Name} least, {Money(least)}";
        return ModelComparison.Ratio(record.Measure, most.Measure) is { } high && ModelComparison.Ratio(record.Measure, least.Measure) is { } low
            ? $"{both}: {Numerals.Fixed(high, 2)} and {Numerals.Fixed(low, 2)} times the {Money(record)} of the model of record, {record.Model.Name}."
            : $"{both}; the model of record, {record.Model.Name}, says {Money(record)}.";
    }

    /// <summary>Which of the differences on that measure are larger than the intervals, which are not, and of which nothing can be said.</summary>
    public static string? Differences(RunReading run, IReadOnlyList<ModelReading> models)
    {
        if (Figures(run, models) is not { } found)
            return null;

        var (_, record, others) = found;
        if (others is [var only])
            return Alone(ModelComparison.Of(record.Measure, only.Measure));

        var apart = others.ToLookup(one => ModelComparison.Of(record.Measure, one.Measure), one => one.Model.Name);
        var sentences = new List<string>();
        if (apart[Apart.Beyond].Any())
            sentences.Add($"Further from {record.Model.Name} than the intervals of the two explain: {List(apart[Apart.Beyond])}.");
        if (apart[Apart.Within].Any())
            sentences.Add($"Within the intervals of the two, so that the difference may be noise: {List(apart[Apart.Within])}.");
        if (apart[Apart.Unknown].Any())
            sentences.Add($"Where no interval is claimed, nothing says how much of the difference is chance: {List(apart[Apart.Unknown])}.");
        return string.Join(' ', sentences);
    }

    /// <summary>The other models on page 1: from where to where they reach.</summary>
    public static string? Range(RunReading run, IReadOnlyList<ModelReading> models)
    {
        if (Figures(run, models) is not { } found)
            return null;

        var (spec, record, others) = found;
        var scale = run.Scale();
        var (least, most) = (others.MinBy(one => one.Measure.Value), others.MaxBy(one => one.Measure.Value));
        return others.Count == 1
            ? $"{least.Model.Name} says {scale.Text(least.Measure.Value)} {scale.Unit} for {Phrases.Short(spec)}{Times(record, least)}."
            : $"{Phrases.Sentence(Phrases.Number(others.Count))} others say {scale.Text(least.Measure.Value)} to {scale.Text(most.Measure.Value)} {scale.Unit} for {Phrases.Short(spec)}"
                + (ModelComparison.Ratio(record.Measure, least.Measure) is { } low && ModelComparison.Ratio(record.Measure, most.Measure) is { } high
                    ? $": {Numerals.Fixed(low, 2)} to {Numerals.Fixed(high, 2)} times this figure."
                    : ".");
    }

    /// <summary>A sentence for each model without figures, in the words of the finding where there is one.</summary>
    public static IEnumerable<string> Failed(RunReading run, IEnumerable<ModelReading> models) => models.Where(model => !model.HasFigures).Select(model =>
        run.Results.Findings.FirstOrDefault(finding => finding.Subject == model.Name && finding.Message.Contains(model.Name, StringComparison.Ordinal)) is { } found
            ? found.Message
            : $"The model '{model.Name}' has no figures: it could not be calibrated.");

    private static string Alone(Apart apart) => apart switch
    {
        Apart.Beyond => "The two lie further apart than their intervals explain.",
        Apart.Within => "The intervals of the two meet, so the difference may be noise.",
        _ => "One of the two claims no interval, so nothing says how much of the difference is chance.",
    };

    private static (MeasureSpec Spec, (ModelReading Model, MeasureResult Measure) Record, List<(ModelReading Model, MeasureResult Measure)> Others)? Figures(RunReading run, IReadOnlyList<ModelReading> models)
    {
        if (run.HeadlineSpecs is not [var spec, ..] || run.Root is not { } root || models.Count == 0 || models[0].Measure(root.Book, spec) is not { } figure)
            return null;

        var others = models.Skip(1).Select(model => (Model: model, Measure: model.Measure(root.Book, spec)!)).Where(one => one.Measure is not null).ToList();
        return others.Count == 0 ? null : (spec, (models[0], figure), others);
    }

    private static string Times((ModelReading Model, MeasureResult Measure) record, (ModelReading Model, MeasureResult Measure) other) =>
        ModelComparison.Ratio(record.Measure, other.Measure) is { } ratio ? $", {Numerals.Fixed(ratio, 2)} times as much" : "";

    private static string List(IEnumerable<string> names) => string.Join(", ", names);
}
