using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Estimation;

/// <summary>
/// The log-return over some days of Merton's jump diffusion (1976, Journal of Financial Economics 3, 125-144): a normal of mean drift·days and
/// variance deviation²·days, and a Poisson number, of mean intensity·days, of independent normal jumps. A mixture of normals with Poisson weights, so that
/// probabilities, partial means and what follows from them are sums over the number of jumps.
/// </summary>
/// <remarks>The sums leave out numbers of jumps of probability below 1e-18 of the likeliest; the weights are divided by their sum.</remarks>
public sealed class MertonReturn
{
    private const double Negligible = 1e-18;
    private const double HighestJumps = 10_000;

    private readonly double[] _weights;
    private readonly double[] _means;
    private readonly double[] _deviations;

    /// <summary>The distribution over <paramref name="days"/> days; all rates are a day's, and a day may be any unit of time.</summary>
    /// <param name="drift">Mean of the logarithm without jumps, a day.</param>
    /// <param name="deviation">Of the diffusion, a day; positive.</param>
    /// <param name="intensity">Jumps a day, at least 0.</param>
    /// <param name="jumpMean">Mean of a jump in the logarithm.</param>
    /// <param name="jumpDeviation">Its standard deviation, at least 0.</param>
    /// <param name="days">Positive.</param>
    /// <exception cref="ArgumentException">A number lies outside what it must be, or more than 10,000 jumps are expected.</exception>
    public MertonReturn(double drift, double deviation, double intensity, double jumpMean, double jumpDeviation, double days)
    {
        Series.RequireFinite(drift, nameof(drift));
        Series.RequireFinite(jumpMean, nameof(jumpMean));
        Require(deviation > 0 && double.IsFinite(deviation), deviation, nameof(deviation), "positive and finite");
        Require(intensity >= 0, intensity, nameof(intensity), "at least 0");
        Require(jumpDeviation >= 0 && double.IsFinite(jumpDeviation), jumpDeviation, nameof(jumpDeviation), "at least 0 and finite");
        Require(days > 0 && double.IsFinite(days), days, nameof(days), "positive and finite");
        var expected = intensity * days;
        Require(expected <= HighestJumps, expected, nameof(intensity), $"such that at most {HighestJumps} jumps are expected");
        (_weights, var first) = Weights(expected);
        (_means, _deviations) = (new double[_weights.Length], new double[_weights.Length]);
        for (var k = 0; k < _weights.Length; k++)
        {
            var jumps = first + k;
            _means[k] = Math.FusedMultiplyAdd(jumps, jumpMean, drift * days);
            _deviations[k] = Math.Sqrt(Math.FusedMultiplyAdd(jumps, jumpDeviation * jumpDeviation, deviation * deviation * days));
        }
    }

    /// <summary>E[X].</summary>
    public double Mean => Sum((k, weight) => weight * _means[k]);

    /// <summary>Var X.</summary>
    public double Variance
    {
        get
        {
            var mean = Mean;
            return Sum((k, weight) => weight * Math.FusedMultiplyAdd(_means[k] - mean, _means[k] - mean, _deviations[k] * _deviations[k]));
        }
    }

    /// <summary>P(X ≤ x).</summary>
    public double AtMost(double x) => Sum((k, weight) => weight * NormalCdf.Of((x - _means[k]) / _deviations[k]));

    /// <summary>P(X &gt; x), without taking a number near 1 from 1.</summary>
    public double Above(double x) => Sum((k, weight) => weight * NormalCdf.Of((_means[k] - x) / _deviations[k]));

    /// <summary>The density at x.</summary>
    public double Density(double x) => Sum((k, weight) => weight * NormalDensity.Of((x - _means[k]) / _deviations[k]) / _deviations[k]);

    /// <summary>The smallest x, to the last bits, with P(X ≤ x) ≥ <paramref name="probability"/>, by bisection.</summary>
    /// <param name="probability">Strictly between 0 and 1.</param>
    public double Quantile(double probability)
    {
        if (!(probability > 0 && probability < 1)) throw new ArgumentOutOfRangeException(nameof(probability), probability, "A probability lies strictly between 0 and 1.");
        // Every component's own quantile is on one side of the mixture's for the lowest of them, on the other for the highest.
        var z = InverseNormal.Of(probability);
        var (low, high) = (double.PositiveInfinity, double.NegativeInfinity);
        for (var k = 0; k < _weights.Length; k++)
        {
            var own = Math.FusedMultiplyAdd(z, _deviations[k], _means[k]);
            (low, high) = (Math.Min(low, own), Math.Max(high, own));
        }
        // Beyond the middle what lies above decides: it is the smaller number, and keeps more digits.
        bool Reaches(double x) => probability <= 0.5 ? AtMost(x) >= probability : Above(x) <= 1 - probability;
        var margin = 1e-9 * (_deviations[0] + high - low);
        (low, high) = (low - margin, high + margin);
        while (true)
        {
            var middle = low + (0.5 * (high - low));
            if (!(middle > low && middle < high)) return high;
            if (Reaches(middle)) high = middle;
            else low = middle;
        }
    }

    /// <summary>E[X; X ≤ x]: the part of the mean that lies at or below x.</summary>
    public double MeanBelow(double x) => Sum((k, weight) =>
    {
        var z = (x - _means[k]) / _deviations[k];
        return weight * Math.FusedMultiplyAdd(_means[k], NormalCdf.Of(z), -_deviations[k] * NormalDensity.Of(z));
    });

    /// <summary>E[e^X; X ≤ x].</summary>
    public double GrowthBelow(double x) => Sum((k, weight) => weight * Growth(k) * NormalCdf.Of(((x - _means[k]) / _deviations[k]) - _deviations[k]));

    /// <summary>E[e^X; X &gt; x].</summary>
    public double GrowthAbove(double x) => Sum((k, weight) => weight * Growth(k) * NormalCdf.Of(_deviations[k] - ((x - _means[k]) / _deviations[k])));

    /// <summary>
    /// The loss a unit of today's price that a long position in the price, 1 - e^X, exceeds with probability <paramref name="tail"/>, and its mean
    /// beyond that: value-at-risk and expected shortfall of confidence 1 - tail.
    /// </summary>
    public (double ValueAtRisk, double Shortfall) LongLoss(double tail)
    {
        var x = Quantile(tail);
        return (1 - Exponential.Of(x), 1 - (GrowthBelow(x) / tail));
    }

    /// <summary>The same of a short position, whose loss is e^X - 1.</summary>
    public (double ValueAtRisk, double Shortfall) ShortLoss(double tail)
    {
        if (!(tail > 0 && tail < 1)) throw new ArgumentOutOfRangeException(nameof(tail), tail, "A tail's probability lies strictly between 0 and 1.");
        var x = Quantile(1 - tail);
        return (Exponential.Of(x) - 1, (GrowthAbove(x) / tail) - 1);
    }

    /// <summary>The same of a position linear in X itself, whose loss is -X: one in a factor that moves by differences.</summary>
    public (double ValueAtRisk, double Shortfall) ReturnLoss(double tail)
    {
        var x = Quantile(tail);
        return (-x, -MeanBelow(x) / tail);
    }

    private double Growth(int k) => Exponential.Of(Math.FusedMultiplyAdd(0.5 * _deviations[k], _deviations[k], _means[k]));

    private double Sum(Func<int, double, double> term)
    {
        var sum = 0.0;
        for (var k = 0; k < _weights.Length; k++) sum += term(k, _weights[k]);
        return sum;
    }

    // Outward from the likeliest number, so that no exponential is needed and none can underflow.
    private static (double[] Weights, int First) Weights(double expected)
    {
        var mode = (int)Math.Floor(expected);
        var (below, above) = (new List<double>(), new List<double> { 1 });
        for (var k = mode; k > 0; k--)
        {
            var next = (below.Count > 0 ? below[^1] : 1) * (k / expected);
            if (next < Negligible) break;
            below.Add(next);
        }
        for (var k = mode + 1; above[^1] * (expected / k) >= Negligible; k++) above.Add(above[^1] * (expected / k));
        below.Reverse();
        double[] weights = [.. below, .. above];
        var total = 0.0;
        foreach (var weight in weights) total += weight;
        for (var k = 0; k < weights.Length; k++) weights[k] /= total;
        return (weights, mode - below.Count);
    }

    private static void Require(bool holds, double value, string name, string range)
    {
        if (!holds) throw new ArgumentOutOfRangeException(name, value, $"{name} is {value}; it must be {range}.");
    }
}
