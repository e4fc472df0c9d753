namespace RiskWorker.Engine.Checks;

/// <summary>When a model value counts as different from the book of record's.</summary>
internal static class Reconciliation
{
    /// <summary>Whether the two differ by more than <paramref name="tolerance"/> times the market value's size; exactly as much is let pass.</summary>
    public static bool IsBreak(double model, double market, double tolerance) => Math.Abs(model - market) > tolerance * Math.Abs(market);
}
