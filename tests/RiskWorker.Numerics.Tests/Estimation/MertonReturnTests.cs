using RiskWorker.Numerics.Estimation;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Numerics.Tests.Estimation;

public sealed class MertonReturnTests
{
    // European calls, e^(-rT) (S E[e^X; X > k] - K P(X > k)) with k = ln(K/S): worked with the series and, independently, by Lewis' Fourier
    // integral. The drift takes off the mean growth of the jumps. A "day" is a year here.
    [Theory]
    [InlineData(100, 100, 1, 0.05, 1, -0.1, 0.15, 0.2, 12.761288593628755)]
    [InlineData(100, 90, 0.5, 0.03, 0.5, -0.2, 0.3, 0.25, 15.683875893431486)]
    public void Calls_equal_the_worked_examples(double spot, double strike, double years, double rate, double intensity, double mean, double deviation, double sigma, double expected)
    {
        var growth = Math.Exp(mean + (deviation * deviation / 2)) - 1;
        var x = new MertonReturn(rate - (sigma * sigma / 2) - (intensity * growth), sigma, intensity, mean, deviation, years);
        Assert.Equal(expected, Call(x, spot, strike, years, rate), 1e-11);
        // The price is a martingale.
        Assert.Equal(Math.Exp(rate * years), x.GrowthAbove(-50), 1e-14);
    }

    // Haug, The Complete Guide to Option Pricing Formulas (2007), chapter 6: 0.2417 printed (from memory), 0.2417462548537812 recomputed.
    // S = 45, K = 55, T = 0.25, r = 10%, total volatility 25%, three jumps a year that make 40% of the variance, mean growth of a jump 0.
    [Fact]
    public void Call_equals_the_textbook_example()
    {
        const double total = 0.25 * 0.25, intensity = 3, share = 0.4;
        var jump = Math.Sqrt(share * total / intensity);
        var sigma = Math.Sqrt((1 - share) * total);
        var x = new MertonReturn(0.10 - (sigma * sigma / 2), sigma, intensity, -jump * jump / 2, jump, 0.25);
        Assert.Equal(0.2417462548537812, Call(x, 45, 55, 0.25, 0.10), 1e-12);
        Assert.Equal(0.2417, Call(x, 45, 55, 0.25, 0.10), 5e-5);
    }

    // merton-reference.csv: quantiles by Brent's method on scipy's distributions, tail means by numerical integration of the density.
    [Fact]
    public void Losses_equal_quantiles_and_integrals_of_other_software()
    {
        foreach (var row in Table.Rows("estimation/merton-reference.csv"))
        {
            double At(int column) => Table.Number(row[column]);
            var x = new MertonReturn(At(0), At(1), At(2), At(3), At(4), At(5));
            var tail = At(6);

            Assert.Equal(At(7), x.LongLoss(tail).ValueAtRisk, 1e-12);
            Assert.Equal(At(8), x.LongLoss(tail).Shortfall, 1e-10);
            Assert.Equal(At(9), x.ShortLoss(tail).ValueAtRisk, 1e-12);
            Assert.Equal(At(10), x.ShortLoss(tail).Shortfall, 1e-10);
            Assert.Equal(At(11), x.ReturnLoss(tail).Shortfall, 1e-10);
            Assert.Equal(x.ReturnLoss(tail).ValueAtRisk, -Math.Log(1 - x.LongLoss(tail).ValueAtRisk), 1e-14);
        }
    }

    // Draws as a simulation would make them; a share of n draws has a standard error of √(p(1 - p)/n), a tail's mean that of Manistre and Hancock (2005).
    [Fact]
    public void Losses_are_those_of_simulated_returns()
    {
        const int n = 400_000, days = 10;
        double[] count = new double[n], other = new double[n], z = new double[n], size = new double[n], loss = new double[n];
        UniformDraws.FillPair(new(9, DrawPurpose.Jumps, 0), 0, 0, count, other);
        NormalDraws.FillPair(new(9, DrawPurpose.FactorMoves, 0), 0, 0, z, size);
        new PoissonCounts(0.04 * days).Of(count, count);
        for (var s = 0; s < n; s++)
            loss[s] = 1 - Math.Exp((0.01 * Math.Sqrt(days) * z[s]) + (count[s] * -0.05) + (Math.Sqrt(count[s]) * 0.02 * size[s]));

        var (valueAtRisk, shortfall) = new MertonReturn(0, 0.01, 0.04, -0.05, 0.02, days).LongLoss(0.01);

        Assert.Equal(0.01, loss.Count(l => l > valueAtRisk) / (double)n, 4 * Math.Sqrt(0.01 * 0.99 / n));
        var tail = loss.OrderDescending().Take(n / 100).ToArray();
        var spread = tail.Average(l => (l - shortfall) * (l - shortfall)) + (0.99 * (shortfall - valueAtRisk) * (shortfall - valueAtRisk));
        Assert.Equal(shortfall, tail.Average(), 4 * Math.Sqrt(spread / (n * 0.01)));
    }

    [Fact]
    public void Mean_and_variance_are_those_of_the_compound_process()
    {
        var x = new MertonReturn(0.001, 0.012, 0.3, -0.02, 0.03, 10);
        Assert.Equal(10 * (0.001 - (0.3 * 0.02)), x.Mean, 1e-15);
        Assert.Equal(10 * ((0.012 * 0.012) + (0.3 * ((0.02 * 0.02) + (0.03 * 0.03)))), x.Variance, 1e-15);
        Assert.Equal(x.Mean, x.MeanBelow(50), 1e-15);
    }

    [Fact]
    public void Without_jumps_it_is_the_normal()
    {
        var x = new MertonReturn(0.01, 0.02, 0, -0.5, 0.3, 4);
        Assert.Equal(0.5, x.AtMost(0.04), 1e-16);
        Assert.Equal(0.04 - (2.3263478740408411 * 0.04), x.Quantile(0.01), 1e-15);
        // 2.665214220345808 is φ(z)/0.01 at the normal's one-in-a-hundred quantile.
        Assert.Equal((2.665214220345808 * 0.04) - 0.04, x.ReturnLoss(0.01).Shortfall, 1e-14);
    }

    [Fact]
    public void Probabilities_and_quantiles_agree_with_each_other()
    {
        var x = new MertonReturn(0.0005, 0.01, 0.04, -0.05, 0.02, 3);
        var last = double.NegativeInfinity;
        foreach (var p in new[] { 1e-9, 1e-4, 0.01, 0.3, 0.5, 0.8, 0.99, 1 - 1e-9 })
        {
            var quantile = x.Quantile(p);
            Assert.True(quantile > last);
            last = quantile;
            Assert.Equal(p, x.AtMost(quantile), 1e-13);
            Assert.Equal(1, x.AtMost(quantile) + x.Above(quantile), 1e-14);
            Assert.Equal((x.AtMost(quantile + 1e-6) - x.AtMost(quantile - 1e-6)) / 2e-6, x.Density(quantile), 1e-4);
            Assert.Equal(x.GrowthBelow(50), x.GrowthBelow(quantile) + x.GrowthAbove(quantile), 1e-14);
        }
    }

    // A jump of exactly -0.3, one day in 50: what lies beyond the jump's probability is the diffusion's own tail.
    [Fact]
    public void Quantile_beyond_the_probability_of_a_jump_jumps()
    {
        var x = new MertonReturn(0, 0.001, 0.02, -0.3, 0, 1);
        Assert.InRange(x.Quantile(0.015), -0.31, -0.29);
        Assert.InRange(x.Quantile(0.025), -0.01, 0);
    }

    [Fact]
    public void Many_jumps_tend_to_the_normal_of_the_same_mean_and_variance()
    {
        var x = new MertonReturn(0, 0.01, 5, 0.001, 0.004, 2000);
        Assert.Equal((5 * 0.001 * 2000) - (2.3263478740408411 * Math.Sqrt(x.Variance)), x.Quantile(0.01), 0.01 * Math.Sqrt(x.Variance));
    }

    [Fact]
    public void Faulty_arguments_are_refused()
    {
        Assert.Contains("deviation is 0; it must be positive", Assert.Throws<ArgumentOutOfRangeException>(() => new MertonReturn(0, 0, 1, 0, 0, 1)).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => new MertonReturn(double.NaN, 1, 1, 0, 0, 1));
        Assert.Throws<ArgumentOutOfRangeException>(() => new MertonReturn(0, 1, -1, 0, 0, 1));
        Assert.Throws<ArgumentOutOfRangeException>(() => new MertonReturn(0, 1, 1, 0, -1, 1));
        Assert.Throws<ArgumentOutOfRangeException>(() => new MertonReturn(0, 1, 1, 0, 0, 0));
        Assert.Throws<ArgumentOutOfRangeException>(() => new MertonReturn(0, 1, 1, 0, 0, 20_000));
        Assert.Throws<ArgumentOutOfRangeException>(() => new MertonReturn(0, 1, 1, 0, 0, 1).Quantile(1));
        Assert.Throws<ArgumentOutOfRangeException>(() => new MertonReturn(0, 1, 1, 0, 0, 1).ShortLoss(0));
    }

    private static double Call(MertonReturn x, double spot, double strike, double years, double rate)
    {
        var k = Math.Log(strike / spot);
        return Math.Exp(-rate * years) * ((spot * x.GrowthAbove(k)) - (strike * x.Above(k)));
    }
}
