using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Checks;
using RiskWorker.Engine.Runs;
using RiskWorker.Engine.Tests.Checks;
using RiskWorker.Engine.Tests.Models;

namespace RiskWorker.Engine.Tests.Runs;

/// <summary>The worst span of a history in which one was planted.</summary>
public sealed class StressedSpanTests
{
    private const int Span = 250, Days = 900;

    // Shocks of one size, ±0.4%, and ±3% on the planted days: the variance of a span rises with each wild day in it, and so does VaR on the same
    // draws. The one span that holds all of them is found to the day.
    [Theory]
    [InlineData(250)]
    [InlineData(613)]
    [InlineData(888)]
    [InlineData(900)]
    public void Lognormal_span_of_planted_wild_days_is_found_to_the_day(int end)
    {
        double[] shocks = [.. Enumerable.Range(1, Days).Select(t => (t % 2 == 0 ? 1 : -1) * (t > end - Span && t <= end ? 0.03 : 0.004))];
        var results = Calculated(new() { Name = "base", Covariance = CovarianceEstimator.Equal }, shocks);
        Assert.Equal((Span, Calibration.Market.Day(end)), (results.Calibration!.Shocks, results.Calibration.To));
        Assert.Contains($"ends on {Calibration.Market.Day(end):yyyy-MM-dd}", Parameter(results, "days of the span").Note, StringComparison.Ordinal);
        Assert.True(Parameter(results, "worst span").Value >= Parameter(results, "newest span").Value);
    }

    // Every span worked out here: the third worst of its 250 days is its VaR. Spans that hold the same three tie, and any of them is right.
    [Theory]
    [InlineData(500)]
    [InlineData(777)]
    public void Historical_span_ties_with_the_worst_of_all_spans(int end)
    {
        double[] shocks = [.. HistoryBook.Normals(Days, 5).Select((z, t) => z * (t >= end - Span && t < end ? 0.03 : 0.004))];
        var results = Calculated(new() { Name = "base", Kind = ModelKind.Historical }, shocks);
        double VarOf(int last) => shocks[(last - Span)..last].Select(x => 1 - Math.Exp(x)).OrderDescending().ElementAt(2);
        var worst = Enumerable.Range(Span, Days - Span + 1).Max(VarOf);
        Assert.Equal(worst, results.Nodes[0].Measures[0].Value, 1e-14);
        var found = Enumerable.Range(Span, Days - Span + 1).Single(last => Calibration.Market.Day(last) == results.Calibration!.To);
        Assert.Equal(worst, VarOf(found), 1e-14);
        Assert.Equal(VarOf(Days), Parameter(results, "newest span").Value, 1e-14);
    }

    // A historical span of ten-day moves needs nine days more before its first scenario's end.
    [Fact]
    public void Span_of_ten_day_moves_begins_nine_days_before()
    {
        var book = Book(new() { Name = "base", Kind = ModelKind.Historical }, [.. HistoryBook.Normals(Days, 6).Select(z => 0.01 * z)]) with { Horizons = [1, 10] };
        Assert.Equal(Span + 9, new RunCalculator(book.Snapshot(), 2, null, CancellationToken.None).Calculate().Calibration!.Shocks);
    }

    [Fact]
    public void Levels_are_todays_whatever_the_span()
    {
        double[] shocks = [.. Enumerable.Range(1, Days).Select(t => (t % 2 == 0 ? 1 : -1) * (t is > 250 and <= 500 ? 0.03 : 0.004))];
        Assert.Equal(1, Calculated(new() { Name = "base", Covariance = CovarianceEstimator.Equal }, shocks).Nodes[0].Value, 1e-15);
    }

    [Fact]
    public void Challenger_whose_span_is_longer_than_the_history_is_a_finding_and_has_no_figures()
    {
        var book = new HistoryBook(new() { Name = "record", Window = 200 }, [.. HistoryBook.Normals(200, 7).Select(z => 0.01 * z)]);
        var snapshot = book.Snapshot();
        var results = new RunCalculator(snapshot with { Settings = snapshot.Settings with { Challengers = [Stressed(new() { Name = "base" })] } }, 2, null, CancellationToken.None).Calculate();
        Assert.Contains("200 complete days of shocks, fewer than the span of 250 days", results.Findings.One(FindingCodes.ModelFailed).Message, StringComparison.Ordinal);
        var challenger = Assert.Single(results.Models);
        Assert.Equal(("stress", ModelKind.Stressed, null, null), (challenger.Name, challenger.Kind, challenger.Calibration, challenger.Simulation));
        Assert.Empty(challenger.Nodes);
        Assert.NotEmpty(results.Nodes);
    }

    [Fact]
    public void Record_whose_span_is_longer_than_the_history_stops_the_run_with_a_finding()
    {
        var results = Calculated(new() { Name = "base" }, [.. HistoryBook.Normals(200, 7).Select(z => 0.01 * z)]);
        var finding = results.Findings.One(FindingCodes.ModelUnusable);
        Assert.Equal((FindingSeverity.Blocking, "stress"), (finding.Severity, finding.Subject));
        Assert.Contains("span of 250 days", finding.Message, StringComparison.Ordinal);
        Assert.Empty(results.Nodes);
    }

    private static ModelSettings Stressed(ModelSettings of) => new() { Name = "stress", Kind = ModelKind.Stressed, Span = Span, Stressed = of, Window = 200 };

    private static HistoryBook Book(ModelSettings of, double[] shocks) => new(Stressed(of), shocks) { Scenarios = 2_000 };

    private static RunResults Calculated(ModelSettings of, double[] shocks) => new RunCalculator(Book(of, shocks).Snapshot(), 2, null, CancellationToken.None).Calculate();

    private static ModelParameter Parameter(RunResults results, string name) => Assert.Single(results.Calibration!.Parameters, p => p.Name.EndsWith(name, StringComparison.Ordinal));
}
