namespace RiskWorker.Numerics.Estimation;

/// <summary>Which ends of the permitted parameters an estimate lies on: there the process is simpler than it looks.</summary>
[Flags]
public enum GarchBounds
{
    /// <summary>None: an inner maximum.</summary>
    None = 0,

    /// <summary>alpha is 0: squares tell nothing of the next day, beta cannot be told and is set to 0, and the variance is constant.</summary>
    NoReaction = 1,

    /// <summary>beta is 0: the process is an ARCH(1).</summary>
    NoMemory = 2,

    /// <summary>alpha + beta is at its highest, <see cref="GarchFit.HighestPersistence"/>: the variance has no level that it returns to within the data.</summary>
    NoReversion = 4,

    /// <summary>omega is at its lowest, <see cref="GarchFit.LowestOmega"/> of the series' variance.</summary>
    NoFloor = 8,
}
