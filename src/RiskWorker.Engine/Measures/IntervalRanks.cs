using System.Collections.Concurrent;
using RiskWorker.Numerics.Statistics;

namespace RiskWorker.Engine.Measures;

/// <summary>The ranks that intervals stand on in samples of one size, each worked out once: every series of a run asks for the same ones.</summary>
internal sealed class IntervalRanks(int count)
{
    private readonly ConcurrentDictionary<(decimal Alpha, decimal Level), RankInterval> _known = new();

    /// <summary>The size, N.</summary>
    public int Count => count;

    /// <summary>As <see cref="BinomialRanks.Interval"/>.</summary>
    public RankInterval Interval(decimal alpha, decimal level) => _known.GetOrAdd((alpha, level), static (asked, n) => BinomialRanks.Interval(n, asked.Alpha, asked.Level), count);
}
