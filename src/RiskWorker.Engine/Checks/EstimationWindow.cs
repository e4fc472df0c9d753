using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Checks;

/// <summary>The newest days that are complete over all factors, as many as the model's window asks for.</summary>
/// <param name="FirstRow">Row from which prices are looked at: the oldest complete day, or the window's length back if that is older.</param>
/// <param name="Kept">Complete days, at most the window.</param>
/// <param name="Dropped">Days after the oldest complete one on which some factors moved and others have no shock.</param>
internal readonly record struct EstimationWindow(int FirstRow, int Kept, int Dropped)
{
    /// <summary>
    /// Finds it. Factors below the minimum of shocks are left out of the count: a proxy stands in for them, or they stop the run on their own.
    /// </summary>
    public static EstimationWindow Of(Snapshot snapshot, IReadOnlyList<FactorHistory> histories)
    {
        var counted = histories.Where(h => h.ShockCount >= snapshot.Settings.Checks.MinimumHistory).ToArray();
        var length = snapshot.Settings.Model.Window;
        var (oldest, nominal, kept, days, incomplete, dropped) = (snapshot.Observations.Count, 0, 0, 0, 0, 0);
        for (var row = snapshot.Observations.Count - 1; row >= 0 && kept < length; row--)
        {
            var moved = counted.Count(h => !double.IsNaN(h.Shocks[row]));
            if (moved == 0) continue;
            if (++days == length) nominal = row;
            if (moved < counted.Length) incomplete++;
            else (oldest, kept, dropped) = (row, kept + 1, incomplete);
        }
        return new(kept == length ? oldest : Math.Min(oldest, nominal), kept, dropped);
    }
}
