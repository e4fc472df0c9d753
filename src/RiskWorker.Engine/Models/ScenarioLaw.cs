using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Models;

/// <summary>
/// How the joint moves of the factors are distributed around what is common to all models: levels, standard deviations, correlation.
/// A part of the plan, and of its hash.
/// </summary>
public abstract record ScenarioLaw
{
    /// <summary>Whether a scenario's moves are shocks outright; otherwise they are multiples of a day's standard deviation, to be scaled by the root of the horizon and shifted by the drift.</summary>
    public abstract bool GivesShocks { get; }

    /// <summary>The number of scenarios that there are, where they are a list and not drawn; null where there is no end to them.</summary>
    public virtual int? ScenarioCount => null;

    /// <summary>Whether moves can be drawn at closes inside a horizon (<see cref="Simulation.Moves.MoveSource.Inside"/>): what a book needs that ages.</summary>
    public virtual bool HasPaths => false;

    /// <summary>Every number that the moves depend on beyond the correlation and the factors' own laws.</summary>
    public abstract IEnumerable<double> Numbers();

    /// <summary>What the law was calibrated to or given, for the record.</summary>
    public virtual IEnumerable<ModelParameter> Parameters(CalibratedModel model) => [];

    /// <summary>How many standard deviations of <paramref name="days"/> days tables of prices should reach: a scenario beyond is valued without them, slowly.</summary>
    public virtual double Reach(int days) => Ordinary;

    /// <summary>The reach of a normal law.</summary>
    protected const double Ordinary = Surfaces.AxisScale.Deviations;
}
