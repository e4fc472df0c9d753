using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Models;
using RiskWorker.Engine.Reductions;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>Scenarios of historical simulation, and the measures on them, by hand.</summary>
public sealed class HistoricalLawTests
{
    private static readonly double[] s_ten = [0.01, -0.03, 0.02, 0.005, -0.01, 0.04, -0.02, 0.015, -0.005, -0.04];

    [Fact]
    public void Scenario_over_one_day_is_the_shock_of_so_many_days_ago()
    {
        var losses = new HistoryBook(Historical(10), s_ten).Compiled().Losses(10)[0];
        for (var i = 0; i < 10; i++) Assert.Equal(1 - Math.Exp(s_ten[9 - i]), losses[i], 1e-15);
    }

    // Scenario i over three days ends i days before the newest shock; neighbours share two days.
    [Fact]
    public void Scenario_over_several_days_is_the_overlapping_sum()
    {
        var book = new HistoryBook(Historical(8), s_ten) { Horizons = [1, 3] }.Compiled();
        var losses = book.Losses(8);
        for (var i = 0; i < 8; i++)
        {
            Assert.Equal(1 - Math.Exp(s_ten[9 - i] + s_ten[8 - i] + s_ten[7 - i]), losses[book.RowOf("ALL", 3)][i], 1e-15);
            Assert.Equal(1 - Math.Exp(s_ten[9 - i]), losses[book.RowOf("ALL")][i], 1e-15);
        }
    }

    // So that the longest horizon has as many scenarios as the window says, and every horizon the same.
    [Theory]
    [InlineData(250, 1, 250)]
    [InlineData(250, 10, 250)]
    [InlineData(495, 10, 491)] // all there are: 500 - 9
    public void Window_and_the_longest_horizon_less_one_are_the_days_used(int window, int longest, int scenarios)
    {
        var model = new HistoryBook(Historical(window), [.. HistoryBook.Normals(500, 1).Select(z => 0.01 * z)]) { Horizons = [1, longest] }.Compiled().Model;
        Assert.Equal(scenarios, model.Law.ScenarioCount);
        Assert.Equal(scenarios + longest - 1, model.Shocks);
    }

    [Fact]
    public void History_shorter_than_the_longest_horizon_is_refused() =>
        Assert.Contains("10 complete days", Assert.Throws<CalibrationException>(() => new HistoryBook(Historical(5), s_ten) { Horizons = [1, 11] }.Compiled()).Message, StringComparison.Ordinal);

    [Fact]
    public void Scenario_beyond_the_history_is_refused() =>
        Assert.Contains("10 scenarios", Assert.Throws<ArgumentOutOfRangeException>(() => new HistoryBook(Historical(10), s_ten).Compiled().Losses(11)).Message, StringComparison.Ordinal);

    // Past days are no draws: no simulation error stands beside them. What so many days say of their law stands apart:
    // with 500 days and 1% the number beyond is binomial, none at all in 0.66% of samples and one at most in 3.98%, eleven or more in 1.3% and ten or
    // more in 3.1% (SciPy): the worst and the 11th worst.
    [Fact]
    public void Interval_is_the_value_and_the_sample_stands_apart()
    {
        double[] shocks = [.. HistoryBook.Normals(500, 2).Select(z => 0.01 * z)];
        var (var, es) = Pair(new HistoryBook(Historical(500), shocks).Measured());
        var losses = shocks.Select(x => 1 - Math.Exp(x)).OrderDescending().ToArray();
        Assert.Equal((var.Value, var.Value), (var.Low, var.High));
        Assert.Equal((es.Value, es.Value), (es.Low, es.High));
        Assert.Equal(losses[5], var.Value, 1e-15); // the 495th smallest of 500
        Assert.Equal(losses[0], var.Sample!.High!.Value, 1e-15);
        Assert.Equal(losses[10], var.Sample.Low!.Value, 1e-15);
        Assert.True(es.Sample!.Low < es.Value && es.Value < es.Sample.High);
    }

    // With 250 days the worst of all is no upper end at 95%: P(no exception) is 8%.
    [Fact]
    public void Sample_without_a_rank_that_reaches_has_no_end()
    {
        var var = new HistoryBook(Historical(250), [.. HistoryBook.Normals(250, 3).Select(z => 0.01 * z)]).Measured()[0];
        Assert.Null(var.Sample!.High);
        Assert.NotNull(var.Sample.Low);
    }

    [Fact]
    public void Overlapping_days_claim_no_sample()
    {
        var measured = new HistoryBook(Historical(400), [.. HistoryBook.Normals(500, 4).Select(z => 0.01 * z)]) { Horizons = [1, 10] }.Measured();
        Assert.All(measured, m => Assert.Equal(m.Spec.Horizon.Days == 1, m.Sample!.Low is not null));
        Assert.All(measured, m => Assert.Equal((m.Value, m.Value), (m.Low, m.High)));
    }

    // Decay 1/2 on ten days: weights 512, 256, ... 1 of 1,023, newest first (Boudoukh, Richardson and Whitelaw 1998). The newest day, -0.04, is the
    // worst and holds half the mass: both measures are its loss.
    [Fact]
    public void Age_weights_on_ten_days_are_those_worked_by_hand()
    {
        var book = new HistoryBook(Historical(10) with { AgeWeight = 0.5 }, s_ten);
        var law = Assert.IsType<HistoricalLaw>(book.Compiled().Model.Law);
        for (var k = 0; k < 10; k++) Assert.Equal(Math.Pow(2, 9 - k) / 1023, law.Weights![k], 1e-16);
        Assert.All(book.Measured(), m =>
        {
            Assert.Equal(1 - Math.Exp(-0.04), m.Value, 1e-15);
            Assert.Equal(new SampleInterval(null, null), m.Sample);
        });
    }

    // Newest day the best; decay 0.9. Weights w_k = 0.9^k (1 - 0.9)/(1 - 0.9^10), k = 0 newest. Worst losses: -0.05 at k = 9 (5.9% of the mass), -0.03 at
    // k = 8 (6.6%), ... so VaR 99% is the loss of k = 9, and so is the whole of ES 97.5%; at 90% the worst two weigh 12.5%:
    // VaR 90% is the loss of k = 8, ES 90% the mean of k = 9 in full and k = 8 for what is left of 10%.
    [Fact]
    public void Weighted_measures_take_the_weights_of_the_worst_days()
    {
        double[] shocks = [-0.05, -0.03, 0.02, 0.005, -0.01, 0.04, -0.02, 0.015, -0.005, 0.06];
        var book = new HistoryBook(Historical(10) with { AgeWeight = 0.9 }, shocks).Compiled();
        var law = (HistoricalLaw)book.Model.Law;
        var series = new HistoricalLoss([.. book.Losses(10)[0].Select((loss, i) => new TailEntry(loss, i)).OrderByDescending(e => e.Loss)], law.Weights, isOverlapping: false);
        double Weight(int k) => Math.Pow(0.9, k) * 0.1 / (1 - Math.Pow(0.9, 10));
        double first = 1 - Math.Exp(-0.05), second = 1 - Math.Exp(-0.03);
        Assert.Equal(first, series.Measure(new(MeasureKind.Var, new(0.99m), new(1)), 0.95m).Value, 1e-15);
        Assert.Equal(first, series.Measure(new(MeasureKind.Es, new(0.975m), new(1)), 0.95m).Value, 1e-14);
        Assert.Equal(second, series.Measure(new(MeasureKind.Var, new(0.9m), new(1)), 0.95m).Value, 1e-15);
        Assert.Equal(((Weight(9) * first) + ((0.1 - Weight(9)) * second)) / 0.1, series.Measure(new(MeasureKind.Es, new(0.9m), new(1)), 0.95m).Value, 1e-14);
        Assert.Equal(2, series.RankOf(0.1m));
        Assert.Equal(1, series.RankOf(0.05m));
    }

    private static (MeasureResult Var, MeasureResult Es) Pair(IReadOnlyList<MeasureResult> measures) => (measures[0], measures[1]);

    private static ModelSettings Historical(int window) => new() { Kind = ModelKind.Historical, Window = window };
}
