namespace RiskWorker.Domain.Market;

/// <summary>A factor's value at the close of a date: one row of <c>observations.csv</c>.</summary>
public readonly record struct Observation(DateOnly Date, string Factor, double Value);

/// <summary>A split or contract roll: values before <paramref name="Date"/> are multiplied by <paramref name="Ratio"/>.</summary>
public sealed record Adjustment(string Factor, DateOnly Date, double Ratio, string? Reason);

/// <summary>A day on which a calendar is closed, beyond Saturdays and Sundays.</summary>
public readonly record struct Holiday(string Calendar, DateOnly Date);

/// <summary>A given covariance of daily shocks, used in place of estimation; the entry stands for both orders of the pair.</summary>
public readonly record struct CovarianceEntry(string Factor, string Other, double Value);
