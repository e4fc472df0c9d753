using System.Runtime.CompilerServices;

namespace RiskWorker.Numerics.Statistics;

/// <summary>
/// One order statistic without sorting the rest: Hoare's selection (1961). Of many values the pivot comes from a small sample
/// and lies a little beyond the rank sought, so that one pass leaves few (Floyd and Rivest 1975); of few it is the median of three.
/// </summary>
public static class OrderStatistic
{
    private const int Many = 2_048;
    private const int Sampled = 128;

    /// <summary>The <paramref name="rank"/>-th largest of <paramref name="values"/>, 1 being the largest; linear time on average, allocates nothing.</summary>
    /// <param name="values">Numbers, none of them NaN; reordered.</param>
    /// <param name="rank">1 to the number of values.</param>
    /// <exception cref="ArgumentOutOfRangeException">The rank lies outside.</exception>
    public static double Largest(Span<double> values, int rank)
    {
        if (rank < 1 || rank > values.Length) throw new ArgumentOutOfRangeException(nameof(rank), rank, $"The rank is {rank}; it must be 1 to {values.Length}.");
        var (low, high, place) = (0, values.Length - 1, rank - 1);
        while (low < high)
        {
            var pivot = high - low < Many
                ? MedianOfThree(values[low], values[(low + high) >>> 1], values[high])
                : PivotBeyond(values[low..(high + 1)], place - low);
            var (i, j) = (low, high);
            while (i <= j)
            {
                while (values[i] > pivot) i++;
                while (values[j] < pivot) j--;
                if (i > j) break;
                (values[i], values[j]) = (values[j], values[i]);
                i++;
                j--;
            }
            if (place <= j) high = j;
            else if (place >= i) low = i;
            else break;
        }
        return values[place];
    }

    // An element whose place, the largest first, is three standard deviations of the sample's error from the one sought,
    // towards the middle. Whichever element it is, the answer is the same.
    [SkipLocalsInit]
    private static double PivotBeyond(ReadOnlySpan<double> values, int place)
    {
        Span<double> sample = stackalloc double[Sampled];
        var step = values.Length / Sampled;
        for (var i = 0; i < Sampled; i++) sample[i] = values[i * step];
        sample.Sort();
        var expected = (double)place / values.Length * Sampled;
        var margin = 1 + (3 * Math.Sqrt(expected * (1 - (expected / Sampled))));
        var beyond = (int)(expected < Sampled / 2 ? expected + margin : expected - margin);
        return sample[Sampled - 1 - Math.Clamp(beyond, 0, Sampled - 1)];
    }

    private static double MedianOfThree(double a, double b, double c) => Math.Max(Math.Min(a, b), Math.Min(Math.Max(a, b), c));
}
