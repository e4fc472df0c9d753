using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>Lines outside the figures and lines that differ from the book of record, each by name; left out where there is neither.</summary>
internal static class HoldingsSection
{
    public static IReadOnlyList<Block> Blocks(RunReading run)
    {
        var held = run.Results.Holdings;
        if (held.Unpriced.Count == 0 && held.Breaks.Count == 0)
            return [];

        var blocks = new List<Block> { new Heading("Holdings") };
        if (held.Unpriced.Count > 0)
            blocks.AddRange([new Heading("Lines outside the figures", 3), UnpricedTable(run, held.Unpriced.Count)]);
        if (held.Breaks.Count > 0)
            blocks.AddRange([new Heading("Lines that differ from the book of record", 3), Breaks(run, held.Breaks)]);
        return blocks;
    }

    /// <summary>How many lines no figure holds, and how much; null where there is none.</summary>
    public static RichText? LeftOut(RunReading run)
    {
        var held = run.Results.Holdings;
        if (held.Unpriced.Count == 0)
            return null;

        var (lines, unknown, scale) = (held.Unpriced.Count, held.UnpricedOfUnknownSize, run.Scale());
        var which = $"{Numerals.Count(lines)} of {Phrases.Plural(held.Positions, "position line")} {(lines == 1 ? "is" : "are")} in no figure";
        var known = $"{scale.Text(held.UnpricedNotional)} {scale.Unit}";
        return unknown == lines
            ? RichText.Of(new TextRun($"{which}; nothing gives {(lines == 1 ? "its" : "their")} notional.", Strong: true))
            : RichText.Of(
                new TextRun($"{which}: gross notional {known}", Strong: true),
                new TextRun((unknown == 0 ? "" : $", and {Phrases.Plural(unknown, "line")} of unknown notional") + $", beside a gross value of {scale.Text(held.GrossValue)} in the figures."));
    }

    /// <summary>The largest unpriced lines with their notionals.</summary>
    public static Table UnpricedTable(RunReading run, int most)
    {
        var scale = run.Scale();
        var rows = run.Results.Holdings.Unpriced.Take(most).Select(line => new Row(
            [new TextCell(line.Instrument, line.Kind == "-" ? "kind unknown" : line.Kind), run.NameOf(line.Book), Numerals.Fixed(line.Quantity), line.Size is null ? "unknown" : scale.Text(line.Size), line.Reason]));
        return new Table(
            [new("Instrument", 1.6), new("Book", 1.4), new("Quantity", 1, Alignment.Right), new("Gross notional", 1, Alignment.Right, scale.Unit), new("Why", 3)],
            [new RowGroup([.. rows])], "");
    }

    private static Table Breaks(RunReading run, IReadOnlyList<ReconciliationBreak> breaks)
    {
        var rows = breaks.Select(line => new Row(
        [
            line.Instrument, run.NameOf(line.Book), line.Currency, Numerals.Fixed(line.ModelValue), Numerals.Fixed(line.MarketValue),
            Numerals.Signed(line.ModelValue - line.MarketValue),
        ]));
        const string unit = "whole units";
        return new Table(
            [
                new("Instrument", 2), new("Book", 2), new("Currency", 0.8),
                new("Model value", 1.2, Alignment.Right, unit), new("Book of record", 1.2, Alignment.Right, unit), new("Difference", 1.2, Alignment.Right, unit),
            ],
            [new RowGroup([.. rows])], "");
    }
}
