using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>Every limit in force, the most urgent first, figures in the currency of its book.</summary>
internal static class LimitsSection
{
    public static IReadOnlyList<Block> Blocks(RunReading run)
    {
        var limits = run.Results.Limits;
        if (limits.Count == 0)
            return [new Heading("Limits"), new Paragraph($"No limit is in force on {Numerals.Date(run.Record.AsOf)}.")];

        var groups = limits.GroupBy(limit => limit.Currency).OrderBy(group => group.Min(limit => Phrases.Urgency(limit.Status)))
            .ThenBy(group => group.Key != run.Currency).ThenBy(group => group.Key, StringComparer.Ordinal).ToList();
        var unit = groups.Count == 1 ? run.Scale(groups[0].Key).Unit : "";
        return
        [
            new Heading("Limits"),
            new Table(Columns(run, unit), [.. groups.Select(group => Group(run, group, groups.Count > 1))], ""),
            new Paragraph(
                "The upright line in a bar is the limit, the tick before it the warning level" + (run.IsHistory
                    ? ". Past days are no draws, so there is no simulation noise and the value alone decides."
                        + (run.IsWeighted ? "" : $" The interval below a measure is what its days allow as a sample: it has no part in the status, and holds at {Phrases.Level(limits[0].Level)} for each limit, not for all together.")
                    : ", the whisker the interval of the use. "
                        + "Breached: the whole interval lies above the limit. Inconclusive: the limit lies inside the interval, so simulation noise decides and nothing is declared. "
                        + $"Intervals hold at {Phrases.Level(limits[0].Level)} for each limit, not for all together."), Voice.Note),
        ];
    }

    private static Column[] Columns(RunReading run, string unit) =>
    [
        new("Limit", 2.3),
        new("Measure", 1.35, Alignment.Right, Phrases.Head(run, unit)),
        new("Amount", 1, Alignment.Right, unit),
        new("Used", 2.3),
        new("Status", 1.3),
        new("Change", 0.9, Alignment.Right, "% points"),
    ];

    private static RowGroup Group(RunReading run, IGrouping<string, LimitResult> group, bool titled)
    {
        var scale = run.Scale(group.Key);
        var rows = group.OrderBy(limit => Phrases.Urgency(limit.Status)).ThenByDescending(limit => limit.Used ?? double.PositiveInfinity)
            .ThenBy(limit => limit.Limit.Name, StringComparer.Ordinal).Select(limit => Row(run, limit, scale));
        return new RowGroup([.. rows], titled ? $"Books in {group.Key}: {scale.Unit}" : null);
    }

    private static Row Row(RunReading run, LimitResult result, MoneyScale scale)
    {
        var mark = Phrases.Mark(result.Status);
        return new(
        [
            new TextCell(RichText.Strong(result.Limit.Name), Phrases.Bound(run, result)),
            new TextCell(scale.Text(result.Value), Interval(run, result, scale)),
            Amount(run, result.Limit, scale),
            new BarCell(result.Used ?? double.NaN, result.UsedLow, result.UsedHigh, result.Limit.WarnAt, Phrases.Used(result.Used), mark),
            new StatusCell(mark, Phrases.Word(result.Status), Phrases.Since(result.StatusSince)),
            Change(run, result),
        ]);
    }

    private static string Interval(RunReading run, LimitResult result, MoneyScale scale) => result.Value is null
        ? ""
        : run.MeasureOf(result) is { Sample: not null } measure ? Phrases.Interval(run, scale, measure) : Phrases.Interval(scale, result.Low, result.High);

    private static TextCell Amount(RunReading run, Domain.Limits.Limit limit, MoneyScale scale) => limit.Basis switch
    {
        LimitBasis.Amount => new(scale.Text(limit.Amount)),
        LimitBasis.Nav => new(Numerals.Percent(limit.Amount, 2), "of value"),
        _ => new(Numerals.Fixed(limit.Amount, 2) + " times", run.NameOf(limit.ReferenceBook ?? "")),
    };

    private static TextCell Change(RunReading run, LimitResult result)
    {
        if (run.PreviousOf(result) is not { } before)
            return new(Numerals.Missing, run.Record.Previous is null ? "" : "new");

        var moved = before.Status == result.Status ? "" : $"was {Phrases.Word(before.Status)}";
        return new(result.Used - before.Used is { } change ? Numerals.Signed(change * 100, 1) : Numerals.Missing, moved);
    }
}
