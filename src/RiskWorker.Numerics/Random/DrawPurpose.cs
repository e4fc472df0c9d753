namespace RiskWorker.Numerics.Random;

/// <summary>
/// What a stream of random numbers is drawn for: the top eight bits of the fourth counter word. A number, once released,
/// keeps its meaning for ever, or stored runs could not be computed again.
/// </summary>
public enum DrawPurpose : byte
{
    /// <summary>Independent normals behind the correlated moves of the factors.</summary>
    FactorMoves = 0,

    /// <summary>The variable that mixes normals into a fatter-tailed distribution.</summary>
    MixingVariable = 1,

    /// <summary>Numbers, times and sizes of jumps.</summary>
    Jumps = 2,

    /// <summary>The past day whose residuals a scenario takes.</summary>
    ResidualDays = 3,

    /// <summary>Steps of a path between two dates.</summary>
    PathSteps = 4,

    /// <summary>The pilot of a pricer that simulates.</summary>
    PricerPilot = 5,

    /// <summary>Series of profit or exceptions drawn under a model, which a backtest's statistic is held against.</summary>
    NullSeries = 6,

    /// <summary>Where in its step a forecast probability of a discrete model lies.</summary>
    StepPosition = 7,
}
