using RiskWorker.Reporting.Charts;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Tests.Pdf;

/// <summary>Documents of every kind of block, with invented words and figures.</summary>
internal static class SampleDocuments
{
    public static ReportDocument Of(params Block[] blocks) =>
        new("Sample report", "As of 2026-11-27 · run 4f1c", "Invented figures.", [new Section(blocks)]);

    public static Table LongTable(int rows, int perGroup) => new(
        [new("Book", 3), new("Value", 1, Alignment.Right, "thousand EUR"), new("Status", 1)],
        [.. Enumerable.Range(0, rows).Chunk(perGroup).Select(group => new RowGroup(
            [.. group.Select(i => new Row([$"Row {i}", Numerals.Fixed(1000.5 * i, 1), new StatusCell(StatusMark.Good, "within")]))]))],
        "No rows.");

    public static ReportDocument Everything() => Of(
        new Heading("Everything at once", 1, "Every block of the model on a few pages"),
        new Callout(StatusMark.Bad, "Two of fourteen limits are breached; both were open yesterday.", ["A line below the head."]),
        new Paragraph(RichText.Of(new TextRun("Plain and "), new TextRun("strong", true), new TextRun(", side by side."))),
        new KeyFigures(
        [
            new("VaR 99%, 1 day", "316.3", "thousand EUR", "95% interval 313.1 to 319.4", StatusMark.Bad),
            new("ES 97.5%, 1 day", "317.9", "thousand EUR", "95% interval 314.0 to 321.8"),
            new("Far too large a figure", "−123,456,789,012,345.6", "EUR", "It is set smaller"),
        ]),
        new Columns(
            [new Heading("Left", 3), new Facts([new("Run", "4f1c"), new("A longer name", "value")])],
            [new Heading("Right", 3), new Paragraph("Words at the right.")]),
        new Heading("Limits"),
        LimitTable(),
        Distribution(0.5),
        Pnl(),
        Measures(),
        new PageBreak(),
        new Heading("A long table"),
        LongTable(30, 5));

    public static Table LimitTable() => new(
        [new("Limit", 3), new("Used", 3), new("Status", 1.4)],
        [
            new RowGroup([Bar("All books", 1.12, StatusMark.Bad, "breached"), Bar("North", 1.005, StatusMark.Undecided, "inconclusive")], "Firm"),
            new RowGroup([Bar("South", 0.85, StatusMark.Warning, "warning"), Bar("East", 0.2, StatusMark.Good, "within"), Bar("West", 4.2, StatusMark.Bad, "breached")], "Desks"),
        ],
        "No limits.");

    public static Figure Distribution(double lossScale) => new(
        "Most of a thousand days lie between a loss of 300 and a gain of 300 thousand EUR",
        new DistributionChart(-400_000, 10_000, [.. Enumerable.Range(0, 80).Select(Bell)], 41, 55, [new("VaR 99%", 632_000 * lossScale), new("ES 97.5%", 636_000 * lossScale)], "EUR"),
        170,
        "The bars at both ends hold what lies beyond.");

    public static Figure Pnl() => new(
        "Three exceptions in 250 days",
        new PnlChart([.. Enumerable.Range(0, 250).Select(Day)], "VaR 99%", "EUR"),
        160,
        "Diamonds: exceptions. Grey columns: days without VaR or P&L.");

    public static Figure Measures() => new(
        "VaR by book",
        new MeasureChart(
            [
                new("All books", 316_286, 313_100, 319_400, 300_000, StatusMark.Bad),
                new("North", 154_874, 152_000, 157_800, 156_000, StatusMark.Undecided),
                new("A book with a name that is much too long to stand beside a chart in full", 20_100, 19_000, 21_300),
            ],
            "VaR 99%, 1 day",
            "EUR"),
        90);

    private static Row Bar(string name, double used, StatusMark mark, string word) => new(
        [name, new BarCell(used, used - 0.02, used + 0.02, 0.8, Numerals.Percent(used, 1), mark), new StatusCell(mark, word)]);

    // A triangle with rounded sides, in integers: no function whose last bit depends on the machine.
    private static long Bell(int i)
    {
        var distance = Math.Abs(i - 40);
        return 10_000_000L / (1000 + (distance * distance * distance));
    }

    private static PnlDay Day(int i)
    {
        var date = new DateOnly(2026, 1, 2).AddDays(i + (i / 5 * 2));
        var pnl = (((i * 7919) % 401) - 200) * 1000.0;
        double? var = i is > 100 and < 104 ? null : 190_000 + (200 * i);
        if (i % 90 == 45)
            pnl = -320_000;
        return new PnlDay(date, i == 60 ? null : pnl, var, var is null || i == 60 || -pnl > var);
    }
}
