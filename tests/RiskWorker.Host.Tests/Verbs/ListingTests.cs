using System.Text.Json;
using RiskWorker.Domain.Runs;
using RiskWorker.Host.UseCases;
using RiskWorker.Host.Verbs;

namespace RiskWorker.Host.Tests.Verbs;

public sealed class ListingTests : IDisposable
{
    private readonly StringWriter _output = new();

    public void Dispose() => _output.Dispose();

    [Fact]
    public void Measure_listing_shows_figures_intervals_and_statuses_worst_first()
    {
        MeasureListing.Write(SampleRuns.Report(), Tables());
        Assert.Equal("""
            Sample Firm, 2026-11-27: degraded, with warnings
            run r-0123456789ab, model lognormal, seed 1, 100,000 scenarios, look 2 of 5

            Finding  Subject                       What
            warning  PRICE-STALE observations.csv  2 factors did not move for 3 days: AAA,
                                                   BBB.

            Book                 Measure          Loss      99.0% interval
            FIRM            EUR  VaR 99% 1d    316,286  314,900 to 317,650
                                 ES 97.5% 10d   987.65         980.10 to …
              [red]DESK[/]  EUR  VaR 99% 1d    316,286  314,900 to 317,650
                                 ES 97.5% 10d   987.65         980.10 to …

            Intervals hold simulation noise only, not the error of model or estimates.

            Limit       Book          Measure      Amount  Measured    Used  Status
            L-breached  [red]DESK[/]  VaR 99% 1d  300,000   316,286  105.4%  BREACHED
            L-open      [red]DESK[/]  VaR 99% 1d  300,000   316,286  105.4%  undecided
            L-warned    [red]DESK[/]  VaR 99% 1d  300,000   316,286  105.4%  warning
            L-within    [red]DESK[/]  VaR 99% 1d  300,000   316,286  105.4%  within

            1 of 4 limits is breached; 1 lies within simulation error and is undecided.
            /out/x/limit-report.pdf

            """.ReplaceLineEndings("\n"), Lines());
    }

    [Fact]
    public void A_document_stands_on_one_line_however_long_its_path_is()
    {
        var path = "/" + new string('x', 90) + "/a folder/limit-report.pdf";
        MeasureListing.Write(SampleRuns.Report() with { Documents = [path, "/out/results.json"] }, Tables());
        Assert.EndsWith($"is undecided.\n{path}\n/out/results.json\n", Lines(), StringComparison.Ordinal);
    }

    [Fact]
    public void Measure_listing_shows_what_each_model_says_of_the_top_node()
    {
        var (record, measures) = (SampleRuns.Record(), SampleRuns.Record().Results.Nodes[0].Measures);
        IReadOnlyList<MeasureResult> history = [measures[0] with { Value = 400_000, Low = 400_000, High = 400_000, Sample = new(350_000, null) }, measures[1] with { Value = 900, Sample = new(null, null) }];
        MeasureListing.Write(
            record with
            {
                Results = record.Results with
                {
                    Models =
                    [
                        new() { Name = "[red]history[/]", Kind = ModelKind.Historical, Nodes = [new("FIRM", "EUR", history)] },
                        new() { Name = "short", Kind = ModelKind.Historical },
                    ],
                },
            },
            [], Tables());
        Assert.Contains("""

            Models on FIRM   Measure          Loss  Ratio            Interval
            lognormal        VaR 99% 1d    316,286   1.00  314,900 to 317,650
                             ES 97.5% 10d   987.65   1.00         980.10 to …
            [red]history[/]  VaR 99% 1d    400,000   1.26        350,000 to …
                             ES 97.5% 10d   900.00   0.91                   -
            short            no figures          -      -                   -

            The interval of a history is that of its days as a sample.

            """.ReplaceLineEndings("\n"), Lines(), StringComparison.Ordinal);
    }

    [Fact]
    public void Measure_listing_of_a_history_says_that_its_intervals_are_those_of_a_sample()
    {
        var record = SampleRuns.Record();
        var nodes = record.Results.Nodes.Select(node => node with { Measures = [.. node.Measures.Select(measure => measure with { Low = measure.Value, High = measure.Value, Sample = new(300_000, null) })] });
        MeasureListing.Write(record with { Results = record.Results with { Nodes = [.. nodes] } }, [], Tables());
        Assert.Contains("300,000 to …", Lines(), StringComparison.Ordinal);
        Assert.Contains("Past days are no draws: intervals are those of the days as a sample.\n", Lines(), StringComparison.Ordinal);
        Assert.DoesNotContain("simulation noise", Lines(), StringComparison.Ordinal);
    }

    [Fact]
    public void Measure_listing_fits_eighty_columns()
    {
        MeasureListing.Write(SampleRuns.Report(), Tables());
        Assert.All(Lines().Split('\n'), line => Assert.True(line.Length <= 80, line));
    }

    [Fact]
    public void Runs_listing_without_runs_says_so()
    {
        RunsListing.Write([], Tables());
        Assert.Equal("No run is stored.\n", Lines());
    }

    [Fact]
    public void Runs_listing_shows_a_line_for_each_run()
    {
        RunsListing.Write([Summary()], Tables());
        Assert.Equal("""
            As of       Run             Status    Evidence  Model      Scenarios  Breached
            2026-11-27  r-0123456789ab  complete  recorded  lognormal    100,000         2


            """.ReplaceLineEndings("\n"), Lines());
    }

    [Fact]
    public void Runs_listing_as_json_is_an_array_of_facts()
    {
        RunsListing.WriteJson([Summary()], _output);
        using var json = JsonDocument.Parse(_output.ToString());
        var run = Assert.Single(json.RootElement.EnumerateArray());
        Assert.Equal(("r-0123456789ab", "2026-11-27", "complete", 100_000), (run.GetProperty("run").GetString(), run.GetProperty("asOf").GetString(), run.GetProperty("status").GetString(), run.GetProperty("scenarios").GetInt32()));
        Assert.Equal("1970-01-01T00:00:00Z", run.GetProperty("finished").GetString());
    }

    [Fact]
    public void Load_listing_shows_files_and_warnings()
    {
        LoadListing.Write(new([new("books.csv", 12, true), new("pnl.csv", 1_234_567, false)], [new(FindingSeverity.Warning, "COLUMN-UNKNOWN", "books.csv", "column 'colour' is not used")]), Tables());
        Assert.Equal("""
            File            Rows  Store
            books.csv         12  loaded
            pnl.csv    1,234,567  unchanged

            Warning         Subject    What
            COLUMN-UNKNOWN  books.csv  column 'colour' is not used


            """.ReplaceLineEndings("\n"), Lines());
    }

    private static RunSummary Summary() => new("r-0123456789ab", new(2026, 11, 27), RunStatus.Complete, EvidenceKind.Recorded, "lognormal", 100_000, 1, DateTimeOffset.UnixEpoch, 2);

    private Spectre.Console.IAnsiConsole Tables() => new Terminal(_output, TextWriter.Null, false, TimeProvider.System).Tables();

    /// <summary>What was printed, blanks at the ends of lines left out.</summary>
    private string Lines() => string.Join('\n', _output.ToString().ReplaceLineEndings("\n").Split('\n').Select(l => l.TrimEnd()));
}
