using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class BookProfitTests
{
    private const double Guard = -7.75;

    private static readonly double[] Odd =
    [
        0.0, -0.0, 1.0, -1.0, double.Epsilon, -double.Epsilon, 2.2e-308, double.MaxValue, double.MinValue,
        double.PositiveInfinity, double.NegativeInfinity, double.NaN, 1e-300, 1e300, Math.PI, -1.0 / 3.0,
    ];

    [Fact]
    public void AddLinear_every_length_and_alignment_equals_the_scalar_form()
    {
        var numbers = new SeededNumbers(101);
        for (int length = 0; length <= 257; length++)
        {
            ReadOnlySpan<double> spot = numbers.Between(50, 150, length + 3).AsSpan(length % 4, length);
            GuardedBuffer<double> profit = Filled(numbers.Between(-1e4, 1e4, length), length % 7);
            double[] before = profit.Span.ToArray();
            BookProfit.AddLinear(spot, 101.25, -37.5, profit.Span);
            for (int s = 0; s < length; s++)
                BitAssert.Equal(BookProfit.AddLinear(spot[s], 101.25, -37.5, before[s]), profit.Span[s], $"{s} of {length}:");
            profit.AssertIntact();
        }
    }

    [Fact]
    public void AddConverted_every_length_and_alignment_equals_the_scalar_form()
    {
        var numbers = new SeededNumbers(102);
        for (int length = 0; length <= 257; length++)
        {
            ReadOnlySpan<double> profit = numbers.Between(-1e4, 1e4, length + 5).AsSpan(length % 5, length);
            ReadOnlySpan<double> rate = numbers.Between(0.7, 1.4, length + 3).AsSpan(length % 3, length);
            GuardedBuffer<double> total = Filled(numbers.Between(-1e5, 1e5, length), length % 7);
            double[] before = total.Span.ToArray();
            BookProfit.AddConverted(profit, 123_456.7, rate, 1.05, total.Span);
            for (int s = 0; s < length; s++)
                BitAssert.Equal(BookProfit.AddConverted(profit[s], 123_456.7, rate[s], 1.05, before[s]), total.Span[s], $"{s} of {length}:");
            total.AssertIntact();
        }
    }

    [Fact]
    public void LossInCurrency_every_length_and_alignment_equals_the_scalar_form()
    {
        var numbers = new SeededNumbers(103);
        for (int length = 0; length <= 257; length++)
        {
            ReadOnlySpan<double> profit = numbers.Between(-1e4, 1e4, length + 5).AsSpan(length % 5, length);
            ReadOnlySpan<double> rate = numbers.Between(0.7, 1.4, length + 3).AsSpan(length % 3, length);
            var loss = new GuardedBuffer<double>(length, Guard, length % 7);
            BookProfit.LossInCurrency(profit, 98_765.4, rate, 1.05, loss.Span);
            for (int s = 0; s < length; s++)
                BitAssert.Equal(BookProfit.LossInCurrency(profit[s], 98_765.4, rate[s], 1.05), loss.Span[s], $"{s} of {length}:");
            loss.AssertIntact();
        }
    }

    // Each odd number in each place of each function, in the lanes of a vector and in the rest behind it.
    [Fact]
    public void Special_values_equal_the_scalar_form()
    {
        foreach (double first in Odd)
        {
            foreach (double second in Odd)
            {
                double[] x = new double[Odd.Length + 3], y = new double[Odd.Length + 3];
                for (int i = 0; i < x.Length; i++)
                    (x[i], y[i]) = (Odd[i % Odd.Length], i % 2 == 0 ? first : 1.5);
                AssertAll(x, y, first, second);
                AssertAll(y, x, second, first);
            }
        }
    }

    [Fact]
    public void NaN_in_a_scenario_stays_in_its_scenario()
    {
        double[] profit = new double[19], rate = new double[19], total = new double[19], loss = new double[19];
        Array.Fill(rate, 1.1);
        (profit[3], rate[18]) = (double.NaN, double.NaN);
        BookProfit.AddConverted(profit, 10, rate, 1, total);
        BookProfit.LossInCurrency(profit, 10, rate, 1, loss);
        int[] found = [.. Enumerable.Range(0, 19).Where(s => double.IsNaN(total[s]))];
        Assert.Equal([3, 18], found);
        Assert.Equal(found, Enumerable.Range(0, 19).Where(s => double.IsNaN(loss[s])));
    }

    // (1 + 2^-52)(1 - 2^-52) = 1 - 2^-104: a product rounded on its own would be 1 and leave 0.
    [Fact]
    public void Products_are_fused_with_their_sums()
    {
        double above = 1 + Math.ScaleB(1, -52), below = 1 - Math.ScaleB(1, -52), left = -Math.ScaleB(1, -104);
        Assert.Equal(left, BookProfit.AddLinear(above, 0, below, -1));
        Assert.Equal(left, BookProfit.AddConverted(above, 0, below, 1, -1));
        Assert.Equal(left / (1 + below), BookProfit.LossInCurrency(1, above, 1 + below, 1));
    }

    [Fact]
    public void No_move_is_no_profit()
    {
        BitAssert.Equal(12.5, BookProfit.AddLinear(0.1, 0.1, 1e9, 12.5));
        BitAssert.Equal(12.5, BookProfit.AddConverted(0, 1e12, 0.1, 0.1, 12.5));
        Assert.Equal(0, BookProfit.LossInCurrency(0, 1e12, 0.1, 0.1));
    }

    // 1e12 lost or won in the far digits: the small profit survives beside the large value.
    [Fact]
    public void LossInCurrency_keeps_a_small_profit_beside_a_large_value() =>
        Assert.Equal(-1e-6 / 3, BookProfit.LossInCurrency(1e-6, 1e12, 3, 3), 1e-21);

    [Fact]
    public void Faulty_lengths_are_refused()
    {
        double[] eight = new double[8], nine = new double[9];
        Assert.Throws<ArgumentException>(() => BookProfit.AddLinear(eight, 1, 1, nine));
        Assert.Throws<ArgumentException>(() => BookProfit.AddConverted(eight, 1, nine, 1, eight));
        Assert.Throws<ArgumentException>(() => BookProfit.AddConverted(eight, 1, eight, 1, nine));
        Assert.Throws<ArgumentException>(() => BookProfit.LossInCurrency(eight, 1, nine, 1, eight));
        Assert.Throws<ArgumentException>(() => BookProfit.LossInCurrency(eight, 1, eight, 1, nine));
    }

    [Fact]
    public void Kernels_allocate_nothing()
    {
        double[] x = new SeededNumbers(104).Between(0.5, 2, 1_001), y = new double[1_001];
        Assert.Equal(0, Allocations.FewestOf(() => All(x, y)));

        static void All(double[] x, double[] y)
        {
            BookProfit.AddLinear(x, 1, 3, y);
            BookProfit.AddConverted(x, 2, x, 1, y);
            BookProfit.LossInCurrency(x, 2, x, 1, y);
        }
    }

    private static GuardedBuffer<double> Filled(double[] values, int offset)
    {
        var buffer = new GuardedBuffer<double>(values.Length, Guard, offset);
        values.CopyTo(buffer.Span);
        return buffer;
    }

    private static void AssertAll(double[] x, double[] y, double a, double b)
    {
        double[] linear = [.. y], converted = [.. y], loss = [.. y];
        BookProfit.AddLinear(x, a, b, linear);
        BookProfit.AddConverted(x, a, y, b, converted);
        BookProfit.LossInCurrency(x, a, y, b, loss);
        for (int s = 0; s < x.Length; s++)
        {
            BitAssert.Equal(BookProfit.AddLinear(x[s], a, b, y[s]), linear[s], $"linear {s} {a} {b}:");
            BitAssert.Equal(BookProfit.AddConverted(x[s], a, y[s], b, y[s]), converted[s], $"converted {s} {a} {b}:");
            BitAssert.Equal(BookProfit.LossInCurrency(x[s], a, y[s], b), loss[s], $"loss {s} {a} {b}:");
        }
    }
}
