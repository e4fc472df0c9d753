using RiskWorker.Engine.Plans;

namespace RiskWorker.Engine.Surfaces;

/// <summary>
/// The profit of many options of one cell on the same underlying (and volatility) as one polynomial, in the cell's currency,
/// over <see cref="AxisScale.Deviations"/> standard deviations to either side.
/// </summary>
/// <param name="Cell">Where its profit goes.</param>
/// <param name="Items">The options of the batch that it stands for.</param>
/// <param name="Coefficients">By power of the scaled log-return; with a volatility, columns are powers of its scaled log-return.</param>
/// <param name="Columns">Powers of the volatility, from 0; 1 where it is flat.</param>
/// <param name="Bound">How far it may lie from full revaluation.</param>
public sealed record PriceSurface(int Cell, ItemRange Items, double[] Coefficients, int Columns, double Bound);

/// <summary>Maps the log-returns of a variable to [-1, 1]: scale·x + offset.</summary>
public readonly record struct AxisScale(double Scale, double Offset)
{
    /// <summary>Half of the range in standard deviations: one draw in 5·10^8 lies outside.</summary>
    public const double Deviations = 6;

    /// <summary>The axis of a log-return of that mean and deviation, which is positive.</summary>
    public static AxisScale Around(double mean, double deviation) => new(1 / (Deviations * deviation), -mean / (Deviations * deviation));

    /// <summary>The log-return at <paramref name="z"/>.</summary>
    public double At(double z) => (z - Offset) / Scale;
}

/// <summary>The surfaces of one option batch at one horizon, and the options that stay on full revaluation.</summary>
/// <param name="Volatility">The axis of its volatility; meaningless where that is flat.</param>
/// <param name="Surfaces">The surfaces, by cell.</param>
/// <param name="Direct">Options that no surface stands for.</param>
public sealed record BatchSurfaces(AxisScale Volatility, PriceSurface[] Surfaces, ItemRange[] Direct);

/// <summary>The surfaces on one underlying at one horizon, batch by batch.</summary>
public sealed record GroupSurfaces(AxisScale Underlying, BatchSurfaces[] Batches)
{
    /// <summary>Whether any batch has a surface.</summary>
    public bool HasAny { get; } = Batches.Any(b => b.Surfaces.Length > 0);
}
