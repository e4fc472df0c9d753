using RiskWorker.Engine.Models;
using RiskWorker.Engine.Plans;

namespace RiskWorker.Engine.Simulation.Moves;

/// <summary>The moves of past days: nothing is drawn.</summary>
internal sealed class HistoricalMoves(int capacity) : MoveSource
{
    private HistoricalLaw _law = null!;
    private RevaluationPlan _plan = null!;
    private double[] _moves = [];
    private int _first, _width;

    /// <inheritdoc/>
    public override void Draw(long first, int width)
    {
        if (first + width > _law.ScenarioCount)
            throw new ArgumentOutOfRangeException(nameof(first), first, $"The history has {_law.ScenarioCount} scenarios, and number {first + width - 1} was asked for.");
        (_first, _width) = ((int)first, width);
    }

    /// <inheritdoc/>
    public override double[] At(int horizon)
    {
        var days = _plan.Horizons[horizon].Days;
        for (var row = 0; row < _plan.Moves.Rows; row++)
        {
            var moves = _moves.AsSpan(row * _width, _width);
            for (var lane = 0; lane < moves.Length; lane++) moves[lane] = _law.Move(row, _first + lane, days);
        }
        return _moves;
    }

    /// <inheritdoc/>
    protected override void Serve(RevaluationPlan plan)
    {
        (_plan, _law) = (plan, (HistoricalLaw)plan.Law);
        Room.For(ref _moves, plan.Moves.Rows * capacity);
    }
}
