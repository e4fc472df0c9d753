namespace RiskWorker.Numerics.Statistics;

/// <summary>
/// Cumulative probabilities of B ~ Bin(n, p), from the ratios of neighbouring probabilities taken outward from the mode and
/// divided by their sum: additions, multiplications and divisions only, so no logarithm's bits can move a rank.
/// </summary>
/// <remarks>
/// Each tail is summed from its far end. Probabilities below 1e-60 of the mode's count as 0. The relative error of a tail grows
/// with the distance from the mode: below 1e-12 at n = 10^7 and one tail in a thousand. A probability within 1e-12 of the one
/// asked for counts as reaching it: where both are decimals that meet exactly, rounding must not decide.
/// </remarks>
public sealed class BinomialTail
{
    private const double Negligible = 1e-60;
    private const double Tie = 1e-12;

    private readonly int _first;
    private readonly double[] _atMost;
    private readonly double[] _atLeast;

    /// <summary>The distribution of the number of successes in <paramref name="trials"/> of probability <paramref name="success"/>.</summary>
    /// <param name="trials">n, at least 1.</param>
    /// <param name="success">p, strictly between 0 and 1.</param>
    public BinomialTail(int trials, decimal success)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(trials, 1);
        if (success is <= 0 or >= 1) throw new ArgumentOutOfRangeException(nameof(success), success, "A probability of success lies strictly between 0 and 1.");
        Trials = trials;
        var odds = (double)success / (double)(1 - success);
        var mode = (int)Math.Min(trials, decimal.Floor((trials + 1m) * success));
        var above = Outward(mode, trials, k => (double)(trials - k) / (k + 1) * odds, +1);
        var below = Outward(mode, 0, k => k / ((trials - k + 1) * odds), -1);
        below.Reverse();
        double[] weights = [.. below, 1.0, .. above];
        _first = mode - below.Count;
        _atMost = Cumulate(weights);
        Array.Reverse(weights);
        _atLeast = Cumulate(weights);
        Array.Reverse(_atLeast);
        Normalise();
    }

    /// <summary>Number of trials, n.</summary>
    public int Trials { get; }

    /// <summary>P(B ≤ <paramref name="k"/>), for any k.</summary>
    public double AtMost(long k) => k < _first ? 0 : k - _first >= _atMost.Length ? 1 : _atMost[k - _first];

    /// <summary>P(B ≥ <paramref name="k"/>), for any k.</summary>
    public double AtLeast(long k) => k < _first ? 1 : k - _first >= _atLeast.Length ? 0 : _atLeast[k - _first];

    /// <summary>The first count k with P(B ≤ k) ≥ <paramref name="probability"/>, in (0, 1).</summary>
    public int FirstReaching(decimal probability)
    {
        if (probability is <= 0 or >= 1) throw new ArgumentOutOfRangeException(nameof(probability), probability, "A probability lies strictly between 0 and 1.");
        // Where little is left above, what is left decides: it is the smaller number, and keeps more digits.
        return probability > 0.5m ? LastAbove((double)(1 - probability)) : FirstFromBelow((double)probability);
    }

    /// <summary>The last count k with P(B ≤ k - 1) ≤ <paramref name="probability"/>: at least 0.</summary>
    internal int LastWithBelowAtMost(double probability)
    {
        var k = 0;
        while (k < _atMost.Length && _atMost[k] <= probability * (1 + Tie)) k++;
        return _first + k;
    }

    /// <summary>The first count k with P(B ≥ k) ≤ <paramref name="probability"/>: at most n + 1.</summary>
    internal int FirstWithFromAtMost(double probability) => LastAbove(probability) + 1;

    private int FirstFromBelow(double probability)
    {
        var k = 0;
        while (_atMost[k] < probability * (1 - Tie)) k++;
        return _first + k;
    }

    /// <summary>The first count k with P(B > k) ≤ <paramref name="probability"/>.</summary>
    private int LastAbove(double probability)
    {
        var k = _atLeast.Length - 1;
        while (k >= 0 && _atLeast[k] <= probability * (1 + Tie)) k--;
        return _first + k;
    }

    private static List<double> Outward(int mode, int end, Func<int, double> ratio, int step)
    {
        var weights = new List<double>();
        var weight = 1.0;
        for (var k = mode; k != end; k += step)
        {
            weight *= ratio(k);
            if (weight < Negligible) break;
            weights.Add(weight);
        }
        return weights;
    }

    private static double[] Cumulate(double[] weights)
    {
        var sums = new double[weights.Length];
        var sum = 0.0;
        for (var i = 0; i < sums.Length; i++)
        {
            sum += weights[i];
            sums[i] = sum;
        }
        return sums;
    }

    private void Normalise()
    {
        var total = _atMost[^1];
        for (var i = 0; i < _atMost.Length; i++) _atMost[i] /= total;
        total = _atLeast[0];
        for (var i = 0; i < _atLeast.Length; i++) _atLeast[i] /= total;
    }
}
