namespace RiskWorker.Domain.Evidence;

/// <summary>How a p-value was found.</summary>
public enum TestMethod
{
    /// <summary>By the law of the statistic for so many days.</summary>
    Exact,

    /// <summary>By its limit for many days.</summary>
    Asymptotic,

    /// <summary>By simulated series.</summary>
    Simulated,
}

/// <summary>A statistical test.</summary>
/// <param name="Name">Its name in <c>backtest.json</c>.</param>
/// <param name="Statistic">Its statistic; null where it cannot be assessed.</param>
/// <param name="PValue">Its p-value; null where it cannot be assessed.</param>
/// <param name="Method">How the p-value was found; null where there is none.</param>
/// <param name="Reject">Whether the model is rejected at 5%; null where it cannot be assessed.</param>
/// <param name="Source">The paper or paragraph.</param>
/// <param name="Note">What a reader must know, or null.</param>
public sealed record EvidenceTest(string Name, double? Statistic, double? PValue, TestMethod? Method, bool? Reject, string Source, string? Note = null);
