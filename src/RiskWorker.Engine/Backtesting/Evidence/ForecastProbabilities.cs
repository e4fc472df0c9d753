using RiskWorker.Numerics.Random;
using RiskWorker.Numerics.Statistics;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// The probability that a forecast gives to a profit no higher than the one that came (M. Rosenblatt 1952): uniform over days where
/// forecasts are right (F. X. Diebold, T. A. Gunther and A. S. Tay, Evaluating density forecasts, 1998).
/// </summary>
public static class ForecastProbabilities
{
    /// <summary>
    /// The probability by a simulated forecast, within the step that the profit falls on at random: (below + position (equal + 1)) /
    /// (count + 1). It is exactly uniform where the profit and the scenarios come from one distribution, ties or not, and never 0 or 1.
    /// </summary>
    /// <param name="below">Scenarios with a lower profit.</param>
    /// <param name="equal">Scenarios with the same profit.</param>
    /// <param name="count">All scenarios, at least 1.</param>
    /// <param name="position">Where in the step, in (0, 1): ½ for the middle, or <see cref="Position"/>.</param>
    public static double Randomised(long below, long equal, long count, double position)
    {
        if (count < 1 || below < 0 || equal < 0 || below > count - equal)
            throw new ArgumentOutOfRangeException(nameof(below), below, $"{below} scenarios below and {equal} equal of {count}: counts may not be negative, nor their sum above that of all.");
        if (position is not (> 0 and < 1)) throw new ArgumentOutOfRangeException(nameof(position), position, "A position lies strictly between 0 and 1.");
        return (below + (position * (equal + 1))) / (count + 1);
    }

    /// <summary>A uniform that belongs to a day and a book: the same whenever it is asked for.</summary>
    /// <param name="seed">The run's seed.</param>
    /// <param name="date">Date of the profit.</param>
    /// <param name="node">Number of the book, at most <see cref="DrawStream.MaxSubIndex"/>.</param>
    public static double Position(ulong seed, DateOnly date, int node) =>
        UniformDraws.At(new(seed, DrawPurpose.StepPosition, (uint)node), (ulong)date.DayNumber, 0);

    /// <summary>How many probabilities fall into each of equal bins, with the band that holds such a count with 95% were they uniform.</summary>
    public static TransformHistogram Histogram(IReadOnlyList<double> transforms, int bins)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(bins, 2);
        Require(transforms);
        var counts = new int[bins];
        foreach (var u in transforms) counts[Math.Min((int)(u * bins), bins - 1)]++;
        if (transforms.Count == 0) return new(counts, 0, 0);
        var law = new BinomialTail(transforms.Count, 1m / bins);
        return new(counts, law.FirstReaching(0.025m), law.FirstReaching(0.975m));
    }

    /// <summary>Refuses what is not in (0, 1).</summary>
    internal static void Require(IReadOnlyList<double> transforms)
    {
        for (var t = 0; t < transforms.Count; t++)
        {
            if (transforms[t] is not (> 0 and < 1))
                throw new ArgumentException($"The forecast probability of day {t} is {transforms[t]}; it must lie strictly between 0 and 1.", nameof(transforms));
        }
    }
}

/// <summary>Counts of forecast probabilities in equal bins of (0, 1).</summary>
/// <param name="Counts">One a bin, ascending.</param>
/// <param name="Low">The 2.5% quantile of a bin's count.</param>
/// <param name="High">The 97.5% quantile.</param>
public sealed record TransformHistogram(IReadOnlyList<int> Counts, int Low, int High);
