using RiskWorker.Engine.Plans;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Engine.Simulation;

/// <summary>
/// Draws and revalues some two hundred consecutive scenarios of a plan fully: the buffers of one thread, sized for its cache.
/// Every scenario is computed on its own, so the width of a tile changes no bit.
/// </summary>
public sealed class ScenarioTile
{
    /// <summary>Scenarios in a tile: ten panels of the triangular product, and buffers that fit the second-level cache.</summary>
    public const int Width = 240;

    private readonly RevaluationPlan _plan;
    private readonly PlanSlice _whole;
    private readonly DrawStream _stream;
    private readonly double[] _draws;
    private readonly MarketLanes _market;
    private readonly LaneTable _cells;
    private readonly NodeProfits _nodes;

    /// <summary>Allocates the buffers for <paramref name="plan"/>.</summary>
    public ScenarioTile(RevaluationPlan plan)
    {
        (_plan, _whole) = (plan, PlanSlice.Whole(plan));
        _stream = new(plan.Seed, DrawPurpose.FactorMoves, 0);
        _draws = new double[(plan.Moves.Rank + 1) * Width]; // room for the second half of an odd last pair
        Normals = new double[plan.Moves.Rows * Width];
        (_market, _cells, _nodes) = (new(plan, Width), new(plan.Cells.Count, Width), new(plan, Width));
    }

    /// <summary>Correlated normals of the scenarios last drawn, a row a moving factor, as far apart as there are scenarios.</summary>
    internal double[] Normals { get; }

    /// <summary>The market of the scenarios last drawn, at the horizon last moved to.</summary>
    internal MarketLanes Market => _market;

    /// <summary>Writes the losses of scenarios <paramref name="first"/> to first + width - 1.</summary>
    /// <param name="first">Number of the first scenario.</param>
    /// <param name="width">1 to <see cref="Width"/>.</param>
    /// <param name="losses">A row a series, <paramref name="stride"/> apart.</param>
    /// <param name="offset">Place of the first scenario in each row.</param>
    /// <param name="stride">Distance of rows.</param>
    public void Evaluate(long first, int width, double[] losses, int offset, int stride)
    {
        Draw(first, width);
        for (var horizon = 0; horizon < _plan.Horizons.Count; horizon++) Evaluate(horizon, losses, offset, stride, null);
    }

    /// <summary>Draws the normals of scenarios <paramref name="first"/> to first + width - 1.</summary>
    internal void Draw(long first, int width)
    {
        var moves = _plan.Moves;
        for (var draw = 0; draw < moves.Rank; draw += 2)
            NormalDraws.FillPair(_stream, (ulong)first, (uint)draw / 2, _draws.AsSpan(draw * width, width), _draws.AsSpan((draw + 1) * width, width));
        TriangularProduct.Multiply(moves.Lower, moves.Rows, moves.Rank, _draws.AsSpan(0, moves.Rank * width), Normals.AsSpan(0, moves.Rows * width), width);
        _market.Take(Normals, moves.RowOf, width, width);
        _cells.Width = width;
    }

    /// <summary>Writes the losses of the scenarios last drawn at one horizon; by surface where <paramref name="surfaces"/> are given.</summary>
    internal void Evaluate(int horizon, double[] losses, int offset, int stride, SurfaceProfits? surfaces)
    {
        _market.MoveTo(horizon, _whole);
        _cells.Clear(0, _plan.Cells.Count);
        if (surfaces is null) HoldingProfits.Add(_plan, _whole, _market, horizon, _cells);
        else surfaces.Add(_market, horizon, _cells);
        _nodes.Roll(_whole, _market, _cells);
        for (var row = 0; row < _plan.Rows.Count; row++)
        {
            if (_plan.Rows[row].Horizon == horizon) _nodes.Losses(_plan.Rows[row], _market, losses.AsSpan((row * stride) + offset, _market.Width));
        }
    }
}
