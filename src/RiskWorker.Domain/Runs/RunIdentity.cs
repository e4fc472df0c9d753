using System.Globalization;

namespace RiskWorker.Domain.Runs;

/// <summary>The id of a run: the same inputs at the same attempt have the same id wherever they are run.</summary>
public static class RunIdentity
{
    /// <summary>Hex digits of an id: 48 bits, so among 100,000 runs two share one with a probability of 2e-5.</summary>
    public const int Length = 12;

    /// <summary>The id of attempt <paramref name="attempt"/> (1 for the first) at the inputs hashed to <paramref name="snapshotHash"/>.</summary>
    /// <exception cref="ArgumentOutOfRangeException">The attempt is below 1.</exception>
    public static string Of(string snapshotHash, int attempt)
    {
        ArgumentException.ThrowIfNullOrEmpty(snapshotHash);
        ArgumentOutOfRangeException.ThrowIfLessThan(attempt, 1);
        return SnapshotHash.OfText(string.Create(CultureInfo.InvariantCulture, $"{snapshotHash}\n{attempt}\n"))[..Length];
    }
}
