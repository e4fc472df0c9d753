using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Pdf;
using RiskWorker.Reporting.Reports;
using RiskWorker.Reporting.Tests.Pdf;
using RiskWorker.TestKit;

namespace RiskWorker.Reporting.Tests.Reports;

public sealed class EvidenceReportTests
{
    [Theory]
    [InlineData(BacktestKind.Recorded, BacktestPositions.Stored, "Backtest evidence: recorded")]
    [InlineData(BacktestKind.Backfilled, BacktestPositions.Stored, "Backtest evidence: backfilled")]
    [InlineData(BacktestKind.WalkForward, BacktestPositions.Stored, "Backtest evidence: walk-forward on stored positions")]
    [InlineData(BacktestKind.WalkForward, BacktestPositions.Today, "Backtest evidence: walk-forward on today's positions held fixed")]
    public void Build_title_says_the_kind(BacktestKind kind, BacktestPositions positions, string title)
    {
        var document = EvidenceReport.Build(new SampleEvidence { Kind = kind, Positions = positions }.Build());
        Assert.Equal(title, Assert.IsType<Heading>(document.Sections[0].Blocks[0]).Text);
        Assert.Equal(title.Replace(": ", ", ", StringComparison.Ordinal), document.Title);
    }

    // A letter a book: G and R keep and exceed the desk limit, g and y are green and yellow without one, - has too few days.
    [Theory]
    [InlineData("", "There is no day to count: nothing is shown of the model.")]
    [InlineData("G", "The only book keeps the desk limit at 99%.")]
    [InlineData("GG", "Both books keep the desk limit at 99%.")]
    [InlineData("GGG", "All three books keep the desk limit at 99%.")]
    [InlineData("GRG", "Two of three books keep the desk limit at 99%; Book 1 (99%) does not.")]
    [InlineData("GRR", "One of three books keeps the desk limit at 99%; Book 1 (99%) and Book 2 (99%) do not.")]
    [InlineData("RR", "None of two books keeps the desk limit at 99%; Book 0 (99%) and Book 1 (99%) do not.")]
    [InlineData("GRRRRR", "One of six books keeps the desk limit at 99%; Book 1 (99%), Book 2 (99%), Book 3 (99%) and two more do not.")]
    [InlineData("gyg", "Two of three books are in the green zone at 99%; Book 1 (99%) is not.")]
    [InlineData("gg-", "Both books are in the green zone at 99%. One book has too few days to be judged.")]
    [InlineData("--", "There are too few days to judge any book: 1, where a zone needs 125.")]
    public void Build_says_in_one_sentence_which_books_stand_up(string books, string sentence)
    {
        var evidence = new SampleEvidence().Build();
        var series = books.Select((letter, i) => evidence.Series[0] with
        {
            Book = $"b{i}",
            Name = $"Book {i}",
            Confidence = new(0.99m),
            Days = [.. evidence.Series[0].Days.Take(1)],
            KeepsDeskLimit = letter switch { 'G' => true, 'R' => false, _ => null },
            Zone = letter switch { '-' => null, 'y' => BacktestZone.Yellow, _ => BacktestZone.Green },
        });
        Assert.Equal(sentence, EvidenceReport.Build(evidence with { Series = [.. series] }).Sections[0].Blocks.OfType<Callout>().Single().Head);
    }

    [Fact]
    public void Build_sentence_names_the_confidences_of_a_book_that_fails()
    {
        var evidence = new SampleEvidence().Build();
        var series = evidence.Series.Select(one => one with { KeepsDeskLimit = !(one.Book == "desk2" && one.Profit == ProfitKind.Actual) });
        Assert.Contains("Four of five books keep the desk limit at 99% and 97.5%; Birch desk (99%, 97.5%) does not.", Page(evidence with { Series = [.. series] }, 0));
    }

    [Fact]
    public void Build_page_one_identifies_the_evidence()
    {
        var evidence = new SampleEvidence().Build();
        var page = Page(evidence, 0);
        Assert.Contains("Halden & Moss Trading", page);
        Assert.Contains("house (lognormal), exponential weights 0.94 over 500 days", page);
        Assert.Contains("20,000 a day", page);
        Assert.Contains(evidence.Inputs[..16], page);
        Assert.Contains("riskworker backtest --config config-demo --out out --from 2025-12-12 --to 2026-11-27", page);
        Assert.Contains("0.1.0, numerics epoch 2", page);
        Assert.Contains("2026-11-30 06:12:03 UTC", page);
        Assert.Contains("every VaR was reported by a stored run before the profit was known", page);
    }

    [Fact]
    public void Build_table_shows_actual_and_hypothetical_side_by_side_and_the_greater()
    {
        var evidence = new SampleEvidence().Build();
        var table = EvidenceReport.Build(evidence).Sections[0].Blocks.OfType<Table>().Single();
        Assert.Equal(["Book", "VaR", "Days", "Actual", "Hypothetical", "Greater", "Expected", "Zone", "Add-on", "Desk limit"], table.Columns.Select(column => column.Head));
        Assert.Equal(5, table.Groups.Count);
        foreach (var (group, book) in table.Groups.Zip(["firm", "desk1", "desk2", "desk3", "desk4"]))
        {
            foreach (var (row, confidence) in group.Rows.Zip([new Confidence(0.99m), new Confidence(0.975m)]))
            {
                var of = evidence.Series.Where(one => one.Book == book && one.Confidence == confidence).ToDictionary(one => one.Profit);
                var actual = of.GetValueOrDefault(ProfitKind.Actual);
                var hypothetical = of[ProfitKind.Hypothetical];
                var greater = Math.Max(actual?.Count ?? 0, hypothetical.Count);
                Assert.Equal([confidence.ToString(), "250", actual?.Count.ToString() ?? "–", $"{hypothetical.Count}", $"{greater}"], row.Cells.Skip(1).Take(5).Cast<TextCell>().Select(cell => cell.Text.ToString()));
                var zone = new[] { actual?.Zone, hypothetical.Zone }.Max()!.Value;
                Assert.Equal(zone.ToString().ToLowerInvariant(), Assert.IsType<StatusCell>(row.Cells[7]).Word);
            }
        }
        Assert.Contains("A dash under actual: the book has no row of actual P&L.", Words(evidence));
    }

    [Fact]
    public void Build_every_book_has_one_page_with_picture_histogram_and_tests()
    {
        var evidence = new SampleEvidence().Build();
        var pages = Pages(evidence);
        foreach (var book in evidence.Series.Select(one => one.Book).Distinct())
        {
            var page = Assert.Single(pages, page => page.Contains($" {book} · 250 days", StringComparison.Ordinal));
            Assert.Contains("−VaR 99%", page);
            Assert.Contains("Without VaR", page);
            Assert.Contains("expected", page);
            Assert.Contains("fell in the forecast", page);
            Assert.Contains("Number of exceptions · Kupiec (1995)", page);
            Assert.Contains("Mean and spread of the tail · Berkowitz (2001)", page);
            Assert.Contains("Not assessable: the firm supplies no hypothetical profit of its own", page);
            Assert.Matches("exact .*asymptotic .*simulated", page);
        }
    }

    [Fact]
    public void Build_names_days_without_var_or_profit()
    {
        var evidence = new SampleEvidence().Build();
        var root = evidence.Series[0].Days;
        var words = Words(evidence);
        Assert.Contains($"Without VaR {Numerals.Date(root[81].Date)}, {Numerals.Date(root[82].Date)}", words);
        Assert.Contains($"Without actual P&L {Numerals.Date(root[150].Date)}", words);
        Assert.Contains("Without hypothetical P&L no day", words);
    }

    [Fact]
    public void Build_decides_in_words_and_at_which_confidence()
    {
        var evidence = new SampleEvidence { Books = 0 }.Build();
        StatisticalTest Test(bool? reject, string name) => new() { Name = name, Statistic = 1.25, PValue = reject is { } isRejected ? (isRejected ? 0.0001 : 0.5) : null, Method = PValueMethod.Exact, Source = "A source" };
        var series = evidence.Series.Select(one => one with { Tests = [Test(one.Confidence.Level == 0.99m, "kupiec-failures"), Test(false, "duration"), Test(null, "attribution-spearman"), Test(true, "a-new-test")] });
        var words = Words(evidence with { Series = [.. series] });
        Assert.Contains("Number of exceptions · A source 1.250 < 0.001 exact 1.250 0.500 exact rejected at 99%", words);
        Assert.Contains("Time since the last · A source 1.250 0.500 exact 1.250 0.500 exact not rejected", words);
        Assert.Contains("P&L attribution, ranks · A source 1.250 – 1.250 – not decided", words);
        Assert.Contains("a-new-test · A source 1.250 < 0.001 exact 1.250 < 0.001 exact rejected", words);
        Assert.Contains("P&L at 97.5%: of 3 tests one rejects: a-new-test (p < 0.001).", words);
        Assert.Contains("6 of 12 reject at 5%. About 1 would if every model were right", words);
    }

    [Fact]
    public void Build_register_begins_with_what_is_not_explained_and_keeps_corrections()
    {
        var evidence = new SampleEvidence().Build();
        var table = Register(evidence);
        Assert.StartsWith("Without explanation, in thousand EUR", table.Groups[0].Title, StringComparison.Ordinal);
        Assert.StartsWith("Put down to system or data, counted apart", table.Groups[^1].Title, StringComparison.Ordinal);
        var words = Words(evidence);
        Assert.Contains("Market: The close of the index jumped on the vote", words);
        Assert.Contains("corrected: Intraday trading: A hedge was closed at noon. B. Moen, 2026-", words);
        Assert.Contains("System or data: The feed of the day before came late", words);
        Assert.Matches("open [0-9]+ days", words);
        Assert.Contains("EQ.ALPHA", words);
        Assert.Contains("no VaR", words);
    }

    [Fact]
    public void Build_register_gives_a_books_day_one_row_whatever_the_confidences_and_profits()
    {
        var date = new DateOnly(2026, 5, 4);
        ExceptionEntry Entry(decimal confidence, ProfitKind profit, double amount, double var) => new() { Date = date, Book = "firm", Confidence = new(confidence), Profit = profit, Currency = "EUR", Amount = amount, Var = var, Age = 12 };
        var evidence = new SampleEvidence().Build() with
        {
            Exceptions = [Entry(0.975m, ProfitKind.Actual, -120_000, 80_000), Entry(0.975m, ProfitKind.Hypothetical, -125_000, 80_000), Entry(0.99m, ProfitKind.Hypothetical, -125_000, 100_000)],
        };
        var row = Assert.Single(Assert.Single(Register(evidence).Groups).Rows);
        var cells = row.Cells.Cast<TextCell>().ToList();
        Assert.Equal(["2026-05-04", "Halden & Moss", "−125.0", "100.0", "25.0"], cells.Take(5).Select(cell => cell.Text.ToString()));
        Assert.Equal("open 12 days", cells[0].Below);
        Assert.Equal("99% and 97.5% by actual and hypothetical", cells[1].Below);
        Assert.Contains("1 in the register (a book and a day each), one without explanation, the oldest for 12 business days; none is put down to system or data.", Words(evidence));
    }

    [Fact]
    public void Build_without_exceptions_says_so_in_a_sentence() =>
        Assert.Contains("No book had an exception in these days.", Words(new SampleEvidence().Build() with { Exceptions = [] }));

    [Fact]
    public void Build_of_nothing_is_short_and_leaves_sections_out()
    {
        var evidence = new SampleEvidence().Build() with { Series = [], Exceptions = [], Models = [], Runs = [] };
        var file = PdfRenderer.Render(EvidenceReport.Build(evidence));
        PdfText.AssertInsideMargins(file);
        var text = PdfText.Flat(file);
        Assert.Contains("No book has a series to count.", text);
        Assert.Contains("No run is counted.", text);
        Assert.DoesNotContain("Register of exceptions", text);
        Assert.DoesNotContain("Models over the same days", text);
        Assert.DoesNotContain("What each test asks", text);
    }

    [Fact]
    public void Build_compares_models_with_the_one_of_the_evidence()
    {
        var evidence = new SampleEvidence().Build();
        var words = Words(evidence);
        Assert.Contains("Models over the same days", words);
        Assert.Contains("house, this evidence 99%", words);
        Assert.Contains("t-copula 99%", words);
    }

    // Committee's table as recomputed with SciPy: see the header of the rows; type I at 99%, type II at 98, 97, 96 and 95%.
    [Theory]
    [InlineData(1, "91.89", "0.64", "0.05", "0.00", "0.00")]
    [InlineData(5, "10.78", "43.87", "12.82", "2.70", "0.46")]
    [InlineData(7, "1.37", "76.37", "37.50", "12.50", "3.14")]
    [InlineData(10, "0.03", "96.96", "77.90", "45.54", "19.46")]
    [InlineData(13, "0.00", "99.82", "95.98", "79.55", "51.75")]
    public void Build_shows_what_250_days_can_prove(int count, params string[] percent)
    {
        var table = EvidenceReport.Build(new SampleEvidence().Build()).Sections.SelectMany(section => section.Blocks).OfType<Table>().Single(table => table.Columns[0].Head == "Rejecting from");
        Assert.Equal(percent, table.Groups[0].Rows[count - 1].Cells.Skip(1).Cast<TextCell>().Select(cell => cell.Text.ToString().Replace("<\u00A00.01", "0.00", StringComparison.Ordinal)));
    }

    [Fact]
    public void Build_lists_runs_with_their_hashes_and_a_walk_forward_its_inputs()
    {
        var evidence = new SampleEvidence().Build();
        var text = PdfText.Flat(PdfRenderer.Render(EvidenceReport.Build(evidence)));
        Assert.All(evidence.Runs, run => Assert.Contains(run.Hash, text));
        Assert.Contains(evidence.Inputs, text);
        var walked = new SampleEvidence { Kind = BacktestKind.WalkForward }.Build();
        var words = Words(walked);
        Assert.Contains($"Hash of the inputs {walked.Inputs}", words);
        Assert.Contains("A walk-forward counts no stored run", words);
    }

    [Fact]
    public void Build_cautions_put_the_firm_and_the_law_first()
    {
        var words = Words(new SampleEvidence().Build());
        Assert.Contains("no investment advice", words);
        Assert.Contains("Local regulation, the firm's own policy and its qualified staff come first.", words);
        Assert.Contains("designed with reference to MAR32 and MAR99", words);
        Assert.Contains("no conformity", words);
        Assert.DoesNotContain("compliant", words);
    }

    [Fact]
    public void Build_walk_forward_of_a_hundred_books_stays_bounded_and_shows_the_worst_first()
    {
        var evidence = new SampleEvidence
        {
            Kind = BacktestKind.WalkForward,
            Books = 100,
            Days = 130,
            NameSuffix = " of structured relative value",
            Wildness = [.. Enumerable.Repeat(0.7, 97), 2.4, 2.4, 2.4, 2.4],
        }.Build();
        var document = EvidenceReport.Build(evidence);
        var file = PdfRenderer.Render(document);
        PdfText.AssertInsideMargins(file);
        Assert.InRange(PdfText.Pages(file).Count, 32, 60);
        var own = document.Sections.Where(section => section.StartsPage && section.Blocks.OfType<Figure>().Any()).Select(section => ((Heading)section.Blocks[0]).Text).ToList();
        Assert.Equal(31, own.Count);
        Assert.All(evidence.Series.Where(one => one.Book is "desk97" or "desk98" or "desk99" or "desk100"), one => Assert.Contains(one.Name, own));
        var words = DocumentText.Of(document);
        Assert.Contains("A page of its own follows for the root and 30 of 100 other books", words);
        Assert.Contains("Every book and day is in backtest-days.csv.", words);
        Assert.DoesNotContain("open ", words);
        Assert.DoesNotContain("not explained", words);
        Assert.DoesNotContain("Add-on:", words);
        Assert.Contains("Add-on and desk limit are for 250 days: there is none here.", words);
    }

    [Theory]
    [InlineData(-0.002)]
    [InlineData(0)]
    [InlineData(1e12)]
    public void Build_negative_zero_or_huge_figures_stay_inside_the_page(double scale) =>
        PdfText.AssertInsideMargins(PdfRenderer.Render(EvidenceReport.Build(new SampleEvidence { Scale = scale, Books = 1, Days = 130 }.Build())));

    [Fact]
    public void Build_long_words_stay_inside_the_page()
    {
        var evidence = new SampleEvidence { Books = 2, Days = 130, NameSuffix = " " + new string('W', 60), Explanation = string.Join(' ', Enumerable.Repeat("A long explanation of nothing in particular,", 40)) }.Build();
        PdfText.AssertInsideMargins(PdfRenderer.Render(EvidenceReport.Build(evidence)));
    }

    [Fact]
    public void Build_same_evidence_gives_the_same_bytes()
    {
        var evidence = new SampleEvidence { Books = 1 };
        Assert.Equal(PdfRenderer.Render(EvidenceReport.Build(evidence.Build())), PdfRenderer.Render(EvidenceReport.Build(evidence.Build())));
    }

    [Fact]
    public void Build_null_throws() => Assert.Throws<ArgumentNullException>(() => EvidenceReport.Build(null!));

    private static Table Register(BacktestEvidence evidence) =>
        EvidenceReport.Build(evidence).Sections.SelectMany(section => section.Blocks).OfType<Table>().Single(table => table.Columns.Any(column => column.Head == "What cost most"));

    private static string Words(BacktestEvidence evidence) => DocumentText.Of(EvidenceReport.Build(evidence));

    private static List<string> Pages(BacktestEvidence evidence) => [.. PdfText.Pages(PdfRenderer.Render(EvidenceReport.Build(evidence))).Select(page => string.Join(' ', page).Replace('\u00A0', ' '))];

    private static string Page(BacktestEvidence evidence, int page) => Pages(evidence)[page];
}
