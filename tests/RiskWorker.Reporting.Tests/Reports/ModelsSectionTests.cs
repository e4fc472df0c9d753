using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Charts;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Pdf;
using RiskWorker.Reporting.Reports;
using RiskWorker.Reporting.Reports.Limits;
using RiskWorker.Reporting.Tests.Pdf;

namespace RiskWorker.Reporting.Tests.Reports;

public sealed class ModelsSectionTests
{
    private static readonly RunRecord s_run = new SampleRun { Desks = 2 }.Build();

    [Fact]
    public void Run_without_other_models_has_no_section_and_says_nothing_of_them()
    {
        Assert.Empty(Blocks(s_run));
        Assert.DoesNotContain("Other models", Flat(s_run));
        Assert.DoesNotContain("Beside it", Flat(s_run));
    }

    [Theory]
    [InlineData("a", 1.25, "On VaR 99%, 1 day of Halden & Moss, a says 515.4 thousand EUR, 1.25 times the 412.3 of the model of record, house.")]
    [InlineData("a", 0.5, "On VaR 99%, 1 day of Halden & Moss, a says 206.2 thousand EUR, 0.50 times the 412.3 of the model of record, house.")]
    public void One_other_model_is_held_against_the_model_of_record(string name, double times, string sentence) =>
        Assert.Equal(sentence, Lead(SampleModels.Beside(s_run, (name, times))));

    [Theory]
    [InlineData(1.25, 2, "On VaR 99%, 1 day of Halden & Moss, the model of record, house, says least, 412.3 thousand EUR; b says most, 824.6, 2.00 times as much.")]
    [InlineData(0.75, 0.5, "On VaR 99%, 1 day of Halden & Moss, the model of record, house, says most, 412.3 thousand EUR; b says least, 206.2, 0.50 times as much.")]
    [InlineData(0.5, 2, "On VaR 99%, 1 day of Halden & Moss, b says most, 824.6 thousand EUR, and a least, 206.2: 2.00 and 0.50 times the 412.3 of the model of record, house.")]
    [InlineData(1, 1, "On VaR 99%, 1 day of Halden & Moss, all three models say 412.3 thousand EUR.")]
    public void First_sentence_says_which_model_says_most_and_which_least(double first, double second, string sentence) =>
        Assert.Equal(sentence, Lead(SampleModels.Beside(s_run, ("a", first), ("b", second))));

    // The intervals of the sample run reach 1% to each side: 1.015 lies within them, 1.05 does not.
    [Fact]
    public void Second_sentence_holds_the_differences_against_the_intervals()
    {
        var run = SampleModels.With(
            s_run,
            SampleModels.Model(s_run, "close", ModelKind.Lognormal, one => one with { Value = one.Value * 1.015, Low = one.Value * 1.005, High = one.Value * 1.025 }),
            SampleModels.Model(s_run, "far", ModelKind.Lognormal, one => one with { Value = one.Value * 1.05, Low = one.Value * 1.04, High = one.Value * 1.06 }),
            SampleModels.Model(s_run, "open", ModelKind.Lognormal, one => one with { Value = one.Value * 2, Low = one.Value * 1.5, High = null }),
            SampleModels.Model(s_run, "past", ModelKind.Historical, one => SampleModels.Historical(one, 1.4, 0.9, 2)),
            SampleModels.Model(s_run, "weighted", ModelKind.Historical, one => SampleModels.Historical(one, 1.4, null, null)));

        Assert.Equal(
            "Further from house than the intervals of the two explain: far, open. Within the intervals of the two, so that the difference may be noise: close, past. "
            + "Where no interval is claimed, nothing says how much of the difference is chance: weighted.",
            Blocks(run).OfType<Paragraph>().ElementAt(1).Text.ToString());
    }

    [Theory]
    [InlineData(1.25, "The two lie further apart than their intervals explain.")]
    [InlineData(1.015, "The intervals of the two meet, so the difference may be noise.")]
    public void Second_sentence_on_one_other_model_names_none(double times, string sentence) =>
        Assert.Equal(sentence, Blocks(SampleModels.Beside(s_run, ("a", times))).OfType<Paragraph>().ElementAt(1).Text.ToString());

    [Fact]
    public void Page_one_says_from_where_to_where_the_other_models_reach()
    {
        Assert.Contains("Two others say 206.2 to 824.6 thousand EUR for VaR 99%: 0.50 to 2.00 times this figure.", PageOne(SampleModels.Beside(s_run, ("a", 2), ("b", 0.5))));
        Assert.Contains("a says 515.4 thousand EUR for VaR 99%, 1.25 times as much.", PageOne(SampleModels.Beside(s_run, ("a", 1.25))));
    }

    [Fact]
    public void Chart_has_a_panel_a_measure_and_a_row_a_model_on_one_scale()
    {
        var run = SampleModels.With(s_run, SampleModels.Model(s_run, "past", ModelKind.Historical, one => SampleModels.Historical(one, 1.5, 0.9, null)));
        var chart = Assert.IsType<ModelChart>(Assert.Single(Blocks(run).OfType<Figure>()).Chart);

        Assert.Equal(["VaR 99%, 1 day", "ES 97.5%, 1 day", "VaR 99%, 10 days"], chart.Panels.Select(panel => panel.Name));
        Assert.All(chart.Panels, panel => Assert.Equal(["house", "past"], panel.Rows.Select(row => row.Name)));
        Assert.Equal(new ModelRow("past", 412_300 * 1.5, 412_300 * 0.9, null, false, "1.50×"), chart.Panels[0].Rows[1]);
        Assert.True(chart.Panels[0].Rows[0].IsRecord);
        Assert.Equal((0, 412_300 * 3.05 * 1.5), (chart.Lowest, chart.Highest));

        Assert.Contains("618.5 (1.50×)", PdfText.Lines(PdfRenderer.Render(LimitReport.Build(run))));
        Assert.Contains("Bar: interval, at 99% for house, 95% for the others; of a history, what its days allow as a sample", Flat(run));
    }

    [Fact]
    public void Charts_of_many_models_go_on_in_further_figures_with_the_same_scale()
    {
        var figures = Blocks(SampleModels.Beside(s_run, [.. Enumerable.Range(1, 20).Select(i => ($"m{i}", 1 + (0.01 * i)))])).OfType<Figure>().ToList();

        Assert.Equal(3, figures.Count);
        Assert.Single(figures.Select(figure => ((ModelChart)figure.Chart).Highest).Distinct());
        Assert.Equal("Measures of Halden & Moss by model, continued", figures[1].Title);
        Assert.All(figures, figure => Assert.True(figure.Height <= 560));
    }

    // Book 1 of every desk of the sample run is in dollars.
    [Fact]
    public void Table_by_book_keeps_each_book_in_its_own_currency()
    {
        var table = Tables(SampleModels.Beside(s_run, ("a", 1.25)))[0];

        Assert.Equal(["Book", "house", "a", "ratio"], table.Columns.Select(column => column.Head));
        Assert.Equal(["Books in EUR: thousand EUR", "Books in USD: thousand USD"], table.Groups.Select(group => group.Title));
        Assert.Equal("Halden & Moss|412.3|515.4|1.25×", Row(table.Groups[0].Rows[0]));
        Assert.Equal([7, 2], table.Groups.Select(group => group.Rows.Count));
        Assert.Equal($"{s_run.Results.Nodes[3].Name}|79.5|99.4|1.25×", Row(table.Groups[1].Rows[0]));
    }

    [Fact]
    public void Table_by_book_of_one_currency_has_its_unit_in_the_heads()
    {
        var run = s_run with { Results = s_run.Results with { Nodes = [.. s_run.Results.Nodes.Where(node => node.Currency == "EUR")] } };
        var table = Tables(SampleModels.Beside(run, ("a", 1.25)))[0];

        Assert.Equal(["", "thousand EUR", "thousand EUR", ""], table.Columns.Select(column => column.Unit));
        Assert.Null(Assert.Single(table.Groups).Title);
    }

    [Fact]
    public void Eight_models_stand_in_two_tables_a_measure_each_beside_the_model_of_record()
    {
        var blocks = Blocks(SampleModels.Beside(s_run, [.. Enumerable.Range(1, 8).Select(i => ($"m{i}", 1 + (0.01 * i)))]));

        Assert.Equal(
            ["VaR 99%, 1 day by book, models 1 to 4 beside house", "VaR 99%, 1 day by book, models 5 to 8 beside house"],
            blocks.OfType<Heading>().Skip(1).Take(2).Select(heading => heading.Text));
        Assert.Equal(["Book", "house", "m5", "ratio", "m6", "ratio", "m7", "ratio", "m8", "ratio"], blocks.OfType<Table>().ElementAt(1).Columns.Select(column => column.Head));
    }

    [Fact]
    public void Book_without_a_loss_has_no_ratio()
    {
        var run = new SampleRun { Desks = 1, Scale = -1 }.Build();
        Assert.Equal("Halden & Moss|−412.3|−515.4|", Row(Tables(SampleModels.Beside(run, ("a", 1.25)))[0].Groups[0].Rows[0]));
    }

    [Fact]
    public void Model_without_figures_is_named_in_a_sentence_and_stands_in_no_table_of_figures()
    {
        var failed = new ModelResult { Name = "short", Kind = ModelKind.Historical };
        var run = SampleModels.With(s_run, SampleModels.Model(s_run, "a", ModelKind.Lognormal, one => one), failed);
        Assert.Contains("The model 'short' has no figures: it could not be calibrated.", Flat(run));
        Assert.Equal(["Book", "house", "a", "ratio"], Tables(run)[0].Columns.Select(column => column.Head));

        var found = new Finding(FindingSeverity.Warning, "model-failed", "short", "The model 'short' has no figures: The history has 3 days.");
        Assert.Contains("The history has 3 days.", string.Join(' ', Blocks(run with { Results = run.Results with { Findings = [found] } }).OfType<Paragraph>().Select(one => one.Text)));
    }

    [Fact]
    public void Run_whose_other_models_all_failed_says_so_and_shows_no_chart()
    {
        var run = SampleModels.With(s_run, new ModelResult { Name = "short", Kind = ModelKind.Historical });
        var blocks = Blocks(run);

        Assert.Empty(blocks.OfType<Figure>());
        Assert.Equal("The model 'short' has no figures: it could not be calibrated.", blocks.OfType<Paragraph>().First().Text.ToString());
        Assert.DoesNotContain("Other models", PageOne(run));
        PdfText.AssertInsideMargins(PdfRenderer.Render(LimitReport.Build(run)));
    }

    [Fact]
    public void Table_of_models_says_kind_data_and_how_each_is_found()
    {
        var table = Tables(SampleModels.With(s_run, SampleModels.Model(s_run, "past", ModelKind.Historical, one => one), new ModelResult { Name = "short", Kind = ModelKind.StudentT }))[^2];

        Assert.Equal(
            [
                "house/log-normal, model of record|Exponential weights 0.94 over 500 days|500|2024-12-20 to 2026-11-27/2 days incomplete|200,000",
                "past/historical simulation|The moves of 500 days, all of one weight/past moves as they were|480|2024-12-20 to 2026-11-27|100,000",
                "short/Student t|Equal weights over 500 days, degrees of freedom by profile likelihood|–|no figures|–",
            ],
            table.Groups[0].Rows.Select(Row));
    }

    [Fact]
    public void Cautions_of_the_other_kinds_stand_below_the_table_of_models_once_a_kind()
    {
        var run = SampleModels.With(
            s_run, SampleModels.Model(s_run, "a", ModelKind.Lognormal, one => one), SampleModels.Model(s_run, "b", ModelKind.Historical, one => one), SampleModels.Model(s_run, "c", ModelKind.Historical, one => one));
        var notes = Blocks(run).OfType<Paragraph>().Select(one => one.Text.ToString()).ToList();

        Assert.Contains(notes, note => note.StartsWith("b, c: Historical simulation knows only moves that happened in its window", StringComparison.Ordinal));
        Assert.DoesNotContain(notes, note => note.Contains("thinner tails", StringComparison.Ordinal));
    }

    [Fact]
    public void Top_node_without_a_loss_is_compared_without_a_ratio()
    {
        var run = new SampleRun { Desks = 1, Scale = -1 }.Build();
        Assert.Equal("On VaR 99%, 1 day of Halden & Moss, a says −515.4 thousand EUR; the model of record, house, says −412.3.", Lead(SampleModels.Beside(run, ("a", 1.25))));
        Assert.Equal("On VaR 99%, 1 day of Halden & Moss, b says most, −206.2 thousand EUR, and a least, −824.6; the model of record, house, says −412.3.", Lead(SampleModels.Beside(run, ("a", 2), ("b", 0.5))));
    }

    [Fact]
    public void Parameters_stand_by_model_with_interval_and_note_and_those_of_the_record_on_the_method_page_too()
    {
        ModelParameter[] parameters = [new("degrees of freedom", 4.2137, 3.8, 4.72, "profile likelihood"), new("omega", 1.234e-6), new("days", 250)];
        var fitted = s_run with { Results = s_run.Results with { Calibration = s_run.Results.Calibration! with { Parameters = parameters } } };
        var many = SampleModels.Model(s_run, "many", ModelKind.StudentT, one => one);
        var run = SampleModels.With(fitted, many with { Calibration = many.Calibration! with { Parameters = [.. Enumerable.Range(1, 30).Select(i => new ModelParameter($"p{i}", i))] } });
        var table = Tables(run)[^2];

        Assert.Equal(["house", "many"], table.Groups.Select(group => group.Title));
        Assert.Equal(["Degrees of freedom|4.214|3.800|4.720|profile likelihood", "Omega|1.234e−6|–|–|", "Days|250|–|–|"], table.Groups[0].Rows.Select(Row));
        Assert.Equal("6 further ones in results.json||||", Row(table.Groups[1].Rows[^1]));
        Assert.Contains("Parameters of house", Flat(fitted));
        Assert.DoesNotContain("Parameters of house", Flat(s_run));
    }

    [Fact]
    public void Exceptions_stand_by_book_and_model_over_both_windows_with_what_the_tests_say()
    {
        var run = SampleModels.Beside(s_run, ("a", 1.25));
        var counts = run.Results.ModelBacktests.Select(count => count is { Model: "a", Book: "firm", Window: 500 }
            ? count with { Exceptions = 13, Zone = BacktestZone.Yellow, Coverage = new(9, 0.0026), Independence = null, Conditional = new(6.2, 0.045) } : count);
        var table = Tables(run with { Results = run.Results with { ModelBacktests = [.. counts] } })[^1];

        Assert.Equal("Model|VaR|Days|Exceptions|Expected|Zone|Coverage|Independence|Both", string.Join('|', table.Columns.Select(column => column.Head)));
        Assert.Equal("Halden & Moss", table.Groups[0].Title);
        Assert.Equal(
            [
                "house|99%|250|2|2.5|green|0.75|0.65|0.86", "|99%|500|5|5.0|green|0.75|0.65|0.86",
                "a|99%|250|2|2.5|green|0.75|0.65|0.86", "|99%|500|13|5.0|yellow|< 0.01/below 5%|–|0.04/below 5%",
            ],
            table.Groups[0].Rows.Select(row => Row(row).Replace('\u00A0', ' ')));
        Assert.Equal(9, table.Groups.Count);
    }

    [Fact]
    public void Few_days_have_one_line_no_zone_and_a_sentence_on_how_little_they_prove()
    {
        var run = SampleModels.Beside(s_run, ("a", 1.25));
        run = run with { Results = run.Results with { ModelBacktests = SampleModels.Counts(run, ["house", "a"], 60) } };
        var table = Tables(run)[^1];

        Assert.Equal(2, table.Groups[0].Rows.Count);
        Assert.Equal("too few days", Assert.IsType<StatusCell>(table.Groups[0].Rows[0].Cells[5]).Word.Replace('\u00A0', ' '));
        Assert.Contains(
            "There are 60 days of evidence, too few for a zone, which needs 125. So few prove little: over 60 days, VaR 99% should be passed 0.6 times, three or more would be remarkable, "
            + "and a model whose VaR is passed twice as often as it says would show so many in only 12 of 100 such spans. A test that finds nothing does not show that a model is right.",
            Flat(run));
    }

    [Fact]
    public void No_days_at_all_are_said_in_a_sentence()
    {
        var run = SampleModels.Beside(s_run, ("a", 1.25));
        Assert.Contains("No earlier run with these models is stored", Flat(run with { Results = run.Results with { ModelBacktests = SampleModels.Counts(run, ["house", "a"], 0) } }));
    }

    [Fact]
    public void Many_books_are_cut_to_those_with_remarkable_counts_and_it_is_said()
    {
        var run = SampleModels.Beside(new SampleRun { Desks = 9 }.Build(), [.. Enumerable.Range(1, 8).Select(i => ($"m{i}", 1.0))]);
        var counts = run.Results.ModelBacktests.Select(count => count is { Model: "m3", Book: "book8.2", Window: 250 } ? count with { Zone = BacktestZone.Red } : count);
        run = run with { Results = run.Results with { ModelBacktests = [.. counts] } };
        var table = Tables(run)[^1];

        Assert.Equal(1 + 4, table.Groups.Count);
        Assert.Equal(run.Results.Nodes.Single(node => node.Book == "book8.2").Name, table.Groups[^1].Title);
        Assert.Contains("Shown are four of 36 books below the top", Flat(run));
    }

    // scipy 1.10.1, binom.sf(count - 1, days, rate) at 1% and 2%; one exception less has 12%, 11% and 6.7% at 1%.
    [Theory]
    [InlineData(60, 3, 0.02242016478883543, 0.11874202512133669)]
    [InlineData(250, 6, 0.041183184069848354, 0.3840333770469823)]
    [InlineData(500, 10, 0.031102106648487914, 0.5433357855413983)]
    public void Power_of_a_count_is_that_of_the_binomial_law(int days, int count, double right, double wrong)
    {
        var (from, found) = ExceptionPower.Of(days, new(0.99m));
        Assert.Equal(count, from);
        Assert.Equal(wrong, found, 1e-12);
        Assert.Equal(right, ExceptionPower.AtLeast(from, days, 0.01), 1e-12);
    }

    [Theory]
    [InlineData(1)]
    [InlineData(4)]
    [InlineData(8)]
    public void Long_names_and_huge_figures_stay_inside_the_page(int models)
    {
        var run = new SampleRun { Desks = 4, Scale = 8.7e7, NameSuffix = " of structured relative value" }.Build();
        PdfText.AssertInsideMargins(PdfRenderer.Render(LimitReport.Build(SampleModels.Beside(
            run, [.. Enumerable.Range(1, models).Select(i => ($"a_model_of_an_unbroken_and_very_long_name_{i} and more words", 1000.0 * i))]))));
    }

    [Fact]
    public void Every_book_is_in_the_tables_of_a_hundred_books()
    {
        var run = SampleModels.Beside(new SampleRun { Desks = 9, BooksPerDesk = 10 }.Build(), ("a", 1.5));
        Assert.Equal(100, Tables(run)[0].Groups.Sum(group => group.Rows.Count));
        PdfText.AssertInsideMargins(PdfRenderer.Render(LimitReport.Build(run)));
    }

    private static IReadOnlyList<Block> Blocks(RunRecord run) =>
        LimitReport.Build(run).Sections.SingleOrDefault(section => section.Blocks is [Heading { Text: "Models side by side" }, ..])?.Blocks ?? [];

    private static string Lead(RunRecord run) => Blocks(run).OfType<Paragraph>().Single(one => one.Voice == Voice.Lead).Text.ToString();

    private static List<Table> Tables(RunRecord run) => [.. Blocks(run).OfType<Table>()];

    private static string Row(Row row) => string.Join('|', row.Cells.Select(cell => cell switch
    {
        TextCell text => text.Below.Length > 0 ? $"{text.Text}/{text.Below}" : text.Text.ToString(),
        StatusCell status => status.Word,
        _ => "?",
    }));

    private static string Flat(RunRecord run) => DocumentText.Of(LimitReport.Build(run));

    private static string PageOne(RunRecord run) => DocumentText.Of(LimitReport.Build(run).Sections[0]);
}
