using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>Each measure by book and model: a table a measure, and another for every further four models.</summary>
internal static class ModelTables
{
    private const int OthersPerTable = 4;

    public static IEnumerable<Block> Of(RunReading run, IReadOnlyList<ModelReading> models)
    {
        var others = models.Skip(1).Where(model => model.HasFigures).Chunk(OthersPerTable).ToList();
        if (others.Count == 0 || run.Specs.Count == 0)
            yield break;

        foreach (var spec in run.Specs)
        {
            for (var part = 0; part < others.Count; part++)
            {
                yield return new Heading($"{spec} by book" + (others.Count > 1 ? $", models {Numerals.Count((part * OthersPerTable) + 1)} to {Numerals.Count((part * OthersPerTable) + others[part].Length)} beside {models[0].Name}" : ""), 3);
                yield return Table(run, spec, models[0], others[part]);
            }
        }

        yield return new Paragraph($"Each book in its own currency. Ratio: how many times the figure of {models[0].Name} the one before it is; none where that is no loss.", Voice.Note);
    }

    private static Table Table(RunReading run, MeasureSpec spec, ModelReading record, IReadOnlyList<ModelReading> others)
    {
        var groups = run.Results.Nodes.GroupBy(node => node.Currency).OrderBy(group => group.Key != run.Currency).ThenBy(group => group.Key, StringComparer.Ordinal).ToList();
        var unit = groups.Count == 1 ? run.Scale(groups[0].Key).Unit : "";
        return new Table(
            [new("Book", 2.2), new(record.Name, 1, Alignment.Right, unit), .. others.SelectMany(model => (Column[])[new(model.Name, 1, Alignment.Right, unit), new("ratio", 0.5, Alignment.Right)])],
            [.. groups.Select(group => Group(run, group, groups.Count > 1, spec, record, others))], "");
    }

    private static RowGroup Group(RunReading run, IGrouping<string, NodeResult> group, bool titled, MeasureSpec spec, ModelReading record, IReadOnlyList<ModelReading> others)
    {
        var scale = run.Scale(group.Key);
        var shallowest = group.Min(node => node.Depth);
        return new RowGroup([.. group.Select(node => Row(node))], titled ? $"Books in {group.Key}: {scale.Unit}" : null);

        Row Row(NodeResult node)
        {
            var held = record.Measure(node.Book, spec);
            return new(
                [
                    new TextCell(node.Name, Level: node.Depth - shallowest), scale.Text(held?.Value),
                    .. others.Select(model => model.Measure(node.Book, spec)).SelectMany(measure => (Cell[])[scale.Text(measure?.Value), ModelComparison.Times(ModelComparison.Ratio(held, measure))]),
                ],
                node.Parent is null ? Emphasis.Strong : Emphasis.None);
        }
    }
}
