namespace RiskWorker.Engine.Pricing.Options;

/// <summary>How far scenarios move one number that an option's value depends on.</summary>
/// <param name="Centre">The middle of the range, usually today's number.</param>
/// <param name="HalfWidth">The farthest that scenarios go from it either way; 0 for a number that does not move.</param>
public readonly record struct InputRange(double Centre, double HalfWidth)
{
    // What does not move may still be computed twice in two ways: a rounding apart, which no price shows.
    private const double Rounding = 1e-9;

    /// <summary>Whether it moves.</summary>
    public bool Moves => HalfWidth > 0;

    /// <summary>The lowest number inside.</summary>
    public double Low => Centre - (Moves ? HalfWidth : Rounding);

    /// <summary>The highest number inside.</summary>
    public double High => Centre + (Moves ? HalfWidth : Rounding);

    /// <summary>The number at <paramref name="z"/> in [-1, 1].</summary>
    public double At(double z) => Math.FusedMultiplyAdd(z, HalfWidth, Centre);

    /// <summary>Guards a range that came from outside.</summary>
    /// <exception cref="ArgumentOutOfRangeException">A number is not finite, or the half-width is below zero.</exception>
    internal void Require(string name)
    {
        if (!double.IsFinite(Centre))
            throw new ArgumentOutOfRangeException(name, Centre, $"The centre of {name} is {Centre}; it must be finite.");
        if (!(HalfWidth >= 0) || double.IsInfinity(HalfWidth))
            throw new ArgumentOutOfRangeException(name, HalfWidth, $"The half-width of {name} is {HalfWidth}; it must be 0 or more, and finite.");
    }
}
