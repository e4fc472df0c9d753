namespace RiskWorker.Numerics.Statistics;

/// <summary>One order statistic without sorting the rest: Hoare's selection (1961), the pivot being the median of three.</summary>
public static class OrderStatistic
{
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
            var pivot = MedianOfThree(values[low], values[(low + high) >>> 1], values[high]);
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

    private static double MedianOfThree(double a, double b, double c) => Math.Max(Math.Min(a, b), Math.Min(Math.Max(a, b), c));
}
