namespace RiskWorker.Domain.Runs;

/// <summary>The simulated distribution of a node's profit at one horizon.</summary>
public sealed record ProfitDistribution
{
    /// <summary>Horizon in business days.</summary>
    public required Horizon Horizon { get; init; }

    /// <summary>Mean profit.</summary>
    public required double Mean { get; init; }

    /// <summary>Standard deviation of profit (divisor n).</summary>
    public required double Deviation { get; init; }

    /// <summary>Profit at the lower edge of the first inner bin.</summary>
    public required double Low { get; init; }

    /// <summary>Profit at the upper edge of the last inner bin.</summary>
    public required double High { get; init; }

    /// <summary>Scenario counts: below <see cref="Low"/>, the equal inner bins, at or above <see cref="High"/>.</summary>
    public required IReadOnlyList<long> Counts { get; init; }

    /// <summary>About 200 quantiles of profit, probabilities ascending, dense in the loss tail.</summary>
    public required IReadOnlyList<Quantile> Quantiles { get; init; }
}

/// <summary>Profit that is not exceeded with a probability.</summary>
/// <param name="Probability">In (0, 1).</param>
/// <param name="Profit">The profit, in the node's currency.</param>
/// <param name="Exact">True for an order statistic, false where it is interpolated within a histogram bin.</param>
public readonly record struct Quantile(double Probability, double Profit, bool Exact);
