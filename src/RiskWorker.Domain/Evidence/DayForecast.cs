using RiskWorker.Domain.Runs;

namespace RiskWorker.Domain.Evidence;

/// <summary>What a model said at one close of the profit to the next, and what that profit was.</summary>
/// <param name="AsOf">The close.</param>
/// <param name="ProfitDate">The next close.</param>
/// <param name="Scenarios">Scenarios behind the figures; null where they come from a run that does not say.</param>
/// <param name="Books">Books depth first.</param>
public sealed record DayForecast(DateOnly AsOf, DateOnly ProfitDate, int? Scenarios, IReadOnlyList<BookForecast> Books);

/// <summary>A book's figures at a close, in its currency.</summary>
public sealed record BookForecast
{
    /// <summary>The book.</summary>
    public required string Book { get; init; }

    /// <summary>VaR and expected shortfall, confidences ascending.</summary>
    public required IReadOnlyList<LevelForecast> Levels { get; init; }

    /// <summary>Profit to the next close of the positions unchanged, by the model's factors; null where it is not known.</summary>
    public double? Theoretical { get; init; }

    /// <summary>Probability of a profit at or below the theoretical one.</summary>
    public double? PTheoretical { get; init; }

    /// <summary>Probability of a profit at or below the actual one.</summary>
    public double? PActual { get; init; }

    /// <summary>The tail of the distribution of profit, probabilities ascending.</summary>
    public IReadOnlyList<Quantile> Tail { get; init; } = [];

    /// <summary>On a day beyond the VaR, the factors that cost most when each moves alone.</summary>
    public IReadOnlyList<FactorAmount> Factors { get; init; } = [];
}

/// <summary>A forecast at one confidence.</summary>
public readonly record struct LevelForecast(Confidence Confidence, double Var, double Es);
