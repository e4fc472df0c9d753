using System.Globalization;
using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Runs;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Tests.Runs;

/// <summary>
/// The whole chain from snapshot to VaR and ES, with a given covariance, against closed forms of the log-normal law
/// (Data/worked-examples.csv, rows LNV, LNE, LN2V, LN2E and LN-short rows; each row's own source stands in the file).
/// </summary>
public sealed class LogNormalCasesTests
{
    private const int Scenarios = 400_000;
    private static readonly DateOnly s_asOf = new(2026, 11, 27);

    /// <summary>Long position of value V: VaR = V(1 - exp(m + z s)), ES = V(1 - exp(m + s²/2) Phi(z - s)/(1 - c)), m = (mu - sigma²/2) h, s = sigma sqrt(h), z = Phi^-1(1 - c).</summary>
    [Theory]
    [InlineData("0.975", 1, 0.08, 0.25, 1_000_000, 30207.43324322006, 0)]
    [InlineData("0.99", 1, 0.08, 0.25, 1_000_000, 35787.02751974727, 40907.49358471724)]
    [InlineData("0.975", 10, 0.08, 0.25, 1_000_000, 91239.79365530288, 0)]
    [InlineData("0.99", 20, 0.05, 0.4, 1_000_000, 232433.88472041738, 260745.39001219443)]
    [InlineData("0.975", 252, 0.0, 0.2, 100, 33.76709531480084, 38.44908446649002)]
    [InlineData("0.99", 252, 0.0, 0.2, 100, 38.446875731989714, 42.372353979569645)]
    public void Long_position_meets_its_closed_form(string confidence, int days, double mu, double sigma, double value, double var, double es)
    {
        var level = decimal.Parse(confidence, CultureInfo.InvariantCulture);
        var results = Measured([("X", 1.0, value)], new double[,] { { sigma * sigma / 252 } }, mu, level, days);
        var deviation = sigma * Math.Sqrt(days / 252.0);
        // Standard error of a quantile: sqrt(c(1-c)/N) over the density of the loss there, phi(z)/(s (V - VaR)).
        var z = InverseNormal.Of((double)(1 - level));
        var density = Math.Exp(-z * z / 2) / Math.Sqrt(2 * Math.PI) / (deviation * (value - var));
        var error = Math.Sqrt((double)(level * (1 - level)) / Scenarios) / density;
        AssertWithin(var, MeasureOf(results, MeasureKind.Var).Value, 4 * error);
        if (es > 0) AssertWithin(es, MeasureOf(results, MeasureKind.Es).Value, 4 * ErrorOf(MeasureOf(results, MeasureKind.Es)));
    }

    /// <summary>Short position: VaR = V(exp(m + z s) - 1), the loss having no upper bound.</summary>
    [Theory]
    [InlineData("0.975", 45.06225322879847, 56.82782657559136)]
    [InlineData("0.99", 56.09109213838135, 67.37152290146733)]
    public void Short_position_meets_its_closed_form(string confidence, double var, double es)
    {
        var level = decimal.Parse(confidence, CultureInfo.InvariantCulture);
        var results = Measured([("X", 1.0, -100)], new double[,] { { 0.04 / 252 } }, 0, level, 252);
        AssertInside(var, MeasureOf(results, MeasureKind.Var));
        AssertInside(es, MeasureOf(results, MeasureKind.Es));
    }

    /// <summary>Two correlated assets, both long, each row by conditioning quadrature.</summary>
    [Theory]
    [InlineData("0.99", 1, 600_000, 400_000, 0.08, 0.05, 0.25, 0.15, 0.5, 26851.727359718636, 30715.089785080978)]
    [InlineData("0.99", 10, 600_000, 400_000, 0.08, 0.05, 0.25, 0.15, 0.5, 80993.25912661961, 92352.02271950667)]
    [InlineData("0.975", 20, 500_000, 500_000, 0, 0, 0.3, 0.4, -0.3, 111110.3819492293, 130397.36889585004)]
    [InlineData("0.99", 20, 500_000, 500_000, 0, 0, 0.3, 0.4, -0.3, 129999.76085884433, 146933.2740579077)]
    public void Two_correlated_positions_meet_the_quadrature(string confidence, int days, double v1, double v2, double mu1, double mu2, double sigma1, double sigma2, double rho, double var, double es)
    {
        var cross = rho * sigma1 * sigma2 / 252;
        var covariance = new double[,] { { sigma1 * sigma1 / 252, cross }, { cross, sigma2 * sigma2 / 252 } };
        var results = Measured([("X", 1.0, v1), ("Y", 1.0, v2)], covariance, [mu1, mu2], decimal.Parse(confidence, CultureInfo.InvariantCulture), days);
        AssertInside(var, MeasureOf(results, MeasureKind.Var));
        AssertInside(es, MeasureOf(results, MeasureKind.Es));
    }

    // Four standard errors are 2.04 half-widths of a 95% interval; the two ends of a quantile's interval differ, so each side has its own.
    private static void AssertInside(double expected, MeasureResult measure)
    {
        var side = expected < measure.Value ? measure.Value - measure.Low!.Value : measure.High!.Value - measure.Value;
        AssertWithin(expected, measure.Value, 4 / 1.959963984540054 * side);
    }

    private static double ErrorOf(MeasureResult measure) => (measure.High!.Value - measure.Low!.Value) / 2 / 1.959963984540054;

    private static void AssertWithin(double expected, double actual, double tolerance) =>
        Assert.True(Math.Abs(actual - expected) <= tolerance, $"{actual:r} differs from {expected:r} by {Math.Abs(actual - expected):g3}, more than {tolerance:g3}");

    private static MeasureResult MeasureOf(RunResults results, MeasureKind kind) => results.Nodes[0].Measures.Single(m => m.Spec.Kind == kind);

    private static RunResults Measured((string Factor, double Price, double Quantity)[] holdings, double[,] covariance, double mu, decimal confidence, int days) =>
        Measured(holdings, covariance, [.. holdings.Select(_ => mu)], confidence, days);

    private static RunResults Measured((string Factor, double Price, double Quantity)[] holdings, double[,] covariance, double[] mu, decimal confidence, int days)
    {
        var entries = from i in Enumerable.Range(0, holdings.Length) from j in Enumerable.Range(i, holdings.Length - i) select new CovarianceEntry(holdings[i].Factor, holdings[j].Factor, covariance[i, j]);
        var snapshot = new SnapshotBuilder
        {
            AsOf = s_asOf,
            Settings = new RunSettings
            {
                Model = new ModelSettings { Covariance = CovarianceEstimator.Given, Drift = DriftKind.Explicit, Drifts = holdings.Zip(mu).ToDictionary(h => h.First.Factor, h => h.Second) },
                Measures = [new(MeasureKind.Var, new(confidence), new(days)), new(MeasureKind.Es, new(confidence), new(days))],
                Simulation = new SimulationSettings { Scenarios = Scenarios },
            },
            Books = [new("ALL", null, "All", "EUR")],
            Factors = [.. holdings.Select(h => new Factor(h.Factor, FactorClass.Equity, ShockKind.Lognormal, "EUR"))],
            Observations = [.. holdings.Select(h => new Observation(s_asOf, h.Factor, h.Price))],
            Instruments = [.. holdings.Select(h => new Spot(h.Factor) { Name = h.Factor + "-UNIT", Currency = "EUR" })],
            Positions = [.. holdings.Select(h => new Position("ALL", h.Factor + "-UNIT", h.Quantity))],
            Covariance = [.. entries],
        }.Build();
        return new RunCalculator(snapshot, Environment.ProcessorCount, null, CancellationToken.None).Calculate();
    }
}
