namespace RiskWorker.Numerics.Statistics;

/// <summary>Ranks among n losses in ascending order, 1 the smallest: of a quantile, and of the ends of its distribution-free interval.</summary>
public static class BinomialRanks
{
    /// <summary>⌈n·alpha⌉ in decimal arithmetic: the rank of the smallest l with P(L ≤ l) ≥ alpha.</summary>
    public static int VarRank(int n, decimal alpha)
    {
        RequireLevel(alpha, nameof(alpha));
        ArgumentOutOfRangeException.ThrowIfLessThan(n, 1);
        return (int)decimal.Ceiling(n * alpha);
    }

    /// <summary>n·(1 - alpha) in decimal arithmetic: how many of the worst losses make up the tail, the last one counted by its fraction.</summary>
    public static decimal TailWeight(int n, decimal alpha)
    {
        RequireLevel(alpha, nameof(alpha));
        ArgumentOutOfRangeException.ThrowIfLessThan(n, 1);
        return n * (1 - alpha);
    }

    /// <summary>
    /// The interval of the alpha-quantile from order statistics, without an assumption on the distribution: with B ~ Bin(n, alpha),
    /// the largest low with P(B ≤ low - 1) ≤ (1 - level)/2 and the smallest high with P(B ≥ high) ≤ (1 - level)/2
    /// (David and Nagaraja, Order Statistics, 2003, section 7.1). Null where a rank lies outside 1 to n.
    /// </summary>
    public static RankInterval Interval(int n, decimal alpha, decimal level)
    {
        RequireLevel(level, nameof(level));
        var count = new BinomialTail(n, alpha);
        var outside = (double)((1 - level) / 2);
        var low = count.LastWithBelowAtMost(outside);
        var high = count.FirstWithFromAtMost(outside);
        return new(low >= 1 ? low : null, high <= n ? high : null);
    }

    private static void RequireLevel(decimal level, string name)
    {
        if (level is <= 0 or >= 1) throw new ArgumentOutOfRangeException(name, level, "A level lies strictly between 0 and 1.");
    }
}

/// <summary>Ranks of the ends of an interval; null where the sample is too small for that end.</summary>
/// <param name="Low">Rank of the lower end.</param>
/// <param name="High">Rank of the upper end.</param>
public readonly record struct RankInterval(int? Low, int? High);
