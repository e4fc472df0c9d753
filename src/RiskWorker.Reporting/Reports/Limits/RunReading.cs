using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>A run's record as the sections read it: its root, its headline measures, its units, its predecessor.</summary>
internal sealed class RunReading(RunRecord record, string? chainHead)
{
    private readonly Dictionary<string, string> names = record.Results.Nodes.ToDictionary(node => node.Book, node => node.Name, StringComparer.Ordinal);

    private readonly Dictionary<string, PreviousNode> previousNodes =
        (record.Previous?.Nodes ?? []).ToDictionary(node => node.Book, StringComparer.Ordinal);

    private readonly Dictionary<string, PreviousLimit> previousLimits =
        (record.Previous?.Limits ?? []).ToDictionary(limit => limit.Limit, StringComparer.Ordinal);

    private readonly Dictionary<string, MoneyScale> scales = new(StringComparer.Ordinal);

    public RunRecord Record => record;

    public RunResults Results => record.Results;

    public string? ChainHead => chainHead;

    public NodeResult? Root => Results.Nodes.Count > 0 ? Results.Nodes[0] : null;

    public string FirmName => Results.Firm?.Name ?? "";

    public string Currency => Results.Firm?.ReportingCurrency ?? Root?.Currency ?? "";

    /// <summary>The measures of the root in their order.</summary>
    public IReadOnlyList<MeasureSpec> Specs => [.. (Root?.Measures ?? []).Select(measure => measure.Spec)];

    /// <summary>The first VaR and the first expected shortfall of the shortest horizon.</summary>
    public IReadOnlyList<MeasureSpec> HeadlineSpecs =>
        [.. Specs.Where(spec => spec.Horizon == Specs[0].Horizon).DistinctBy(spec => spec.Kind)];

    /// <summary>Whether the scenarios are past days and no draws: then no figure has simulation noise.</summary>
    public bool IsHistory => Root?.Measures.Any(measure => measure.Sample is not null) == true;

    /// <summary>Whether those days weigh differently by age.</summary>
    public bool IsWeighted => ModelWords.Moves(record.Settings.Model) is { Kind: ModelKind.Historical, AgeWeight: not null };

    /// <summary>The unit that all measures of a currency are printed in.</summary>
    public MoneyScale Scale(string currency)
    {
        if (scales.TryGetValue(currency, out var known))
            return known;

        var largest = Results.Nodes.SelectMany(node => InCurrency(node, currency)).Select(measure => Math.Abs(measure.Value)).DefaultIfEmpty(0).Max();
        return scales[currency] = MoneyScale.For(largest, currency);
    }

    /// <summary>The unit of the reporting currency.</summary>
    public MoneyScale Scale() => Scale(Currency);

    /// <summary>A book's display name.</summary>
    public string NameOf(string book) => names.GetValueOrDefault(book, book);

    public PreviousNode? PreviousOf(NodeResult node) => previousNodes.GetValueOrDefault(node.Book);

    public PreviousLimit? PreviousOf(LimitResult limit) => previousLimits.GetValueOrDefault(limit.Limit.Name);

    /// <summary>The children of a node.</summary>
    public IEnumerable<NodeResult> ChildrenOf(NodeResult node) => Results.Nodes.Where(child => child.Parent == node.Book);

    public static MeasureResult? Find(IEnumerable<MeasureResult>? measures, MeasureSpec spec) =>
        measures?.FirstOrDefault(measure => measure.Spec == spec);

    /// <summary>The measure that a limit is held against, in the currency of its book; null where none was computed.</summary>
    public MeasureResult? MeasureOf(LimitResult limit) =>
        limit.Value is null ? null : Find(Results.Nodes.FirstOrDefault(node => node.Book == limit.Limit.Book)?.Measures, limit.Limit.Measure);

    private static IEnumerable<MeasureResult> InCurrency(NodeResult node, string currency) =>
        node.Currency == currency ? node.Measures : [];
}
