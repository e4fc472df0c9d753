using RiskWorker.Engine.Models;
using RiskWorker.Engine.Plans;

namespace RiskWorker.Engine.Simulation.Moves;

/// <summary>Makes the moves of the factors in consecutive scenarios: the draws of one thread. Every scenario's are a function of its number alone.</summary>
internal abstract class MoveSource
{
    /// <summary>A source for <paramref name="plan"/>.</summary>
    /// <param name="plan">The plan.</param>
    /// <param name="capacity">Most scenarios side by side.</param>
    /// <param name="before">A source of the same capacity that is no longer needed, whose buffers may be used again; or null.</param>
    public static MoveSource For(RevaluationPlan plan, int capacity, MoveSource? before)
    {
        MoveSource source = plan.Law switch
        {
            LognormalLaw => before as NormalMoves ?? new NormalMoves(capacity),
            StudentLaw { Margins: null } => before as StudentMoves ?? new StudentMoves(capacity),
            StudentLaw => before as CopulaMoves ?? new CopulaMoves(capacity),
            FilteredHistoryLaw => before as FilteredMoves ?? new FilteredMoves(capacity),
            JumpLaw => before as JumpMoves ?? new JumpMoves(capacity),
            HistoricalLaw => before as HistoricalMoves ?? new HistoricalMoves(capacity),
            _ => throw new InvalidOperationException($"No draws are known for {plan.Law.GetType().Name}."),
        };
        source.Serve(plan);
        return source;
    }

    /// <summary>Draws scenarios <paramref name="first"/> to first + width - 1.</summary>
    public abstract void Draw(long first, int width);

    /// <summary>The moves of the scenarios last drawn, a row a moving factor, as far apart as there are scenarios; written over by the next call.</summary>
    public abstract double[] At(int horizon);

    /// <summary>
    /// The moves of the scenarios last drawn at the close of a day inside a horizon, before its last: multiples of a day's deviation that are not
    /// scaled by a number of days any more, or shocks outright; rows as those of <see cref="At"/>, written over by the next call. They lead to the
    /// moves at the horizon, and depend on scenario, horizon and day alone, not on which other days are asked for.
    /// </summary>
    public virtual double[] Inside(int horizon, int day) => throw new InvalidOperationException($"{GetType().Name} has no draws inside a horizon.");

    /// <summary>Turns to <paramref name="plan"/>; buffers that are large enough are used again.</summary>
    protected abstract void Serve(RevaluationPlan plan);
}
