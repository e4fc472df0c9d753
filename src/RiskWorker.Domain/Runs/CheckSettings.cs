namespace RiskWorker.Domain.Runs;

/// <summary>Thresholds and severities of the checks.</summary>
public sealed record CheckSettings
{
    /// <summary>Business days without a change from which a price counts as stale.</summary>
    public int StaleDays { get; init; } = 3;

    /// <summary>Standard deviations of the other days from which a move counts as a jump.</summary>
    public double JumpSigmas { get; init; } = 8;

    /// <summary>Shocks below which a factor has too little history.</summary>
    public int MinimumHistory { get; init; } = 60;

    /// <summary>Relative difference between model value and market value that is let pass.</summary>
    public double ValueTolerance { get; init; } = 0.01;

    /// <summary>Relative change of a book's gross value against the previous date that is let pass.</summary>
    public double GrossChange { get; init; } = 0.5;

    /// <summary>Severity by finding code, where the settings change it.</summary>
    public IReadOnlyDictionary<string, FindingSeverity> Severity { get; init; } = new SortedDictionary<string, FindingSeverity>(StringComparer.Ordinal);
}
