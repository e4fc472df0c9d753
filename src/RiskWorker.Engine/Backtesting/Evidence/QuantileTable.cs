using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// A distribution of profit from some of its quantiles: linear between them, the highest beyond the last. Below the first the loss grows
/// with the logarithm of the probability, an exponential tail, as fast as it does on average from there to five times that probability.
/// </summary>
public sealed class QuantileTable
{
    private const double TailSpan = 5;

    private readonly double[] _probabilities;
    private readonly double[] _profits;
    private readonly double _tailScale;

    /// <param name="probabilities">Strictly ascending, in (0, 1).</param>
    /// <param name="profits">Profits not exceeded with these probabilities: finite, not descending.</param>
    /// <exception cref="ArgumentException">There are fewer than two, their numbers differ, or an order does not hold.</exception>
    public QuantileTable(IReadOnlyList<double> probabilities, IReadOnlyList<double> profits)
    {
        if (probabilities.Count < 2 || profits.Count != probabilities.Count)
            throw new ArgumentException($"There are {probabilities.Count} probabilities and {profits.Count} profits; there must be as many of both, at least 2.", nameof(profits));
        for (var i = 0; i < probabilities.Count; i++)
        {
            if (!(probabilities[i] > (i == 0 ? 0 : probabilities[i - 1]) && probabilities[i] < 1))
                throw new ArgumentException($"Probability {i} is {probabilities[i]}; probabilities must ascend strictly within (0, 1).", nameof(probabilities));
            if (!double.IsFinite(profits[i]) || (i > 0 && profits[i] < profits[i - 1]))
                throw new ArgumentException($"Profit {i} is {profits[i]}; profits must be finite and may not descend.", nameof(profits));
        }
        (_probabilities, _profits) = ([.. probabilities], [.. profits]);
        var five = TailSpan * _probabilities[0];
        _tailScale = five < _probabilities[^1] ? (Between(five) - _profits[0]) / Logarithm.Of(TailSpan) : 0;
    }

    /// <summary>From the quantiles of a stored run.</summary>
    public QuantileTable(IReadOnlyList<Quantile> quantiles)
        : this([.. quantiles.Select(q => q.Probability)], [.. quantiles.Select(q => q.Profit)])
    {
    }

    /// <summary>The profit that is not exceeded with <paramref name="probability"/>, in (0, 1).</summary>
    public double At(double probability) => probability < _probabilities[0]
        ? _profits[0] + (_tailScale * Logarithm.Of(probability / _probabilities[0]))
        : Between(probability);

    private double Between(double probability)
    {
        var (low, high) = (0, _probabilities.Length - 1);
        if (probability >= _probabilities[high]) return _profits[high];
        while (high - low > 1)
        {
            var middle = (low + high) >>> 1;
            if (_probabilities[middle] <= probability) low = middle; else high = middle;
        }
        var share = (probability - _probabilities[low]) / (_probabilities[high] - _probabilities[low]);
        return Math.FusedMultiplyAdd(share, _profits[high] - _profits[low], _profits[low]);
    }
}
