using RiskWorker.Domain.Limits;

namespace RiskWorker.Domain.Runs;

/// <summary>A limit held against its measure.</summary>
public sealed record LimitResult
{
    /// <summary>The limit.</summary>
    public required Limit Limit { get; init; }

    /// <summary>Currency of the book: unit of <see cref="Value"/>.</summary>
    public required string Currency { get; init; }

    /// <summary>The measure in the book's currency; null where it could not be computed.</summary>
    public required double? Value { get; init; }

    /// <summary>Lower end of its interval.</summary>
    public required double? Low { get; init; }

    /// <summary>Upper end of its interval.</summary>
    public required double? High { get; init; }

    /// <summary>Level of the interval.</summary>
    public required double Level { get; init; }

    /// <summary>Share of the amount that is used: 1 is the limit itself; null where undecidable.</summary>
    public required double? Used { get; init; }

    /// <summary>Lower end of the interval of <see cref="Used"/>.</summary>
    public required double? UsedLow { get; init; }

    /// <summary>Upper end of the interval of <see cref="Used"/>.</summary>
    public required double? UsedHigh { get; init; }

    /// <summary>Where it stands.</summary>
    public required LimitStatus Status { get; init; }

    /// <summary>First as-of date of the unbroken row of runs with this status.</summary>
    public DateOnly? StatusSince { get; init; }
}
