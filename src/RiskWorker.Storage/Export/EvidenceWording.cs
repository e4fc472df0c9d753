using RiskWorker.Domain.Evidence;

namespace RiskWorker.Storage.Export;

/// <summary>What the exports of backtest evidence share.</summary>
internal static class EvidenceWording
{
    /// <summary>Kinds as <c>backtest.json</c> spells them.</summary>
    public static string Of(BacktestKind kind) => kind == BacktestKind.WalkForward ? "walk-forward" : Words.Of(kind);

    /// <summary>An optional member in lower case, or null.</summary>
    public static string? Optional<T>(T? member) where T : struct, Enum => member is { } value ? Words.Of(value) : null;

    /// <summary>The loss beyond VaR; null where either is missing.</summary>
    public static double? Excess(ExceptionEntry entry) => -entry.Amount - entry.Var;

    /// <summary>Explanations of an exception: the one that holds (null where there is none), then those that it corrects.</summary>
    public static IEnumerable<(string State, ExceptionExplanation? Explanation)> Explanations(ExceptionEntry entry) =>
        entry.Corrected.Select(one => ("corrected", (ExceptionExplanation?)one)).Prepend((entry.Explanation is null ? "open" : "holds", entry.Explanation));
}
