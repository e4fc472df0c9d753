using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Pricing;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Engine.Simulation;

/// <summary>
/// How far an underlying goes between two closes: the extreme of a Brownian bridge from a to b over a day of variance σ² is
/// (a + b ± √((b - a)² - 2 σ² ln U))/2 in logarithms, with U uniform: the inverse of the bridge's law by the reflection principle.
/// </summary>
/// <remarks>
/// One draw a day for the highest level of an underlying and one for its lowest, whichever options look at them. Given the closes, the two
/// sides and different underlyings are drawn independently: each has its law, together they have it through the closes alone.
/// </remarks>
internal sealed class MomentExtremes(int capacity)
{
    private const uint FirstStream = 0x400000; // above the middles of bridges, below the streams of pricers
    private readonly double[] _high = new double[capacity];
    private readonly double[] _low = new double[capacity];
    private RevaluationPlan _plan = null!;

    /// <summary>Turns to <paramref name="plan"/>.</summary>
    public void Serve(RevaluationPlan plan) => _plan = plan;

    /// <summary>Draws the day that ends at a close, for one underlying.</summary>
    /// <param name="underlying">The underlying.</param>
    /// <param name="horizon">Business days of the horizon.</param>
    /// <param name="day">The close, 1 to <paramref name="horizon"/>.</param>
    /// <param name="first">Number of the first scenario.</param>
    /// <param name="width">Scenarios.</param>
    public void Draw(in UnderlyingKey underlying, int horizon, int day, long first, int width)
    {
        var stream = new DrawStream(_plan.Seed, DrawPurpose.PathSteps, FirstStream + (uint)((horizon * (horizon - 1) / 2) + day - 1));
        UniformDraws.FillPair(stream, (ulong)first, PairOf(underlying), _high.AsSpan(0, width), _low.AsSpan(0, width));
        Logarithm.Of(_high.AsSpan(0, width), _high.AsSpan(0, width));
        Logarithm.Of(_low.AsSpan(0, width), _low.AsSpan(0, width));
    }

    /// <summary>The extreme levels of the day last drawn.</summary>
    /// <param name="isHighest">The highest, else the lowest.</param>
    /// <param name="spot0">The underlying's level today, from which log-returns count.</param>
    /// <param name="variance">Variance of its log-return over a day.</param>
    /// <param name="before">Log-returns at the close before; NaN where the path begins at this one.</param>
    /// <param name="now">Log-returns at this close.</param>
    /// <param name="levels">A level for each scenario.</param>
    public void Fill(bool isHighest, double spot0, double variance, ReadOnlySpan<double> before, ReadOnlySpan<double> now, Span<double> levels)
    {
        var (logs, side) = (isHighest ? _high : _low, isHighest ? 0.5 : -0.5);
        for (var s = 0; s < levels.Length; s++)
        {
            var step = now[s] - before[s];
            var extreme = Math.FusedMultiplyAdd(side, Math.Sqrt(Math.FusedMultiplyAdd(step, step, -2 * variance * logs[s])), 0.5 * (before[s] + now[s]));
            levels[s] = double.IsNaN(step) ? now[s] : extreme;
        }
        LogNormalMoves.Spots(levels, spot0, levels);
    }

    // Single factors first, then every pair of a cross.
    private uint PairOf(in UnderlyingKey key)
    {
        var factors = _plan.Moves.Factors.Length;
        return (uint)(key.IsCross ? factors + ((key.Factor + 1) * (factors + 1)) + key.Quote + 1 : key.Factor);
    }
}
