using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Pdf;
using RiskWorker.Reporting.Reports;
using RiskWorker.Reporting.Reports.Limits;
using RiskWorker.Reporting.Tests.Pdf;

namespace RiskWorker.Reporting.Tests.Reports;

public sealed class ModelKindWordsTests
{
    private const string ThinTails = "A log-normal model has thinner tails";

    private static readonly RunRecord s_run = new SampleRun().Build();

    public static TheoryData<string, string[], string[]> Kinds => new()
    {
        { "lognormal", ["exponential weights 0.94 over 500 days", "zero expected return", "rank 39", "days taken as independent", ThinTails, "jumps, changing volatility within the horizon"], ["profile likelihood"] },
        { "shrunk", ["equal weights over 500 days, the correlation shrunk towards independence", "every pair of factors uses the days that both have"], ["given covariance"] },
        { "given", ["given covariance"], ["Missing days"] },
        { "student-t", ["degrees of freedom by profile likelihood", "the multivariate t", "capped at its 1e−7 quantile", "is a convention", "a mixing variable of its own"], [ThinTails, "days taken as independent"] },
        { "student-t own", ["4.500 degrees of freedom", "joined by a t copula"], ["profile likelihood", "one thickness of tail"] },
        { "historical", ["the joint moves of 250 days as they were", "all days of one weight", "share days", "knows only moves that happened in its window"], [ThinTails, "Covariance", "Drift", "rank 39", "Seed", "days taken as independent"] },
        { "historical aged", ["weights falling by 0.985 a day", "Boudoukh, Richardson and Whitelaw 1998", "weigh at most 1 − α"], ["ties by scenario number"] },
        { "filtered-historical", ["a GARCH(1,1) fitted by maximum likelihood (Bollerslev 1986)", "Barone-Adesi, Giannopoulos and Vosper 1999", "as good as the filter", "draws a past day anew, all factors together"], [ThinTails, "Covariance", "rank 39"] },
        { "jump-diffusion", ["jumps found in the history: shocks beyond 4 deviations (Merton 1976)", "h times as many jumps", "Jumps are few in any history"], [ThinTails] },
        { "jump-diffusion given", ["common jumps of 2 factors, 0.5000 a year and own jumps of 1 factor, as given", "given, not estimated"], ["found in the history"] },
        { "stressed", ["inner (student-t), to the 250 days of the history that are worst for the top node", "the multivariate t", "no worst case", "capped at its 1e−7 quantile"], [ThinTails] },
    };

    [Theory]
    [MemberData(nameof(Kinds))]
    public void Method_page_says_of_each_kind_what_applies_to_it_and_nothing_else(string kind, string[] said, string[] unsaid)
    {
        var model = Settings(kind);
        var run = s_run with { Settings = s_run.Settings with { Model = model } };
        if (model.Kind == ModelKind.Historical) run = SampleModels.History(s_run, model.AgeWeight) with { Settings = run.Settings };
        var text = Flat(run);

        Assert.All(said, words => Assert.Contains(words, text));
        Assert.All(unsaid, words => Assert.DoesNotContain(words, text));
        Assert.Contains("These figures are estimates of a model from past prices", text);
        Assert.DoesNotContain("  ", text);
    }

    [Theory]
    [InlineData("lognormal", "lognormal, exponential weights 0.94 over 500 days")]
    [InlineData("student-t own", "student-t own (student-t), exponential weights 0.94 over 500 days, 4.500 degrees of freedom, own margins")]
    [InlineData("historical aged", "historical aged (historical), the moves of 250 days, weights falling by 0.985 a day")]
    [InlineData("filtered-historical", "filtered-historical, residuals of 500 days, volatility by a GARCH(1,1) fitted by maximum likelihood")]
    [InlineData("stressed", "stressed, calibrated to the worst 250 days of the history: inner (student-t)")]
    public void Line_of_page_one_names_model_kind_and_how_it_is_found(string kind, string line) => Assert.Equal(line, ModelWords.Line(Settings(kind)));

    [Theory]
    [InlineData(0.0, "0")]
    [InlineData(250.0, "250")]
    [InlineData(12_345.6, "12,346")]
    [InlineData(80.98, "80.98")]
    [InlineData(4.2137, "4.214")]
    [InlineData(-0.08312345, "−0.08312")]
    [InlineData(0.99998, "1.000")]
    [InlineData(0.99981, "0.9998")]
    [InlineData(1.2344e-6, "1.234e−6")]
    [InlineData(double.NaN, "–")]
    public void Parameter_has_four_significant_digits(double value, string text) => Assert.Equal(text, Significant.Text(value));

    [Fact]
    public void History_of_record_prints_its_sample_wherever_an_interval_stands()
    {
        var run = SampleModels.History(s_run);
        var page = PageOne(run);
        Assert.Contains("95% interval of the days as a sample 329.8 to 618.5", page);
        Assert.Contains("These figures have no simulation noise", page);
        Assert.Contains("their 500 scenarios are past days, none is drawn.", page);
        Assert.Contains("What so few days, taken as independent, allow at 95% stands apart from the status of limits, which the value decides: VaR 99% 329.8 to 618.5, ES 97.5% 331.2 to 620.9 thousand EUR.", page);
        Assert.Contains("Above one day the scenarios share days and depend on each other, so no interval is claimed there.", page);
        Assert.Contains("500 past days, none drawn", page);
        Assert.Contains("112.0% used.", page);
        Assert.DoesNotContain("Intervals hold simulation noise only", page);
        Assert.DoesNotContain("412.3 to 412.3", Flat(run));
        Assert.DoesNotContain("112.0% to 112.0%", Flat(run));

        var sections = LimitReport.Build(run).Sections;
        var limits = DocumentText.Of(sections.Single(section => section.Blocks is [Heading { Text: "Limits" }, ..]));
        Assert.Contains("329.8 to 618.5", limits);
        Assert.Contains("below: sample", limits);
        Assert.Contains("the value alone decides. The interval below a measure is what its days allow as a sample", limits);
        var books = DocumentText.Of(sections.Single(section => section.Blocks is [Heading { Text: "Books" }, ..]));
        Assert.Contains("329.8 to 618.5", books);
        Assert.Contains("below: sample", books);
        Assert.Contains("no interval", books);
    }

    [Fact]
    public void History_of_weighted_days_says_once_that_it_claims_no_interval()
    {
        var weighted = SampleModels.History(s_run, 0.98);
        var nodes = weighted.Results.Nodes.Select(node => node with { Measures = [.. node.Measures.Select(one => one with { Sample = new(null, null) })], MeasuresRoot = null });
        var run = weighted with { Results = weighted.Results with { Nodes = [.. nodes] } };
        var text = Flat(run);

        Assert.Contains("Days that weigh differently are no sample of equal draws, so no interval is claimed.", PageOne(run));
        Assert.Contains("no sample interval is claimed", PageOne(run));
        Assert.Contains("days of different weight claim no interval", text);
        Assert.Contains("1% of the scenarios by weight lose", text);
        Assert.DoesNotContain("as a sample", text);
        Assert.DoesNotContain("below: sample", text);
        Assert.DoesNotContain("no interval ", text.Replace("no interval is claimed", "", StringComparison.Ordinal));
        PdfText.AssertInsideMargins(PdfRenderer.Render(LimitReport.Build(run)));
    }

    private static ModelSettings Settings(string name)
    {
        var model = new ModelSettings { Name = name };
        return name switch
        {
            "shrunk" => model with { Covariance = CovarianceEstimator.Shrunk, MissingDays = MissingDays.Pairwise },
            "given" => model with { Covariance = CovarianceEstimator.Given },
            "student-t" => model with { Kind = ModelKind.StudentT },
            "student-t own" => model with { Kind = ModelKind.StudentT, DegreesOfFreedom = 4.5, Margins = StudentMargins.Own },
            "historical" => model with { Kind = ModelKind.Historical, Window = 250 },
            "historical aged" => model with { Kind = ModelKind.Historical, Window = 250, AgeWeight = 0.985 },
            "filtered-historical" => model with { Kind = ModelKind.FilteredHistorical, Volatility = VolatilityFilter.Garch },
            "jump-diffusion" => model with { Kind = ModelKind.JumpDiffusion },
            "jump-diffusion given" => model with
            {
                Kind = ModelKind.JumpDiffusion,
                Jumps = new()
                {
                    CommonPerYear = 0.5,
                    Common = new Dictionary<string, JumpSize> { ["A"] = new(-0.1, 0.05), ["B"] = new(-0.2, 0.1) },
                    Own = new Dictionary<string, OwnJumps> { ["C"] = new(2, new(0, 0.1)) },
                },
            },
            "stressed" => model with { Kind = ModelKind.Stressed, Stressed = new() { Name = "inner", Kind = ModelKind.StudentT } },
            _ => model,
        };
    }

    private static string Flat(RunRecord run) => DocumentText.Of(LimitReport.Build(run));

    private static string PageOne(RunRecord run) => DocumentText.Of(LimitReport.Build(run).Sections[0]);
}
