using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>The rest of page 1: how sure, what changed, which run this is, and what the number leaves out.</summary>
internal static class Overview
{
    private const int ListedUnpriced = 4;
    private const int ListedChanges = 3;

    public static IEnumerable<Block> Blocks(RunReading run) =>
    [
        new Columns(
            [new Heading("How sure are these figures", 3), Certainty.Of(run), .. ModelsSection.Glance(run), .. Changes(run)],
            [new Heading("This run", 3), Identity.Short(run)],
            0.54),
        new Heading("Not in this number", 3),
        .. LeftOut(run),
    ];

    private static IEnumerable<Block> Changes(RunReading run)
    {
        if (run.Record.Previous is not { } previous)
        {
            yield return new Heading("What changed", 3);
            yield return new Paragraph("This is the first stored run: there is none to compare it with.");
            yield break;
        }

        yield return new Heading($"What changed since {Numerals.Date(previous.AsOf)}", 3);
        yield return ChangeTable(run);
        foreach (var note in ChangeNotes(run, previous))
            yield return new Paragraph(note, Voice.Note);
    }

    private static Table ChangeTable(RunReading run)
    {
        var scale = run.Scale();
        var node = run.Root!;
        var before = run.PreviousOf(node);
        var rows = run.HeadlineSpecs.Select(spec => Change(
            Phrases.Short(spec), RunReading.Find(before?.Measures, spec)?.Value, RunReading.Find(node.Measures, spec)?.Value, scale)).ToList();
        rows.Add(Change("Value", before?.Value, node.Value, scale));
        rows.Add(Change("Gross value", run.Results.Holdings.PreviousGrossValue, run.Results.Holdings.GrossValue, scale));
        return new Table(
            [new(scale.Unit, 1.5), new("Before", 1, Alignment.Right), new("Now", 1, Alignment.Right), new("Change", 1, Alignment.Right)],
            [new RowGroup(rows)], "");
    }

    private static Row Change(string name, double? before, double? now, MoneyScale scale) =>
        new([name, scale.Text(before), scale.Text(now), now - before is { } change ? scale.Change(change) : Numerals.Missing]);

    private static IEnumerable<RichText> ChangeNotes(RunReading run, PreviousRun previous)
    {
        if (previous.SettingsHash != run.Record.SettingsHash)
        {
            yield return RichText.Of(
                new TextRun("Settings differ from the run before", Strong: true),
                new TextRun($", which used model {previous.Model} and {Numerals.Count(previous.Scenarios)} scenarios: the change is not the market's alone."));
        }

        var moved = run.Results.Limits.Where(limit => run.PreviousOf(limit) is { } before && before.Status != limit.Status).ToList();
        if (moved.Count == 0 && run.Results.Limits.Count > 0)
            yield return "No limit changed its status.";
        foreach (var limit in moved.OrderBy(limit => Phrases.Urgency(limit.Status)).Take(ListedChanges))
            yield return $"{limit.Limit.Name}: {Phrases.Word(run.PreviousOf(limit)!.Status)} before, {Phrases.Word(limit.Status)} now.";
        if (moved.Count > ListedChanges)
            yield return $"{Phrases.Sentence(Phrases.Number(moved.Count - ListedChanges))} more limits changed their status.";
    }

    private static IEnumerable<Block> LeftOut(RunReading run)
    {
        var held = run.Results.Holdings;
        if (HoldingsSection.LeftOut(run) is not { } leftOut)
        {
            yield return new Paragraph($"Every position line is in the figures: {Numerals.Count(held.Priced)} of {Numerals.Count(held.Positions)}.");
        }
        else
        {
            yield return new Paragraph(leftOut);
            yield return HoldingsSection.UnpricedTable(run, ListedUnpriced);
        }
        if (held.Unpriced.Count > ListedUnpriced)
            yield return new Paragraph($"{Phrases.Sentence(Phrases.Number(held.Unpriced.Count - ListedUnpriced))} more lines are listed under Holdings.", Voice.Note);
        yield return new Paragraph(
            Tied(run, held) + " Also left out: what the model does not know, such as " + ModelCautions.Unknown(run.Record.Settings.Model) + ", and the cost of leaving a position.", Voice.Note);
    }

    private static string Tied(RunReading run, Holdings held) => held.Reconciled == 0
        ? "No line carried a value of the book of record, so none could be tied to it."
        : $"Tied to the book of record: {Numerals.Count(held.Reconciled)} of {Numerals.Count(held.Positions)} lines carried its value; "
            + $"{Phrases.Plural(held.Breaks.Count, "line")} differ{(held.Breaks.Count == 1 ? "s" : "")} by more than {Numerals.Percent(run.Record.Settings.Checks.ValueTolerance, 1)}, "
            + $"together by {run.Scale().Text(held.BreakTotal)} {run.Scale().Unit}.";
}
