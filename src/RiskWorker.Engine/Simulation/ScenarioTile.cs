using System.Diagnostics.CodeAnalysis;
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

    private readonly LaneTable _cells = new();
    private readonly NodeProfits _nodes = new();
    private RevaluationPlan _plan;
    private PlanSlice _whole;
    private DrawStream _stream;
    private double[] _draws = [];
    private double[] _normals = [];

    /// <summary>Allocates the buffers for <paramref name="plan"/>.</summary>
    public ScenarioTile(RevaluationPlan plan) => Serve(plan);

    /// <summary>Correlated normals of the scenarios last drawn, a row a moving factor, as far apart as there are scenarios.</summary>
    internal double[] Normals => _normals;

    /// <summary>The market of the scenarios last drawn, at the horizon last moved to.</summary>
    internal MarketLanes Market { get; } = new(Width);

    /// <summary>Turns to <paramref name="plan"/>; buffers that are large enough are used again.</summary>
    [MemberNotNull(nameof(_plan), nameof(_whole))]
    public void Serve(RevaluationPlan plan)
    {
        if (ReferenceEquals(_plan, plan) && _whole is not null) return;
        (_plan, _whole) = (plan, PlanSlice.Whole(plan));
        _stream = new(plan.Seed, DrawPurpose.FactorMoves, 0);
        Room.For(ref _draws, (plan.Moves.Rank + 1) * Width); // room for the second half of an odd last pair
        Room.For(ref _normals, plan.Moves.Rows * Width);
        _cells.Shape(plan.Cells.Count, Width);
        _nodes.Serve(plan, Width);
        Market.Serve(plan);
    }

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
        TriangularProduct.Multiply(moves.Lower, moves.Rows, moves.Rank, _draws.AsSpan(0, moves.Rank * width), _normals.AsSpan(0, moves.Rows * width), width);
        Market.Take(_normals, moves.RowOf, width, width);
        _cells.Width = width;
    }

    /// <summary>Writes the losses of the scenarios last drawn at one horizon; by surface where <paramref name="surfaces"/> are given.</summary>
    internal void Evaluate(int horizon, double[] losses, int offset, int stride, SurfaceProfits? surfaces)
    {
        Market.MoveTo(horizon, _whole);
        _cells.Clear(0, _plan.Cells.Count);
        if (surfaces is null) HoldingProfits.Add(_plan, _whole, Market, horizon, _cells);
        else surfaces.Add(Market, horizon, _cells);
        _nodes.Roll(_whole, Market, _cells);
        for (var row = 0; row < _plan.Rows.Count; row++)
        {
            if (_plan.Rows[row].Horizon == horizon) _nodes.Losses(_plan.Rows[row], Market, losses.AsSpan((row * stride) + offset, Market.Width));
        }
    }
}
