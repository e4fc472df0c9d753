using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Tests.Kernels;

/// <summary>Errors against mpmath at 60 digits (Data/README.md), held to what the kernels' documentation states.</summary>
public sealed class KernelReferenceTests
{
    [Theory]
    [InlineData("exp", 0.65)]
    [InlineData("log", 0.78)]
    [InlineData("cdf", 5.3)]
    [InlineData("density", 1.9)]
    [InlineData("quantile", 4.9)]
    public void Of_error_in_ulps_is_within_the_stated_bound(string function, double bound)
    {
        int rows = 0;
        foreach (string[] row in Table.Rows("kernel-reference.csv").Where(row => row[0] == function))
        {
            double x = Table.Number(row[1]), nearest = Table.Number(row[2]);
            double ulp = Math.BitIncrement(Math.Abs(nearest)) - Math.Abs(nearest);
            double error = Math.Abs(((Evaluate(function, x) - nearest) / ulp) - Table.Number(row[3]));
            Assert.True(error < bound, $"{function}({x:R}) is wrong by {error:F3} ulp.");
            rows++;
        }

        Assert.InRange(rows, 390, 400);
    }

    // `1-Phi` goes through the lower tail: Φ(-x). Expected are the nearest doubles, so half an ulp comes on top.
    [Theory]
    [InlineData("Phi", "cdf", 70, 5.3)]
    [InlineData("1-Phi", "upper", 16, 5.3)]
    [InlineData("phi", "density", 11, 1.9)]
    [InlineData("PhiInverse", "quantile", 95, 4.9)]
    public void Of_published_points_are_reproduced(string column, string function, int count, double bound)
    {
        int rows = 0;
        foreach (string[] row in Table.Rows("normal-vectors.csv").Where(row => row[1] == column))
        {
            double x = Table.Number(row[2]), nearest = Table.Number(row[5]);
            double ulp = Math.BitIncrement(Math.Abs(nearest)) - Math.Abs(nearest);
            double error = Math.Abs(Evaluate(function, x) - nearest) / ulp;
            Assert.True(error < bound + 0.5, $"{row[0]} is wrong by {error:F3} ulp.");
            rows++;
        }

        Assert.Equal(count, rows);
    }

    private static double Evaluate(string function, double x) => function switch
    {
        "exp" => Exponential.Of(x),
        "log" => Logarithm.Of(x),
        "cdf" => NormalCdf.Of(x),
        "upper" => NormalCdf.Of(-x),
        "density" => NormalDensity.Of(x),
        "quantile" => InverseNormal.Of(x),
        _ => throw new ArgumentOutOfRangeException(nameof(function), function, "No such function."),
    };
}
