using RiskWorker.Domain.Market;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Simulation;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Backtesting.WalkForward;

/// <summary>
/// The profit of a plan's positions under a move of the factors that happened, by the code and the tables that value its scenarios: the
/// valuation date stays. Lane 0 moves all factors, the others one each.
/// </summary>
internal sealed class RealisedProfits
{
    private const int Lanes = 8; // a full vector of lanes: odd ones would be valued one by one
    private readonly RevaluationPlan _plan;
    private readonly PlanSlice _whole;
    private readonly double[] _shocks;
    private readonly MarketLanes _market = new(ScenarioTile.Width);
    private readonly LaneTable _cells = new();
    private readonly NodeProfits _nodes = new();
    private readonly int[] _rowOf;

    /// <summary>Takes the plan and the levels at the later close, in the terms of the plan's own.</summary>
    public RealisedProfits(RevaluationPlan plan, IReadOnlyList<Factor> factors, double[] after)
    {
        (_plan, _whole, _rowOf) = (plan, PlanSlice.Whole(plan), [.. Enumerable.Range(0, factors.Count)]);
        _shocks = [.. factors.Select((factor, j) => Shock(factor, plan.Moves.Factors[j].Level, after[j]))];
        _market.Serve(plan);
        _cells.Shape(plan.Cells.Count, ScenarioTile.Width);
        _nodes.Serve(plan, ScenarioTile.Width);
    }

    /// <summary>Profit by row of the plan, all factors moved.</summary>
    public double[] Together()
    {
        Move([.. Enumerable.Repeat(-1, Lanes)]);
        return [.. _plan.Rows.Select(row => -LossesOf(row)[0])];
    }

    /// <summary>Profit by factor moved alone, for each row of <paramref name="rows"/>.</summary>
    public double[][] Alone(IReadOnlyList<int> rows)
    {
        var profits = rows.Select(_ => new double[_shocks.Length]).ToArray();
        for (var first = 0; first < _shocks.Length; first += ScenarioTile.Width)
        {
            var count = Math.Min(ScenarioTile.Width, _shocks.Length - first);
            var width = (count + Lanes - 1) / Lanes * Lanes;
            Move([.. Enumerable.Range(0, width).Select(lane => first + Math.Min(lane, count - 1))]);
            for (var i = 0; i < rows.Count; i++)
            {
                var losses = LossesOf(_plan.Rows[rows[i]]);
                for (var lane = 0; lane < count; lane++) profits[i][first + lane] = 0 - losses[lane];
            }
        }
        return profits;
    }

    private static double Shock(Factor factor, double before, double after) => factor.Shock == ShockKind.Lognormal ? Logarithm.Of(after / before) : after - before;

    // A lane's number is the factor that moves in it, -1 for all.
    private void Move(int[] moved)
    {
        var table = new double[_shocks.Length * moved.Length];
        for (var factor = 0; factor < _shocks.Length; factor++)
        {
            for (var lane = 0; lane < moved.Length; lane++)
            {
                if (moved[lane] < 0 || moved[lane] == factor) table[(factor * moved.Length) + lane] = _shocks[factor];
            }
        }
        _market.Take(table, _rowOf, moved.Length, moved.Length, areShocks: true);
        _market.MoveTo(0, _whole);
        _cells.Width = moved.Length;
        _cells.Clear(0, _plan.Cells.Count);
        HoldingProfits.Add(_whole, _market, _cells);
        _nodes.Roll(_whole, _market, _cells);
    }

    private double[] LossesOf(PlanRow row)
    {
        var losses = new double[_market.Width];
        _nodes.Losses(row, _market, losses);
        return losses;
    }
}
