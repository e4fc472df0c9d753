using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Simulation;

namespace RiskWorker.Engine.Sensitivities;

/// <summary>
/// The profits of every node of a plan at moved factors, one factor at a time, by the code that revalues scenarios: a move is a lane
/// that is given its shocks instead of normals. Nothing else of the market moves, the valuation date included.
/// </summary>
internal sealed class BumpedProfits
{
    /// <summary>Factors that are moved side by side: with the unmoved lane a full tile.</summary>
    public const int Capacity = (ScenarioTile.Width - 1) / 2;

    private const int Lanes = 8; // a full vector of lanes: odd ones would be valued one by one
    private readonly RevaluationPlan _plan;
    private readonly PlanSlice _whole;
    private readonly MarketLanes _market = new(ScenarioTile.Width);
    private readonly LaneTable _cells = new();
    private readonly NodeProfits _nodes = new();
    private readonly double[] _shocks = new double[Capacity * ScenarioTile.Width];
    private readonly double[] _losses = new double[ScenarioTile.Width];
    private readonly int[] _rowOf;

    /// <summary>Makes room for <paramref name="plan"/>, of which <paramref name="whole"/> is the whole.</summary>
    public BumpedProfits(RevaluationPlan plan, PlanSlice whole)
    {
        (_plan, _whole) = (plan, whole);
        _market.Serve(plan);
        _cells.Shape(plan.Cells.Count, ScenarioTile.Width);
        _nodes.Serve(plan, ScenarioTile.Width);
        _rowOf = new int[plan.Moves.Factors.Length];
    }

    /// <summary>Moves up to <see cref="Capacity"/> factors, each down and up while the others stay.</summary>
    public void Move(ReadOnlySpan<int> factors, ReadOnlySpan<FactorBump> bumps)
    {
        var width = (1 + (2 * factors.Length) + Lanes - 1) / Lanes * Lanes;
        Array.Fill(_rowOf, -1);
        Array.Clear(_shocks);
        for (var i = 0; i < factors.Length; i++)
        {
            _rowOf[factors[i]] = i;
            (_shocks[(i * width) + DownOf(i)], _shocks[(i * width) + UpOf(i)]) = (bumps[i].Down, bumps[i].Up);
        }
        _market.Take(_shocks, _rowOf, width, width, areShocks: true);
        _market.MoveTo(0, _whole);
        _cells.Width = width;
        _cells.Clear(0, _plan.Cells.Count);
        HoldingProfits.Add(_whole, _market, _cells);
        _nodes.Roll(_whole, _market, _cells);
    }

    /// <summary>The profits of series <paramref name="row"/>, a lane a move; written over by the next.</summary>
    public ReadOnlySpan<double> Of(PlanRow row)
    {
        var lanes = _losses.AsSpan(0, _market.Width);
        _nodes.Losses(row, _market, lanes);
        for (var i = 0; i < lanes.Length; i++) lanes[i] = -lanes[i];
        return lanes;
    }

    /// <summary>The lane in which nothing moves.</summary>
    public const int Still = 0;

    /// <summary>The lane in which the factor that is number <paramref name="place"/> of those moved has gone down.</summary>
    public static int DownOf(int place) => 1 + (2 * place);

    /// <summary>The lane in which it has gone up.</summary>
    public static int UpOf(int place) => 2 + (2 * place);
}
