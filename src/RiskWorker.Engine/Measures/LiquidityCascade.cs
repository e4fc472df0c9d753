using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Measures;

/// <summary>
/// Expected shortfall with each factor at its liquidity horizon (Basel Committee, MAR33.4 and 33.5): the root of the sum of squares of the expected
/// shortfall at the base horizon T with all factors moving, and, for each longer horizon LH_j, of that with only the factors moving whose
/// horizon is at least LH_j, times √((LH_j - LH_{j-1})/T).
/// </summary>
/// <remarks>All steps stand on the same draws. The interval lets their errors add up as if they were one, which is the most they can.</remarks>
public sealed class LiquidityCascade
{
    private readonly IReadOnlyList<LiquidityStep> _steps;

    /// <summary>Takes the steps of one base horizon, the first with all factors moving.</summary>
    public LiquidityCascade(IReadOnlyList<LiquidityStep> steps) => _steps = steps;

    /// <summary>The measure of a node.</summary>
    /// <param name="node">Node number.</param>
    /// <param name="spec">The measure.</param>
    /// <param name="level">Level of the interval.</param>
    /// <param name="inReportingCurrency">In the reporting currency, else in the node's own.</param>
    public MeasureResult Of(int node, MeasureSpec spec, decimal level, bool inReportingCurrency)
    {
        var steps = _steps.Select(step => (step.Weight, Result: step.Measures.Of(node, spec with { Kind = MeasureKind.Es }, level, inReportingCurrency))).ToArray();
        var square = 0.0;
        foreach (var (weight, result) in steps) square = Math.FusedMultiplyAdd(weight * result.Value, weight * result.Value, square);
        var value = Math.Sqrt(square);
        var half = 0.0;
        foreach (var (weight, result) in steps)
        {
            // d value / d step = weight² step / value; where nothing is lost the steps' own errors stand.
            var slope = value > 0 ? weight * weight * Math.Abs(result.Value) / value : weight;
            half = Math.FusedMultiplyAdd(slope, ((result.High ?? result.Value) - (result.Low ?? result.Value)) / 2, half);
        }
        var measured = new MeasureResult(spec, value, value - half, value + half, (double)level);
        return steps[0].Result.Sample is null ? measured : measured with { Sample = new(null, null) };
    }
}

/// <summary>A step of the cascade.</summary>
/// <param name="Days">Liquidity horizon from which on factors move.</param>
/// <param name="Weight">√((LH_j - LH_{j-1})/T); 1 for the first step.</param>
/// <param name="Measures">The measures with those factors moving alone, at the base horizon.</param>
public sealed record LiquidityStep(int Days, double Weight, NodeMeasures Measures);
