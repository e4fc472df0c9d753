using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Random;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Random;

public sealed class NormalDrawsTests
{
    private static readonly DrawStream Stream = new(7, DrawPurpose.FactorMoves, 0);

    [Fact]
    public void FillPair_equals_At_and_the_quantile_of_the_uniform()
    {
        double[] first = new double[5003], second = new double[5003];
        NormalDraws.FillPair(Stream, 100, 4, first, second);
        for (int s = 0; s < first.Length; s++)
        {
            BitAssert.Equal(NormalDraws.At(Stream, 100 + (ulong)s, 8), first[s]);
            BitAssert.Equal(InverseNormal.Of(UniformDraws.At(Stream, 100 + (ulong)s, 9)), second[s]);
        }
    }

    // Standard errors of n standard normals: mean 1/√n, variance √(2/n), third moment √(15/n), fourth √(96/n).
    [Fact]
    public void FillPair_moments_are_those_of_standard_normals()
    {
        const int n = 1_000_000;
        double[] z = new double[n], other = new double[n];
        NormalDraws.FillPair(Stream, 0, 0, z, other);
        Assert.InRange(z.Average(), -4 / Math.Sqrt(n), 4 / Math.Sqrt(n));
        Assert.InRange(z.Average(x => x * x) - 1, -4 * Math.Sqrt(2.0 / n), 4 * Math.Sqrt(2.0 / n));
        Assert.InRange(z.Average(x => x * x * x), -4 * Math.Sqrt(15.0 / n), 4 * Math.Sqrt(15.0 / n));
        Assert.InRange(z.Average(x => x * x * x * x) - 3, -4 * Math.Sqrt(96.0 / n), 4 * Math.Sqrt(96.0 / n));
    }
}
