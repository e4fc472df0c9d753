namespace RiskWorker.Numerics;

/// <summary>
/// The epoch of the numerics: raised, with a dated decision in DEVELOPERS.md, by every change that moves a bit of a figure.
/// A stored run of another epoch is reported as such when it is computed again, not as tampered with.
/// </summary>
public static class NumericsEpoch
{
    /// <summary>The epoch of this code.</summary>
    public const int Current = 3;
}
