using RiskWorker.Engine.Models;
using RiskWorker.Engine.Plans;
using RiskWorker.Numerics.Distributions;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Engine.Simulation.Moves;

/// <summary>
/// One vector of correlated normals for all horizons, times the root of the mixing draws of the days up to each, added: a multiple of a day's deviation
/// over the root of the days.
/// </summary>
internal sealed class StudentMoves(int capacity) : MoveSource
{
    private readonly CorrelatedNormals _normals = new(capacity);
    private RevaluationPlan _plan = null!;
    private MixingQuantile? _quantile;
    private MixingDraws _mixing = null!;
    private double[] _multipliers = [];
    private double[] _moves = [];
    private int _width;

    /// <inheritdoc/>
    public override void Draw(long first, int width)
    {
        _width = width;
        _normals.Draw(first, width);
        _mixing.FillMultipliers((ulong)first, _multipliers.AsSpan(0, width * _plan.Horizons.Count));
        for (var horizon = 0; horizon < _plan.Horizons.Count; horizon++)
        {
            // The market multiplies by the root of the days, which the sum over days holds already.
            var multipliers = _multipliers.AsSpan(horizon * width, width);
            Elementwise.Scale(multipliers, 1 / Math.Sqrt(_plan.Horizons[horizon].Days), multipliers);
        }
    }

    /// <inheritdoc/>
    public override double[] At(int horizon)
    {
        var multipliers = _multipliers.AsSpan(horizon * _width, _width);
        for (var row = 0; row < _plan.Moves.Rows; row++)
            Elementwise.Product(_normals.Rows.AsSpan(row * _width, _width), multipliers, _moves.AsSpan(row * _width, _width));
        return _moves;
    }

    /// <inheritdoc/>
    protected override void Serve(RevaluationPlan plan)
    {
        var law = (StudentLaw)plan.Law;
        if (_quantile?.DegreesOfFreedom != law.DegreesOfFreedom) _quantile = new(law.DegreesOfFreedom);
        _plan = plan;
        _mixing = new(_quantile, new(plan.Seed, DrawPurpose.MixingVariable, 0), [.. plan.Horizons.Select(h => h.Days)]);
        _normals.Serve(plan);
        Room.For(ref _multipliers, plan.Horizons.Count * capacity);
        Room.For(ref _moves, plan.Moves.Rows * capacity);
    }
}
