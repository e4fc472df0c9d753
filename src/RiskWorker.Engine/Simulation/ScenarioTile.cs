using System.Diagnostics.CodeAnalysis;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Simulation.Moves;

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
    private MoveSource? _source;
    private HorizonPath? _path;
    private long _first;

    /// <summary>Allocates the buffers for <paramref name="plan"/>.</summary>
    public ScenarioTile(RevaluationPlan plan) => Serve(plan);

    /// <summary>Moves of the scenarios last drawn at the horizon last moved to, a row a moving factor, as far apart as there are scenarios.</summary>
    internal double[] Moves { get; private set; } = [];

    /// <summary>The market of the scenarios last drawn, at the horizon last moved to.</summary>
    internal MarketLanes Market { get; } = new(Width);

    /// <summary>Turns to <paramref name="plan"/>; buffers that are large enough are used again.</summary>
    [MemberNotNull(nameof(_plan), nameof(_whole))]
    public void Serve(RevaluationPlan plan)
    {
        if (ReferenceEquals(_plan, plan) && _whole is not null) return;
        (_plan, _whole) = (plan, PlanSlice.Whole(plan));
        _source = MoveSource.For(plan, Width, _source);
        _cells.Shape(plan.Cells.Count, Width);
        _nodes.Serve(plan, Width);
        Market.Serve(plan);
        _path = plan.Aged.Count == 0 ? null : new(Width);
        _path?.Serve(plan);
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

    /// <summary>Draws scenarios <paramref name="first"/> to first + width - 1.</summary>
    internal void Draw(long first, int width)
    {
        _source!.Draw(first, width);
        (_first, _cells.Width) = (first, width);
    }

    /// <summary>Writes the losses of the scenarios last drawn at one horizon; by surface where <paramref name="surfaces"/> are given.</summary>
    internal void Evaluate(int horizon, double[] losses, int offset, int stride, SurfaceProfits? surfaces)
    {
        _path?.Pass(horizon, _source!, Market, _first, _cells.Width, _cells);
        Moves = _source!.At(horizon);
        Market.Take(Moves, _plan.Moves.RowOf, _cells.Width, _cells.Width, _plan.Law.GivesShocks);
        Market.MoveTo(horizon, _path?.Last(horizon) ?? _whole);
        if (_path is not null)
        {
            _path.Arrive(horizon, Market, _cells);
        }
        else
        {
            _cells.Clear(0, _plan.Cells.Count);
            if (surfaces is null) HoldingProfits.Add(_whole, Market, _cells);
            else surfaces.Add(Market, horizon, _cells);
        }
        _nodes.Roll(_whole, Market, _cells);
        for (var row = 0; row < _plan.Rows.Count; row++)
        {
            if (_plan.Rows[row].Horizon == horizon) _nodes.Losses(_plan.Rows[row], Market, losses.AsSpan((row * stride) + offset, Market.Width));
        }
    }
}
