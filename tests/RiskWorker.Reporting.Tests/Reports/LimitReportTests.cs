using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Pdf;
using RiskWorker.Reporting.Reports;
using RiskWorker.Reporting.Tests.Pdf;

namespace RiskWorker.Reporting.Tests.Reports;

public sealed class LimitReportTests
{
    [Fact]
    public void Build_typical_run_answers_on_page_one()
    {
        var page = Page(new SampleRun().Build(), 0);
        Assert.Contains("Two of ten limits are breached, one is undecided; one of these breaches is new.", page);
        Assert.Contains("412.3", page);
        Assert.Contains("99% interval 408.2 to 416.4; +12.4 since 2026-11-26", page);
        Assert.Contains("Intervals hold simulation noise only", page);
        Assert.Contains("They do not hold model or estimation error.", page);
        Assert.Contains("What changed since 2026-11-26", page);
        Assert.Contains("Not in this number", page);
        Assert.Contains("riskworker measure --config config-demo --out out --as-of 2026-11-27", page);
        Assert.Contains("degraded", page);
        Assert.Contains("Tied to the book of record: 140 of 152 lines", page);
    }

    [Fact]
    public void Build_page_one_says_how_many_lines_and_how_much_notional_no_figure_holds()
    {
        var run = new SampleRun().Build();
        Assert.Contains("2 of 152 position lines are in no figure: gross notional 1,250.0 thousand EUR, and 1 line of unknown notional, beside a gross value of 48,250.0 in the figures.", Page(run, 0));

        RunRecord With(params UnpricedLine[] lines) => run with { Results = run.Results with { Holdings = run.Results.Holdings with { Unpriced = lines } } };
        var swap = run.Results.Holdings.Unpriced[0];
        Assert.Contains("1 of 152 position lines is in no figure: gross notional 1,250.0 thousand EUR, beside", Page(With(swap), 0));
        Assert.Contains("2 of 152 position lines are in no figure: gross notional 3,750.0 thousand EUR, beside", Page(With(swap, swap with { Size = 2_500_000 }), 0));
        Assert.Contains("1 of 152 position lines is in no figure; nothing gives its notional.", Page(With(swap with { Size = null }), 0));
        Assert.DoesNotContain("in no figure", Page(With(), 0));
        // Also where more lines are left out than page 1 has room for.
        Assert.Contains("40 of 152 position lines are in no figure: gross notional 50,000.0 thousand EUR, beside", Page(With([.. Enumerable.Repeat(swap, 40)]), 0));
    }

    [Fact]
    public void Build_says_whether_the_valuation_date_moves()
    {
        var run = new SampleRun().Build();
        Assert.Contains("The shock is instantaneous: nothing expires or pays inside the horizon.", Flat(run));
        var aged = run with { Settings = run.Settings with { Model = run.Settings.Model with { Ageing = AgeingKind.Horizon } } };
        Assert.Contains("The valuation date moves by the horizon (Monday to Friday)", Flat(aged));
        Assert.DoesNotContain("instantaneous: nothing", Flat(aged));
        Assert.Contains("the valuation date moved by the horizon", Page(aged, 0));
    }

    [Fact]
    public void Build_method_page_says_what_price_surfaces_did()
    {
        var run = new SampleRun().Build();
        Assert.Contains("every position valued anew in every scenario at the horizon; the measure", Flat(run));
        var text = Flat(With(new(884, 1_000, 1_755_936, 55_923), run));
        Assert.Contains("884 price surfaces stand for 1,000 options beyond the first 4,096 scenarios", text);
        Assert.Contains("55,923 of 1,755,936 scenarios by node might belong to a tail and were revalued fully", text);
        Assert.Contains("Mean, deviation and histogram come from the surfaces", text);
        Assert.Contains("since on the scenarios that check it a price surface lay outside its bound", Flat(With(SurfaceSummary.Refused, run)));
        var approximate = run with { Settings = run.Settings with { Simulation = run.Settings.Simulation with { ExactTail = false } } };
        Assert.Contains("the settings leave the tails to them, so all figures carry their error", Flat(With(new(884, 1_000, 1_755_936, 0), approximate)));

        static RunRecord With(SurfaceSummary surfaces, RunRecord run) => run with { Results = run.Results with { Simulation = run.Results.Simulation! with { Surfaces = surfaces } } };
    }

    [Fact]
    public void Build_method_page_says_how_each_kind_held_is_valued_and_what_not_to_trust()
    {
        var run = new SampleRun().Build();
        var text = string.Join(' ', PdfText.Pages(PdfRenderer.Render(LimitReport.Build(run)))[^1]);
        Assert.Contains("How positions are valued", text);
        Assert.Contains("138 lines", text);
        Assert.Contains("Log-normal underlying: closed form.", text);
        Assert.Contains("Black and Scholes 1973", text);
        Assert.Contains("One volatility whatever the strike: no smile.", text);
        Assert.Contains("zero rates linear in time between two tenors", text);

        Assert.DoesNotContain("How positions are valued", Flat(run with { Results = run.Results with { Methods = [] } }));
        Assert.Contains("discount factors log-linear in time", Flat(run with { Settings = run.Settings with { CurveInterpolation = CurveInterpolation.LogLinearDiscount } }));
    }

    [Theory]
    [InlineData("", "No limit is in force on 2026-11-27.")]
    [InlineData("W", "The only limit is neither breached nor near its warning level.")]
    [InlineData("B", "The only limit is breached, since 2026-11-20.")]
    [InlineData("WWW", "None of three limits is breached or near its warning level.")]
    [InlineData("WNW", "None of three limits is breached; one has reached the warning level.")]
    [InlineData("NN", "None of two limits is breached; two have reached the warning level.")]
    [InlineData("WUN", "One of three limits is undecided within simulation noise; none is breached.")]
    [InlineData("BWW", "One of three limits is breached, since 2026-11-20.")]
    [InlineData("BBU", "Two of three limits are breached, one is undecided; none of these breaches is new.")]
    [InlineData("bW", "One of two limits is breached; the breach is new.")]
    [InlineData("bb", "Both limits are breached; all these breaches are new.")]
    [InlineData("bBB", "All three limits are breached; one of these breaches is new.")]
    public void Build_says_in_one_sentence_where_the_limits_stand(string limits, string sentence)
    {
        var run = new SampleRun { Limits = limits.Length }.Build();
        var changed = run.Results.Limits.Select((limit, i) => limit with { Status = StatusOf(limits[i]), StatusSince = limits[i] == 'b' ? run.AsOf : new DateOnly(2026, 11, 20) });
        var document = LimitReport.Build(run with { Results = run.Results with { Limits = [.. changed] } });
        Assert.Equal(sentence, document.Sections[0].Blocks.OfType<Callout>().Single().Head);
    }

    // A book called 'A' is a letter of nearly every limit's name: that is no reason to leave the book out.
    [Fact]
    public void Build_names_the_book_of_a_limit_whatever_the_limit_is_called()
    {
        var run = new SampleRun { Limits = 1 }.Build();
        var limit = run.Results.Limits[0] with { Status = LimitStatus.Breached };
        var nodes = run.Results.Nodes.Select(n => n.Book == limit.Limit.Book ? n with { Name = "A" } : n);
        var page = Page(run with { Results = run.Results with { Nodes = [.. nodes], Limits = [limit with { Limit = limit.Limit with { Name = "market-cap" } }] } }, 0);
        Assert.Contains($"market-cap (A, {limit.Limit.Measure})", page);
    }

    [Fact]
    public void Build_first_run_claims_no_change()
    {
        var text = Flat(new SampleRun { First = true }.Build());
        Assert.Contains("This is the first stored run: there is none to compare it with.", text);
        Assert.Contains("Two of ten limits are breached, one is undecided.", text);
        Assert.DoesNotContain("is new", text);
    }

    [Fact]
    public void Build_run_with_other_settings_than_the_previous_says_so()
    {
        var run = new SampleRun().Build();
        Assert.DoesNotContain("Settings differ", Flat(run));
        Assert.Contains("which used model house and 100,000 scenarios", Flat(run with { SettingsHash = SnapshotHash.OfText("other") }));
    }

    [Fact]
    public void Build_backfilled_run_says_so_on_page_one()
    {
        var run = new SampleRun().Build();
        Assert.DoesNotContain("afterwards", Page(run, 0));
        Assert.Contains("It was made afterwards (backfilled): nobody had these figures on their date.", Page(run with { Evidence = EvidenceKind.Backfilled }, 0));
    }

    [Fact]
    public void Build_names_the_urgent_limits_and_since_when()
    {
        var page = Page(new SampleRun().Build(), 0);
        Assert.Contains("Halden & Moss VaR 1", page);
        Assert.Contains("breached, since 2026-11-23, 112.0% used (110.9% to 113.1%).", page);
        Assert.Contains("inconclusive, new, 100.3% used (99.3% to 101.3%).", page);
    }

    [Fact]
    public void Build_failed_run_is_one_page_that_says_why_and_shows_no_figure()
    {
        var failed = new SampleRun { Status = RunStatus.Failed }.Build();
        var full = new SampleRun().Build();
        var file = PdfRenderer.Render(LimitReport.Build(failed with { Previous = full.Previous }));
        var page = string.Join(' ', Assert.Single(PdfText.Pages(file)));
        Assert.Contains("This run failed: there are no figures for 2026-11-27.", page);
        Assert.Contains(failed.Results.Findings[2].Code, page);
        Assert.Contains("No earlier figure is shown in its place.", page);
        Assert.DoesNotContain("VaR", page);
        Assert.DoesNotContain("2026-11-26", page);
    }

    [Fact]
    public void Build_failed_run_never_prints_figures_that_the_record_holds()
    {
        var run = new SampleRun().Build();
        var text = Flat(run with { Status = RunStatus.Failed });
        Assert.DoesNotContain("412.3", text);
        Assert.DoesNotContain("VaR", text);
    }

    [Fact]
    public void Build_hundred_books_sixty_limits_forty_findings_shows_every_one()
    {
        var run = new SampleRun { Desks = 9, BooksPerDesk = 10, Limits = 60, Findings = 40, Scale = 31_234.5, NameSuffix = " of structured relative value" }.Build();
        var file = PdfRenderer.Render(LimitReport.Build(run));
        PdfText.AssertInsideMargins(file);
        var text = PdfText.Flat(file);
        Assert.All(run.Results.Nodes, node => Assert.Contains(node.Name, text));
        Assert.All(run.Results.Limits, limit => Assert.Contains(limit.Limit.Name, text));
        Assert.All(run.Results.Findings, finding => Assert.Contains(finding.Message[..40], text));
        Assert.Contains("Twelve of 60 limits are breached", text);
    }

    [Theory]
    [InlineData(-0.002)]
    [InlineData(0)]
    [InlineData(1e12)]
    public void Build_negative_zero_or_huge_figures_stay_inside_the_page(double scale) =>
        PdfText.AssertInsideMargins(PdfRenderer.Render(LimitReport.Build(new SampleRun { Scale = scale }.Build())));

    [Fact]
    public void Build_without_limits_findings_or_days_says_so_in_sentences()
    {
        var text = Flat(new SampleRun { Limits = 0, Findings = 0, BacktestDays = 0, Status = RunStatus.Complete }.Build());
        Assert.Contains("No check found anything.", text);
        Assert.Contains("No earlier run is stored, so there is no VaR to hold against the P&L.", text);
        Assert.Contains("Complete run: no check found anything.", text);
    }

    [Fact]
    public void Build_every_page_carries_date_run_and_number()
    {
        var pages = PdfText.Pages(PdfRenderer.Render(LimitReport.Build(new SampleRun().Build())));
        Assert.All(pages, (page, i) =>
        {
            Assert.Equal("As of 2026-11-27 · run 7c41e09bd2f6-1", page[1]);
            Assert.Contains($"page {i + 1} of {pages.Count}", page);
        });
    }

    [Fact]
    public void Build_method_page_prints_hashes_in_full_and_the_quantile_definition()
    {
        var run = new SampleRun().Build();
        var head = SnapshotHash.OfText("head");
        var lines = PdfText.Pages(PdfRenderer.Render(LimitReport.Build(run, head)))[^1];
        Assert.All(new[] { run.Snapshot, run.SettingsHash, run.Figures, run.Results.Calibration!.Plan, head }, hash => Assert.Contains(hash, lines));
        Assert.Contains("the smallest l with P(L ≤ l) ≥ α: the ceil(N α)-th smallest of N losses, ties by scenario number.", lines);
    }

    [Fact]
    public void Build_counts_actual_and_hypothetical_exceptions_and_names_the_zone()
    {
        var run = new SampleRun().Build();
        var root = run.Results.Backtest[0];
        var text = Flat(run);
        Assert.Contains($"VaR 99%: actual {root.Actual}, hypothetical {root.Hypothetical}; zone red", text);
        Assert.Contains($"Actual P&L of Halden & Moss: {root.Actual} exceptions in 250 days", text);
        Assert.Contains("too few days", Flat(new SampleRun { BacktestDays = 60 }.Build()));
    }

    [Fact]
    public void Build_diversification_is_the_part_taken_off_the_sum()
    {
        // 412.3 against 190.0 + 179.0 + 168.0 = 537.0: 1 - 412.3 / 537 = 23.2%.
        var text = Flat(new SampleRun().Build());
        Assert.Contains("537.0 23.2", text);
    }

    [Fact]
    public void Build_null_throws() => Assert.Throws<ArgumentNullException>(() => LimitReport.Build(null!));

    private static LimitStatus StatusOf(char letter) => letter switch
    {
        'B' or 'b' => LimitStatus.Breached,
        'U' => LimitStatus.Inconclusive,
        'N' => LimitStatus.Warning,
        _ => LimitStatus.Within,
    };

    private static string Flat(RunRecord run) => PdfText.Flat(PdfRenderer.Render(LimitReport.Build(run)));

    private static string Page(RunRecord run, int page) => string.Join(' ', PdfText.Pages(PdfRenderer.Render(LimitReport.Build(run)))[page]);
}
