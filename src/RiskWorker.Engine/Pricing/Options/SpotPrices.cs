namespace RiskWorker.Engine.Pricing.Options;

/// <summary>One option under one set of rates and one volatility: what is found once for all spots.</summary>
public abstract class SpotPrices
{
    /// <summary>The spot at which an American option is best exercised at once, beyond which its value is that of exercise; null where there is none.</summary>
    public virtual double? ExerciseSpot => null;

    /// <summary>Values and standard errors of one unit at every spot.</summary>
    /// <param name="spots">Levels of the underlying.</param>
    /// <param name="values">A value for each.</param>
    /// <param name="standardErrors">Its standard error: 0 for a method without draws.</param>
    public abstract void Price(ReadOnlySpan<double> spots, Span<double> values, Span<double> standardErrors);
}
