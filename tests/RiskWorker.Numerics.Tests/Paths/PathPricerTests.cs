using RiskWorker.Numerics.Paths;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Paths;

public sealed class PathPricerTests
{
    [Fact]
    public void Price_standard_error_is_that_of_many_seeds()
    {
        PathPayoff[] payoffs =
        [
            ArithmeticAsianPayoff.OfFixings(Dates.Flat(6, 1, 0.05, 0), 0, 0, 100, true),
            new LookbackPayoff(Dates.Flat(6, 1, 0.05, 0), false, null, 98, true),
        ];
        foreach (PathPayoff payoff in payoffs)
        {
            var seen = Enumerable.Range(1, 60).Select(seed => Dates.Price(payoff, 0.3, 100, (ulong)seed, 512)).ToArray();
            double mean = seen.Average(price => price.Value);
            // Chi-square with 59 degrees of freedom lies in 28 to 103 but once in 2,000 times.
            Assert.InRange(seen.Sum(price => Math.Pow((price.Value - mean) / price.Error, 2)), 28, 103);
        }
    }

    [Fact]
    public void Price_every_spot_and_volatility_is_the_one_priced_alone()
    {
        var payoff = new LookbackPayoff(Dates.Flat(5, 0.5, 0.03, 0.01), false, 105, 101, true);
        double[] volatilities = [0.1, 0.3], spots = [90, 100, 110], values = new double[6], errors = new double[6];
        new PathPricer(7, 1024).Price(payoff, volatilities, spots, values, errors);
        for (int at = 0; at < 6; at++)
        {
            (double value, double error) = Dates.Price(payoff, volatilities[at / 3], spots[at % 3], 7, 1024);
            BitAssert.Equal(value, values[at]);
            BitAssert.Equal(error, errors[at]);
        }
    }

    // Plain means of the same draws, in ordinary arithmetic, without controls.
    [Fact]
    public void Price_plain_simulation_of_the_same_payoff_agrees()
    {
        PathSchedule schedule = Dates.Flat(3, 1, 0.04, 0.01);
        (double value, _) = Dates.Price(ArithmeticAsianPayoff.OfFixings(schedule, 0, 0, 100, true), 0.3, 100, pairs: 2048);
        var numbers = new SeededNumbers(131);
        double sum = 0, squares = 0;
        const int Paths = 40_000;
        for (int i = 0; i < Paths; i++)
        {
            double spot = 100, total = 0;
            for (int k = 0; k < 3; k++)
            {
                double normal = RiskWorker.Numerics.Kernels.InverseNormal.Of(numbers.Between(1e-12, 1));
                spot *= Math.Exp(((0.03 - 0.045) / 3) + (0.3 * Math.Sqrt(1.0 / 3) * normal));
                total += spot;
            }

            double paid = Math.Exp(-0.04) * Math.Max((total / 3) - 100, 0);
            sum += paid;
            squares += paid * paid;
        }

        double mean = sum / Paths, error = Math.Sqrt(((squares / Paths) - (mean * mean)) / Paths);
        Assert.InRange(Math.Abs(value - mean), 0, 4 * error);
    }

    [Fact]
    public void Price_polynomial_through_chebyshev_spots_stays_within_a_few_errors()
    {
        var payoff = ArithmeticAsianPayoff.OfFixings(Dates.Flat(50, 1, 0.05, 0), 0, 0, 100, true);
        const int Degree = 24;
        double[] nodes = [.. Enumerable.Range(0, Degree + 1).Select(i => 105 + (35 * Math.Cos(i * Math.PI / Degree)))];
        double[] between = [.. Enumerable.Range(0, 40).Select(i => 70.7 + (1.7 * i))];
        double[] atNodes = new double[Degree + 1], direct = new double[40], errors = new double[40];
        new PathPricer(1, 1024).Price(payoff, [0.2], nodes, atNodes, new double[Degree + 1]);
        new PathPricer(1, 1024).Price(payoff, [0.2], between, direct, errors);
        for (int i = 0; i < between.Length; i++)
            Assert.InRange(Math.Abs(Interpolated(nodes, atNodes, between[i]) - direct[i]), 0, 5e-3);
        Assert.InRange(errors.Max(), 1e-5, 3e-3);
    }

    [Fact]
    public void Price_faulty_arguments_are_refused_by_name()
    {
        var payoff = ArithmeticAsianPayoff.OfFixings(Dates.Flat(2, 1, 0.03, 0), 0, 0, 100, true);
        var pricer = new PathPricer(1, 512);
        Assert.Throws<ArgumentOutOfRangeException>("pairs", () => new PathPricer(1, 100));
        Assert.Throws<ArgumentException>("values", () => pricer.Price(payoff, [0.2], [100], new double[2], new double[2]));
        Assert.Throws<ArgumentException>("standardErrors", () => pricer.Price(payoff, [0.2], [100], new double[1], new double[2]));
        Assert.Throws<ArgumentOutOfRangeException>("volatilities", () => pricer.Price(payoff, [-0.2], [100], new double[1], new double[1]));
        Assert.Throws<ArgumentOutOfRangeException>("spots", () => pricer.Price(payoff, [0.2], [0], new double[1], new double[1]));
    }

    [Fact]
    public void New_faulty_schedule_is_refused_by_name()
    {
        Assert.Throws<ArgumentException>("years", () => new PathSchedule([], [], 1));
        Assert.Throws<ArgumentException>("years", () => new PathSchedule([0.5, 0.5], [0, 0], 1));
        Assert.Throws<ArgumentException>("years", () => new PathSchedule([-0.5], [0], 1));
        Assert.Throws<ArgumentException>("logForwards", () => new PathSchedule([0.5, 1], [0], 1));
        Assert.Throws<ArgumentException>("logForwards", () => new PathSchedule([0], [0.1], 1));
        Assert.Throws<ArgumentOutOfRangeException>("discount", () => new PathSchedule([0.5], [0], 0));
        Assert.Throws<ArgumentException>("paymentYears", () => PathSchedule.Flat([0.5], 0, 0, 0.4));
        Assert.Throws<ArgumentException>("rate", () => PathSchedule.Flat([0.5], double.NaN, 0, 0.5));
    }

    private static double Interpolated(double[] nodes, double[] values, double at)
    {
        double top = 0, bottom = 0;
        for (int k = 0; k < nodes.Length; k++)
        {
            double weight = (k % 2 == 0 ? 1 : -1) * (k == 0 || k == nodes.Length - 1 ? 0.5 : 1) / (at - nodes[k]);
            top += weight * values[k];
            bottom += weight;
        }

        return top / bottom;
    }
}
