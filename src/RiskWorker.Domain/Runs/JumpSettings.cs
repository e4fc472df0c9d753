namespace RiskWorker.Domain.Runs;

/// <summary>The jumps of a jump-diffusion: found in the history by a threshold, or given.</summary>
public sealed record JumpSettings
{
    /// <summary>A shock beyond so many standard deviations of the diffusion is a jump, where jumps are found in the history.</summary>
    public double Threshold { get; init; } = 4;

    /// <summary>Jumps a year that several factors make together; null where none are given.</summary>
    public double? CommonPerYear { get; init; }

    /// <summary>How each factor moves in a common jump; one that is not named does not.</summary>
    public IReadOnlyDictionary<string, JumpSize> Common { get; init; } = new SortedDictionary<string, JumpSize>(StringComparer.Ordinal);

    /// <summary>Jumps that a factor makes on its own.</summary>
    public IReadOnlyDictionary<string, OwnJumps> Own { get; init; } = new SortedDictionary<string, OwnJumps>(StringComparer.Ordinal);

    /// <summary>Whether they are given; otherwise they are found in the history.</summary>
    public bool AreGiven => CommonPerYear is not null || Own.Count > 0;
}

/// <summary>A normally distributed jump of a shock: of the logarithm for a log-normal factor, of the value for a normal one.</summary>
/// <param name="Mean">Its mean.</param>
/// <param name="Deviation">Its standard deviation.</param>
public readonly record struct JumpSize(double Mean, double Deviation);

/// <summary>Jumps that come at a rate.</summary>
/// <param name="PerYear">Expected jumps a year of 252 business days.</param>
/// <param name="Size">Their size.</param>
public readonly record struct OwnJumps(double PerYear, JumpSize Size);
