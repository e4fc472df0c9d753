using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class HitRebateTests
{
    // mpmath at 120 digits (Data/README.md), without a drift and with weight 1; held to 2g(a), the value where the rate is 0.
    [Fact]
    public void Value_imaginary_exponent_is_within_the_stated_error()
    {
        double worst = 0;
        int rows = 0;
        foreach (double[] n in Table.Rows("hit-reference.csv").Select(row => row.Select(Table.Number).ToArray()))
        {
            double level = 2 * ScaledNormalTail.Of(Math.Min(n[0], 40));
            worst = Math.Max(worst, Math.Abs(HitRebate.Value(n[0], 0, n[1], 1) - n[2] - n[3]) / level);
            rows++;
        }

        Assert.Equal(300, rows);
        Assert.True(worst < 1e-15, $"The largest error is {worst:R}.");
    }
}
