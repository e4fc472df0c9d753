using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Pdf;
using RiskWorker.Reporting.Reports;
using RiskWorker.Reporting.Tests.Pdf;

namespace RiskWorker.Reporting.Tests.Reports;

public sealed class SensitivitiesSectionTests
{
    private static Sensitivity Delta(string book, string factor, double value, double gamma = 0) => new(book, factor, FactorClass.Equity, null, null, SensitivityMeasure.Delta, value, gamma);

    private static Sensitivity Vega(string book, string factor, double value) => new(book, factor, FactorClass.Vol, null, null, SensitivityMeasure.Vega, value, null);

    private static Sensitivity Point(string book, string? curve, double? years, double value, bool isSpread = false) => new(
        book, $"{curve ?? "SINGLE"}.{years}", isSpread ? FactorClass.Credit : FactorClass.Rate, curve, years, isSpread ? SensitivityMeasure.Cs01 : SensitivityMeasure.Dv01, value, null);

    private static RunRecord Run(int desks, params IReadOnlyList<Sensitivity> found)
    {
        var run = new SampleRun { Desks = desks }.Build();
        return run with { Results = run.Results with { Sensitivities = found } };
    }

    private static IReadOnlyList<Block> Blocks(RunRecord run) =>
        LimitReport.Build(run).Sections.SingleOrDefault(section => section.Blocks is [Heading { Text: "Sensitivities" }, ..])?.Blocks ?? [];

    private static List<Table> Tables(IEnumerable<Block> blocks) =>
        [.. blocks.SelectMany(block => block is Columns pair ? [.. pair.Left, .. pair.Right] : (IEnumerable<Block>)[block]).OfType<Table>()];

    private static string[] Rows(Table table) => [.. table.Groups.SelectMany(group => group.Rows).Select(row => string.Join('|', row.Cells.Cast<TextCell>().Select(cell => cell.Text.ToString())))];

    private static string Heads(Table table) => string.Join('|', table.Columns.Select(column => column.Unit.Length > 0 ? $"{column.Head} ({column.Unit})" : column.Head));

    [Fact]
    public void Record_without_sensitivities_has_no_section() => Assert.Empty(Blocks(Run(2)));

    [Fact]
    public void Largest_deltas_come_first_with_gamma_and_unit_and_the_rest_is_counted()
    {
        var table = Assert.Single(Tables(Blocks(Run(1, [.. Enumerable.Range(1, 15).Select(i => Delta("firm", $"F{i}", (i % 2 == 0 ? -1 : 1) * i * 10_000, i))]))));

        Assert.Equal("Factor|Class|Delta (thousand EUR)|Gamma (thousand EUR)", Heads(table));
        var rows = Rows(table);
        Assert.Equal(13, rows.Length);
        Assert.Equal(["F15|equity|150.0|0.0", "F14|equity|−140.0|0.0"], rows[..2]);
        Assert.Equal("F4|equity|−40.0|0.0", rows[11]);
        Assert.Equal("3 smaller ones|||", rows[12]);
    }

    [Fact]
    public void Book_without_any_gamma_has_no_column_of_it() =>
        Assert.Equal("Factor|Class|Delta (EUR)", Heads(Assert.Single(Tables(Blocks(Run(1, Delta("firm", "F", 12_345)))))));

    // The root's 250,000 sets the unit of the desk's 12,300 too: what stands below each other is compared.
    [Fact]
    public void Books_below_the_root_follow_in_the_units_of_the_root_and_books_below_them_do_not()
    {
        var blocks = Blocks(Run(2, Delta("firm", "F", 250_000), Vega("firm", "V", -4_000), Delta("desk1", "F", 12_300), Delta("book1.0", "F", 1)));

        Assert.Equal(["Sensitivities", "Halden & Moss", "Birch desk"], blocks.OfType<Heading>().Select(heading => heading.Text));
        Assert.Equal([["F|equity|250.0"], ["V|−4,000"], ["F|equity|12.3"]], Tables(blocks).Select(Rows));
    }

    [Fact]
    public void Rates_and_spreads_stand_by_curve_and_tenor_with_their_sum()
    {
        var tables = Tables(Blocks(Run(
            1, Point("firm", "EUR", 0.25, 10), Point("firm", "EUR", 2, 200), Point("firm", "USD", 2, -3_000), Point("firm", "USD", 10, 500.4), Point("firm", null, null, 7),
            Point("firm", "BANKS", 1.5, 40, isSpread: true))));

        Assert.Equal(["DV01, EUR|3\u00A0m|2\u00A0y|10\u00A0y|All tenors", "CS01, EUR|18\u00A0m|All tenors"], tables.Select(Heads));
        Assert.Equal(["USD||−3,000|500|−2,500", "EUR|10|200||210", "SINGLE.||||7"], Rows(tables[0]));
        Assert.Equal(["BANKS|40|40"], Rows(tables[1]));
    }

    [Fact]
    public void Many_tenors_are_spread_over_tables_and_many_curves_are_counted()
    {
        var found = Enumerable.Range(1, 15).SelectMany(curve => Enumerable.Range(1, 11).Select(year => Point("firm", $"C{curve}", year, curve * 10)));
        var tables = Tables(Blocks(Run(1, [.. found])));

        Assert.Equal([9, 5], tables.Select(table => table.Columns.Count));
        Assert.Equal([12, 13], tables.Select(table => Rows(table).Length));
        Assert.Equal(["C15|150|150|150|1,650", "3 smaller curves||||"], [Rows(tables[1])[0], Rows(tables[1])[^1]]);
    }

    [Fact]
    public void Many_books_below_the_root_are_cut_to_the_riskiest_and_it_is_said()
    {
        var blocks = Blocks(Run(20, [Delta("firm", "F", 1), .. Enumerable.Range(0, 20).Select(desk => Delta($"desk{desk}", "F", 1))]));

        Assert.Equal(1 + 1 + 8, blocks.OfType<Heading>().Count());
        Assert.Equal("Shown are the eight of twenty books below the root with the largest values at risk.", blocks.OfType<Paragraph>().Last().Text.ToString());
    }

    [Fact]
    public void Definitions_and_the_file_that_holds_all_are_stated()
    {
        var note = Blocks(Run(1, Delta("firm", "F", 1))).OfType<Paragraph>().First().Text.ToString();

        Assert.All(["full revaluation", "half of the profit at +1% less that at −1%", "translation of values", "+0.01 of volatility", "one basis point", "sensitivities.csv"], words => Assert.Contains(words, note));
    }

    [Fact]
    public void Long_names_and_huge_figures_stay_inside_the_page()
    {
        var books = new[] { "firm", "desk0", "desk1", "desk2" };
        var found = books.SelectMany(book => (Sensitivity[])
        [
            .. Enumerable.Range(0, 14).Select(i => Delta(book, $"EQUITY.OF.A.VERY.LONG.NAME.{i}", 1.234e14 / (i + 1), -9.9e12)),
            .. Enumerable.Range(0, 14).Select(i => Vega(book, $"IMPLIED VOLATILITY OF A VERY LONG NAME {i}", -8.8e13)),
            .. Enumerable.Range(0, 40).Select(i => Point(book, $"A CURVE OF A RATHER LONG NAME {i % 3}", i / 3 * 0.7, 1e13 * (i - 20))),
        ]);
        PdfText.AssertInsideMargins(PdfRenderer.Render(LimitReport.Build(Run(3, [.. found]))));
    }
}
