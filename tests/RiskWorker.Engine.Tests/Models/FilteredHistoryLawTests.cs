using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Models;
using RiskWorker.Numerics.Estimation;

namespace RiskWorker.Engine.Tests.Models;

public sealed class FilteredHistoryLawTests
{
    [Fact]
    public void Garch_process_of_a_seeded_history_is_near_the_planted_one_and_its_forecast_is_the_fits()
    {
        var shocks = GarchHistory.Of(2_500, 11);
        var book = new HistoryBook(Filtered(VolatilityFilter.Garch, 2_500), shocks).Compiled();
        var law = (FilteredHistoryLaw)book.Plan.Law;
        var window = ShockWindow.Newest(ShockTable.From(book.Snapshot), 2_500);
        var fit = GarchFit.Of(window.Row(0));

        Assert.Equal(fit.Variance.Forecast, law.Variances[0]);
        Assert.Equal(fit.Parameters with { Mean = 0 }, law.Processes[0]);
        // The asymptotic errors at 2,500 days are some 0.015 of alpha and 0.025 of beta.
        Assert.Equal(GarchHistory.Alpha, law.Processes[0].Alpha, 0.05);
        Assert.Equal(GarchHistory.Beta, law.Processes[0].Beta, 0.08);
        Assert.Equal(2_500, law.Days);
    }

    [Theory]
    [InlineData(VolatilityFilter.Ewma)]
    [InlineData(VolatilityFilter.Garch)]
    public void Residuals_have_mean_0_and_variance_1_and_are_all_there(VolatilityFilter filter)
    {
        var law = (FilteredHistoryLaw)new HistoryBook(Filtered(filter, 400), GarchHistory.Of(600, 1), GarchHistory.Of(600, 2)).Compiled().Plan.Law;
        Assert.Equal(800, law.Residuals.Length);
        foreach (var row in law.Residuals.Chunk(400))
        {
            Assert.Equal(0, row.Average(), 1e-14);
            Assert.Equal(1, row.Average(z => z * z), 1e-13);
        }
        Assert.Equal(law.Residuals.Max(Math.Abs), law.Furthest);
    }

    [Fact]
    public void Garch_with_fewer_days_than_it_needs_is_refused()
    {
        var refusal = Assert.Throws<CalibrationException>(() => new HistoryBook(Filtered(VolatilityFilter.Garch, 500), GarchHistory.Of(99, 1)).Compiled());
        Assert.Contains("99 days; it needs 100", refusal.Message, StringComparison.Ordinal);
    }

    private static ModelSettings Filtered(VolatilityFilter filter, int window) => new() { Kind = ModelKind.FilteredHistorical, Volatility = filter, Window = window };
}
