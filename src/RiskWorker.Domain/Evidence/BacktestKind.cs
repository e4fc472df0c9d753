namespace RiskWorker.Domain.Evidence;

/// <summary>Whether the figures that profit is held against were known before it.</summary>
public enum BacktestKind
{
    /// <summary>Reported by runs before the profit was known.</summary>
    Recorded,

    /// <summary>Computed by stored runs afterwards.</summary>
    Backfilled,

    /// <summary>The model estimated anew on each past day from what was known then.</summary>
    WalkForward,
}

/// <summary>Which positions a walk-forward is made on.</summary>
public enum BacktestPositions
{
    /// <summary>Those stored for each day.</summary>
    Stored,

    /// <summary>Those of the newest date, held fixed.</summary>
    Today,
}

/// <summary>Which profit a series holds against the model.</summary>
public enum ProfitKind
{
    /// <summary>As the firm booked it.</summary>
    Actual,

    /// <summary>Of the close's positions, unchanged, at the next close's prices.</summary>
    Hypothetical,

    /// <summary>The same by the model's own factors and pricing.</summary>
    Theoretical,
}
