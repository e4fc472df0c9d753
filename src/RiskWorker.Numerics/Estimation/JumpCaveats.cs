namespace RiskWorker.Numerics.Estimation;

/// <summary>What a jump estimate could not do as its method would.</summary>
[Flags]
public enum JumpCaveats
{
    /// <summary>Nothing.</summary>
    None = 0,

    /// <summary>No day counts as a jump: intensity, mean and deviation are 0.</summary>
    NoJumps = 1,

    /// <summary>One day does: its size is the mean, and the deviation, which one day cannot show, is 0.</summary>
    SingleJump = 2,

    /// <summary>
    /// The jump days vary by less than the diffusion alone would make them: the deviation of the jumps is 0, and the diffusion
    /// is lowered so that the total variance is kept.
    /// </summary>
    DeviationAtZero = 4,
}
