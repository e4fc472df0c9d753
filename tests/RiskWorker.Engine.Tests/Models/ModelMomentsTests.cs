using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Models;
using RiskWorker.Engine.Tests.Plans;
using RiskWorker.Numerics.Distributions;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>First and second moments of simulated moves under each law, within four standard errors of what the law says.</summary>
public sealed class ModelMomentsTests
{
    private const int N = 200_000;

    private static readonly JumpSettings s_jumps = new()
    {
        CommonPerYear = 30,
        Common = new Dictionary<string, JumpSize> { ["X"] = new(-0.05, 0.04) },
        Own = new Dictionary<string, OwnJumps> { ["X"] = new(50, new(0.02, 0.03)) },
    };

    // The drift gives up what jumps are expected to add: E[S(h)] = S(0) e^(mu h).
    [Theory]
    [InlineData(1, 0.0)]
    [InlineData(10, 0.0)]
    [InlineData(10, 0.5)]
    public void Price_under_jumps_is_expected_to_grow_at_the_drift(int days, double mu) =>
        AssertMean(Math.Exp(mu * days / 252), Levels(Jumps(mu), days));

    // By hand: the expected logarithm is the drift less half the variance, less rate times E[e^J - 1 - J] for both kinds of jump.
    [Fact]
    public void Logarithm_under_jumps_has_the_mean_and_the_variance_of_the_mixture()
    {
        var logs = Levels(Jumps(0), 10).Select(x => Math.Log(x)).ToArray();
        const double H = 10.0 / 252, Variance = 0.25 * 0.25;
        double Excess(double mean, double deviation) => Math.Exp(mean + (deviation * deviation / 2)) - 1 - mean;
        AssertMean(H * (-(Variance / 2) - (30 * Excess(-0.05, 0.04)) - (50 * Excess(0.02, 0.03))), logs);
        var mean = logs.Average();
        AssertMean(H * (Variance + (30 * ((0.05 * 0.05) + (0.04 * 0.04))) + (50 * ((0.02 * 0.02) + (0.03 * 0.03)))), [.. logs.Select(x => (x - mean) * (x - mean))]);
    }

    [Theory]
    [InlineData(1)]
    [InlineData(10)]
    public void Factor_of_normal_shocks_under_jumps_is_expected_to_stay(int days) =>
        AssertMean(1, Levels(new SpotBook(new() { Kind = ModelKind.JumpDiffusion, Jumps = s_jumps }, days) { Values = [1], Shock = ShockKind.Normal }));

    // The exponential of a t variate has no expectation: the log-drift of half the variance is a convention, and what is held is the mean of the
    // logarithm. Its variance is the covariance's but for the cut of the mixing variable.
    [Theory]
    [InlineData(5, 1)]
    [InlineData(5, 10)]
    [InlineData(12, 10)]
    public void Logarithm_under_student_t_has_the_drift_of_the_convention_and_the_variance_of_the_covariance(double nu, int days)
    {
        var model = new ModelSettings { Kind = ModelKind.StudentT, DegreesOfFreedom = nu, Drift = DriftKind.Explicit, Drifts = new Dictionary<string, double> { ["X"] = 0.1 } };
        var logs = Levels(new SpotBook(model, days) { Values = [1] }).Select(x => Math.Log(x)).ToArray();
        var (h, mean) = (days / 252.0, logs.Average());
        AssertMean((0.1 - (0.25 * 0.25 / 2)) * h, logs);
        var mixing = new MixingQuantile(nu);
        AssertMean(0.25 * 0.25 * h * mixing.Mean / mixing.UncutMean, [.. logs.Select(x => (x - mean) * (x - mean))]);
    }

    // Residuals of mean 0 and variance 1 under a GARCH process: the variance of h days is the sum of the forecasts, v_k = level + (alpha + beta)^(k - 1)
    // (v_1 - level) (Bollerslev 1986); under exponential weights it is h v_1.
    [Theory]
    [InlineData(VolatilityFilter.Ewma, 1)]
    [InlineData(VolatilityFilter.Ewma, 10)]
    [InlineData(VolatilityFilter.Garch, 1)]
    [InlineData(VolatilityFilter.Garch, 10)]
    public void Filtered_moves_have_no_drift_and_the_forecast_variance(VolatilityFilter filter, int days)
    {
        var book = new HistoryBook(new() { Kind = ModelKind.FilteredHistorical, Volatility = filter, Window = 1_500 }, GarchHistory.Of(1_500, 3)) { Horizons = [days] }.Compiled();
        var logs = book.Losses(N)[0].Select(loss => Math.Log(1 - loss)).ToArray();
        var law = (FilteredHistoryLaw)book.Plan.Law;
        var (process, variance, expected) = (law.Processes[0], law.Variances[0], 0.0);
        for (var day = 0; day < days; day++)
        {
            expected += variance;
            variance = process.Omega + ((process.Alpha + process.Beta) * variance);
        }
        AssertMean(0, logs);
        AssertMean(expected, [.. logs.Select(x => x * x)]);
    }

    private static SpotBook Jumps(double mu) => new(
        new() { Kind = ModelKind.JumpDiffusion, Jumps = s_jumps, Drift = DriftKind.Explicit, Drifts = new Dictionary<string, double> { ["X"] = mu } }, 1)
    { Values = [1] };

    private static double[] Levels(SpotBook book, int days) => Levels(book with { Days = days });

    // One unit at 1 loses 1 - S.
    private static double[] Levels(SpotBook book) => [.. CompiledBook.Of(book.Snapshot(), book.Days).Losses(N)[0].Select(loss => 1 - loss)];

    private static void AssertMean(double expected, double[] values)
    {
        var found = values.Average();
        var error = Math.Sqrt(values.Average(v => (v - found) * (v - found)) / values.Length);
        Assert.True(Math.Abs(found - expected) <= 4 * error, $"{found:r} is {(found - expected) / error:f2} standard errors from {expected:r}");
    }
}
