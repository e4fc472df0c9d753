using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Simulation;

/// <summary>
/// Simulated levels against the moments of the log-normal law, each within four standard errors of its estimate over N scenarios.
/// With s = sigma sqrt(h), w = e^(s²): E S = S0 e^(mu h), Var S = (E S)² (w - 1), fourth central moment (Var S)² (w⁴ + 2w³ + 3w² - 3).
/// </summary>
public sealed class LogNormalMomentsTests
{
    private const int N = 200_000;
    private const double S0 = 80, T0 = 30;

    [Theory]
    [InlineData(0.08, 0.25, 1)]
    [InlineData(0.08, 0.25, 10)]
    [InlineData(-0.1, 0.4, 126)]
    [InlineData(0.05, 0.3, 252)]
    public void Levels_have_the_moments_of_the_law(double mu, double sigma, int days)
    {
        var (levels, _) = Levels(mu, sigma, 0, 0.2, 0, days);
        var (h, s) = (days / 252.0, sigma * Math.Sqrt(days / 252.0));
        var w = Math.Exp(s * s);
        var mean = S0 * Math.Exp(mu * h);
        var variance = S0 * S0 * Math.Exp(2 * mu * h) * (Math.Exp(sigma * sigma * h) - 1);
        var fourth = variance * variance * ((w * w * w * w) + (2 * w * w * w) + (3 * w * w) - 3);
        AssertMean(mean, levels, Math.Sqrt(variance));
        AssertMean(variance, levels.Select(l => (l - mean) * (l - mean)), Math.Sqrt(fourth - (variance * variance)));
        // Log-returns are normal: their square has the variance 2 s⁴ about its mean.
        var drift = (mu - (sigma * sigma / 2)) * h;
        var returns = levels.Select(l => Math.Log(l / S0)).ToArray();
        AssertMean(drift, returns, s);
        AssertMean(s * s, returns.Select(r => (r - drift) * (r - drift)), s * s * Math.Sqrt(2));
    }

    [Theory]
    [InlineData(0.6, 10)]
    [InlineData(-0.3, 252)]
    [InlineData(1.0, 20)]
    public void Two_factors_have_the_correlation_of_the_law(double rho, int days)
    {
        const double Mu = 0.08, Nu = 0.03, Sigma = 0.25, Tau = 0.4;
        var (first, second) = Levels(Mu, Sigma, Nu, Tau, rho, days);
        var h = days / 252.0;
        var (s, t) = (Sigma * Math.Sqrt(h), Tau * Math.Sqrt(h));
        var x = first.Select(l => (Math.Log(l / S0) - ((Mu - (Sigma * Sigma / 2)) * h)) / s).ToArray();
        var y = second.Select(l => (Math.Log(l / T0) - ((Nu - (Tau * Tau / 2)) * h)) / t).ToArray();
        // Var(XY) = 1 + rho² of two standard normals.
        AssertMean(rho, x.Zip(y, (a, b) => a * b), Math.Sqrt(1 + (rho * rho)));
        // The product of the levels is log-normal too, with the log-variance s² + t² + 2 rho s t.
        var product = S0 * T0 * Math.Exp(((Mu + Nu) * h) + (rho * s * t));
        AssertMean(product, first.Zip(second, (a, b) => a * b), product * Math.Sqrt(Math.Exp((s * s) + (t * t) + (2 * rho * s * t)) - 1));
        if (rho == 1) Assert.All(x.Zip(y), p => Assert.Equal(p.First, p.Second, 1e-12));
    }

    /// <summary>Levels of two correlated assets after <paramref name="days"/>, read off the losses of one unit of each.</summary>
    private static (double[] First, double[] Second) Levels(double mu, double sigma, double nu, double tau, double rho, int days)
    {
        var book = CompiledBook.Of(new SnapshotBuilder
        {
            Settings = new() { Model = new() { Covariance = CovarianceEstimator.Given, Drift = DriftKind.Explicit, Drifts = new Dictionary<string, double> { ["X"] = mu, ["Y"] = nu } } },
            Books = [new("ALL", null, "All", "EUR"), new("ONE", "ALL", "One", "EUR"), new("TWO", "ALL", "Two", "EUR")],
            Factors = [new("X", FactorClass.Equity, ShockKind.Lognormal, "EUR"), new("Y", FactorClass.Equity, ShockKind.Lognormal, "EUR")],
            Observations = [new(new(2026, 11, 27), "X", S0), new(new(2026, 11, 27), "Y", T0)],
            Covariance = [new("X", "X", sigma * sigma / 252), new("Y", "Y", tau * tau / 252), new("X", "Y", rho * sigma * tau / 252)],
            Instruments = [new Spot("X") { Name = "X", Currency = "EUR" }, new Spot("Y") { Name = "Y", Currency = "EUR" }],
            Positions = [new("ONE", "X", 1), new("TWO", "Y", 1)],
        }.Build(), days);
        var losses = book.Losses(N);
        return ([.. losses[book.RowOf("ONE", days)].Select(l => S0 - l)], [.. losses[book.RowOf("TWO", days)].Select(l => T0 - l)]);
    }

    private static void AssertMean(double expected, IEnumerable<double> values, double deviation)
    {
        var found = values.Average();
        var error = (found - expected) / (deviation / Math.Sqrt(N));
        Assert.True(Math.Abs(error) <= 4, $"{found:r} is {error:f2} standard errors from {expected:r}");
    }
}
