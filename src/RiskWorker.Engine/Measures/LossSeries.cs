using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Measures;

/// <summary>One series of losses as far as its tail is known, and the measures on it. Ranks count from the worst, 1.</summary>
public abstract class LossSeries
{
    /// <summary>Number of losses, N.</summary>
    public abstract int Count { get; }

    /// <summary>Worst ranks that are known.</summary>
    public abstract long Known { get; }

    /// <summary>The loss of <paramref name="rank"/>, 1 being the worst.</summary>
    /// <exception cref="ArgumentOutOfRangeException">The rank lies below the cutoff.</exception>
    public abstract double AtRank(long rank);

    /// <summary>The worst rank such that losses from it on hold at least <paramref name="mass"/> of the distribution, in (0, 1).</summary>
    public virtual long RankOf(decimal mass) => Math.Max(1, (long)decimal.Ceiling(Count * mass));

    /// <summary>A measure with its interval.</summary>
    /// <param name="spec">The measure.</param>
    /// <param name="level">Level of the interval.</param>
    public abstract MeasureResult Measure(MeasureSpec spec, decimal level);

    /// <summary>Mean and standard deviation of the losses.</summary>
    /// <param name="sum">Their sum.</param>
    /// <param name="squares">Sum of their squares.</param>
    public virtual (double Mean, double Deviation) Moments(double sum, double squares)
    {
        var mean = sum / Count;
        return (mean, Math.Sqrt(Math.Max((squares / Count) - (mean * mean), 0)));
    }
}
