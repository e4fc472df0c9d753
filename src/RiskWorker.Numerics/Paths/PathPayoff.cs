namespace RiskWorker.Numerics.Paths;

/// <summary>
/// A payoff that depends on a path. To add one: reduce a path to a few numbers that do not depend on the spot, give the part
/// of the payoff that must be simulated from them, name controls whose expectation is known, and add what is certain.
/// </summary>
/// <remarks>All amounts are undiscounted. Rows of statistics and controls are one block long, one after the other.</remarks>
public abstract class PathPayoff
{
    private protected PathPayoff(PathSchedule schedule) => Schedule = schedule;

    /// <summary>Dates, forwards and discount factor.</summary>
    public PathSchedule Schedule { get; }

    /// <summary>Whether the extremes between dates are drawn.</summary>
    internal abstract bool UsesBridges { get; }

    /// <summary>Numbers that a path is reduced to.</summary>
    internal abstract int Statistics { get; }

    /// <summary>Variables whose expectation is known, at least one; the last is the closest to the payoff, of the same scale.</summary>
    internal abstract int Controls { get; }

    /// <summary>Reduces a block of paths, or of their mirrors, at one volatility.</summary>
    internal abstract void Reduce(PathBlock block, double volatility, bool isMirrored, Span<double> statistics);

    /// <summary>The simulated part of the payoff, and the controls, at one spot.</summary>
    internal abstract void Evaluate(double spot, ReadOnlySpan<double> statistics, Span<double> payoff, Span<double> controls);

    /// <summary>Expectations of the controls.</summary>
    internal abstract void ControlMeans(double spot, double volatility, Span<double> means);

    /// <summary>Expectation of what is not simulated.</summary>
    internal abstract double Certain(double spot);

    private protected static Span<double> Row(Span<double> rows, int row) => rows.Slice(row * PathBlock.Pairs, PathBlock.Pairs);

    private protected static ReadOnlySpan<double> Row(ReadOnlySpan<double> rows, int row) =>
        rows.Slice(row * PathBlock.Pairs, PathBlock.Pairs);

    private protected static void RequirePositive(double value, string name)
    {
        if (!(value > 0.0) || double.IsInfinity(value))
            throw new ArgumentOutOfRangeException(name, value, $"{name} is {value}; it must be positive and finite.");
    }
}
