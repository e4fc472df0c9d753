using System.Runtime.InteropServices;
using System.Security.Cryptography;
using RiskWorker.Numerics.Options;
using RiskWorker.Numerics.Paths;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Paths;

/// <summary>The first half of SHA-256 over the bits of prices: the same on every hardware and in every setting.</summary>
public sealed class PricerBitsTests
{
    [Theory]
    [InlineData("american", "dbff9134401473ad33b193da2f633a82")]
    [InlineData("asian", "7fb72487f2afabf405440ce75be76df0")]
    [InlineData("lookback", "4e15f78e161fae3b7fca31cca7c31f10")]
    public void Prices_bits_are_the_pinned_ones(string name, string expected)
    {
        double[] prices = name switch
        {
            "american" => Americans(),
            "asian" => Paths(ArithmeticAsianPayoff.OfFixings(Dates.Flat(9, 1, 0.05, 0.01), 3, 290, 100, true)),
            _ => [.. Paths(new LookbackPayoff(Dates.Flat(9, 1, 0.05, 0.01), false, null, 97, true)), .. Paths(new LookbackPayoff(Dates.Flat(2, 1, 0.05, 0.01), true, 105, null, true))],
        };
        Assert.DoesNotContain(prices, double.IsNaN);
        Assert.Equal(expected, Convert.ToHexStringLower(SHA256.HashData(MemoryMarshal.AsBytes<double>(prices)))[..32]);
    }

    private static double[] Americans()
    {
        var numbers = new SeededNumbers(2_026);
        var prices = new List<double>();
        for (int i = 0; i < 60; i++)
        {
            var option = new AmericanOption(
                100, numbers.Between(0.01, 5), numbers.Between(0.02, 0.9), numbers.Between(-0.02, 0.1), numbers.Between(-0.03, 0.1), i % 2 == 0);
            for (double spot = 60; spot < 170; spot += 10)
                prices.Add(option.Value(spot));
        }

        return [.. prices];
    }

    private static double[] Paths(PathPayoff payoff)
    {
        double[] values = new double[21], errors = new double[21];
        new PathPricer(11, 2048).Price(payoff, [0, 0.15, 0.4], [70, 85, 95, 100, 105, 120, 150], values, errors);
        return [.. values, .. errors];
    }
}
