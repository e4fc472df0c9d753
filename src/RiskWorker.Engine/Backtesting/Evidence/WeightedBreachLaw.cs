using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// The law of the sum of (1 - u/p)⁺ over independent days with uniform u: as many uniforms as a binomial count says, so a mixture of the
/// laws of sums of uniforms (Irwin 1927, Hall 1927).
/// </summary>
/// <remarks>
/// The upper tail of a sum of n uniforms is a sum of values of the cardinal spline of order n + 1, and these are found by the recursion
/// in which every term is positive (C. de Boor, A Practical Guide to Splines, 1978, chapter IX and X): no digit is lost to cancelling,
/// as in the alternating sum. Above <see cref="MostTerms"/> exceptions the normal law stands in.
/// </remarks>
public sealed class WeightedBreachLaw
{
    /// <summary>Most exceptions of more than negligible probability for which the law is exact.</summary>
    public const int MostTerms = 2000;

    private const double Negligible = 1e-30;

    private readonly CountLaw _count;
    private readonly int _most;

    /// <summary>The law for that many days, at least 1, and confidence.</summary>
    public WeightedBreachLaw(int days, Confidence confidence)
    {
        _count = new(days, 1 - confidence.Level);
        _most = _count.Last;
        while (_most > 1 && _count[_most] < Negligible) _most--;
        var p = (double)(1 - confidence.Level);
        (Mean, Variance) = (days * p / 2, days * p * (4 - (3 * p)) / 12);
    }

    /// <summary>Mean of the sum.</summary>
    public double Mean { get; }

    /// <summary>Variance of the sum.</summary>
    public double Variance { get; }

    /// <summary>Whether tails are exact rather than normal.</summary>
    public bool IsExact => _most <= MostTerms;

    /// <summary>P(sum ≥ <paramref name="sum"/>).</summary>
    public double AtLeast(double sum)
    {
        if (sum <= 0) return 1;
        if (!IsExact) return NormalCdf.Of((Mean - sum) / Math.Sqrt(Variance));
        // Spline of order k at fraction + i, for all i that any order needs; the order rises by one a round.
        var whole = (int)Math.Floor(Math.Min(sum, _most + 1));
        var fraction = sum - whole;
        var spline = new double[_most + 2];
        spline[0] = 1;
        var tail = 0.0;
        for (var n = 1; n <= _most; n++)
        {
            for (var i = n; i >= 0; i--)
            {
                var x = fraction + i;
                spline[i] = Math.FusedMultiplyAdd(x, spline[i], i == 0 ? 0 : (n + 1 - x) * spline[i - 1]) / n;
            }
            var above = 0.0;
            for (var i = n; i > whole; i--) above += spline[i];
            tail = Math.FusedMultiplyAdd(_count[n], above, tail);
        }
        return Math.Min(tail, 1);
    }

    /// <summary>The sum that is exceeded with probability 1 - <paramref name="probability"/>, in (0, 1): 0 where nothing is more likely than that.</summary>
    public double Quantile(double probability)
    {
        if (probability is not (> 0 and < 1)) throw new ArgumentOutOfRangeException(nameof(probability), probability, "A probability lies strictly between 0 and 1.");
        var (low, high) = (0.0, (double)_most);
        for (var i = 0; i < 60; i++)
        {
            var middle = (low + high) / 2;
            if (AtLeast(middle) > 1 - probability) low = middle; else high = middle;
        }
        return high < 1e-12 ? 0 : high;
    }
}
