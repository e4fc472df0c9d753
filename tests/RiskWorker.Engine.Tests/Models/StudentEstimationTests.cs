using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Models;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>Degrees of freedom fitted to seeded histories of planted ones.</summary>
public sealed class StudentEstimationTests
{
    private const int Days = 1_200;

    [Theory]
    [InlineData(4)]
    [InlineData(8)]
    public void Common_degrees_of_freedom_of_a_multivariate_t_are_found_within_their_interval(double nu)
    {
        var law = Fitted(new() { Kind = ModelKind.StudentT, Covariance = CovarianceEstimator.Equal, Window = Days }, Multivariate(nu, 21));
        Assert.InRange(nu, law.Fit!.IntervalLow, law.Fit.IntervalHigh);
        Assert.InRange(law.DegreesOfFreedom, 0.75 * nu, 1.35 * nu);
    }

    [Fact]
    public void Own_margins_are_found_one_by_one_and_the_copula_besides()
    {
        // Two factors of one copula of 5 degrees, each carried to a margin of its own would need its quantiles; two independent t series tell the margins.
        var law = Fitted(
            new() { Kind = ModelKind.StudentT, Covariance = CovarianceEstimator.Equal, Margins = StudentMargins.Own, Window = Days },
            [Univariate(3.5, 31), Univariate(10, 32)]);
        Assert.InRange(law.Margins![0], 2.8, 4.6);
        Assert.InRange(law.Margins[1], 6, 20);
    }

    // Normal shocks whose deviation swings between a third and three times its middle: over one deviation they look like a t of few degrees, over the
    // deviation known the evening before they do not.
    [Fact]
    public void Exponential_weights_standardise_each_day_by_its_own_deviation()
    {
        double[] shocks = [.. HistoryBook.Normals(Days, 41).Select((z, t) => 0.01 * z * Math.Exp(1.1 * Math.Sin(t / 100.0)))];
        var equal = Fitted(new() { Kind = ModelKind.StudentT, Covariance = CovarianceEstimator.Equal, Window = Days }, [shocks]);
        var ewma = Fitted(new() { Kind = ModelKind.StudentT, Window = Days }, [shocks]);
        Assert.InRange(equal.DegreesOfFreedom, 2, 5);
        Assert.InRange(ewma.DegreesOfFreedom, 9, 200);
    }

    [Fact]
    public void Planted_degrees_of_freedom_under_changing_volatility_are_found_through_exponential_weights()
    {
        double[][] shocks = [.. Multivariate(5, 51).Select(row => row.Select((x, t) => x * (t / 300 % 2 == 0 ? 0.7 : 1.6)).ToArray())];
        var law = Fitted(new() { Kind = ModelKind.StudentT, Lambda = 0.97, Window = Days }, shocks);
        Assert.InRange(law.DegreesOfFreedom, 3.5, 7);
    }

    [Fact]
    public void Given_degrees_of_freedom_are_taken_as_they_are()
    {
        var law = Fitted(new() { Kind = ModelKind.StudentT, DegreesOfFreedom = 6.25, Window = Days }, Multivariate(4, 61));
        Assert.Equal((6.25, null, null), (law.DegreesOfFreedom, law.Margins, law.Fit));
    }

    private static StudentLaw Fitted(ModelSettings model, double[][] shocks) => (StudentLaw)new HistoryBook(model, shocks).Compiled().Plan.Law;

    // Three factors over one root of nu / chi-square, the chi-square as a gamma variate by Marsaglia and Tsang (2000).
    private static double[][] Multivariate(double nu, int seed)
    {
        var roots = Roots(nu, seed);
        var normals = Enumerable.Range(0, 3).Select(j => HistoryBook.Normals(Days, (100 * seed) + j)).ToArray();
        return [.. normals.Select((row, j) => row.Select((z, t) => 0.01 * (j == 0 ? z : (0.5 * normals[0][t]) + (0.8 * z)) * roots[t]).ToArray())];
    }

    private static double[] Univariate(double nu, int seed)
    {
        var roots = Roots(nu, seed);
        return [.. HistoryBook.Normals(Days, 7 * seed).Select((z, t) => 0.01 * z * roots[t])];
    }

    private static double[] Roots(double nu, int seed)
    {
        var random = new Random(seed);
        return [.. Enumerable.Range(0, Days).Select(_ => Math.Sqrt(nu / ChiSquare(nu, random)))];
    }

    private static double ChiSquare(double nu, Random random)
    {
        var d = (nu / 2) - (1.0 / 3);
        while (true)
        {
            var z = Enumerable.Range(0, 12).Sum(_ => random.NextDouble()) - 6;
            var v = Math.Pow(1 + (z / Math.Sqrt(9 * d)), 3);
            if (v > 0 && Math.Log(random.NextDouble()) < (z * z / 2) + d - (d * v) + (d * Math.Log(v))) return 2 * d * v;
        }
    }
}
