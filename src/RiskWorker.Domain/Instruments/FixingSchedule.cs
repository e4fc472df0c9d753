namespace RiskWorker.Domain.Instruments;

/// <summary>A day whose close enters an average, with its level where the feed gives it.</summary>
public readonly record struct Fixing(DateOnly Date, double? Value);

/// <summary>What an average is taken over: every moment from the issue on, or the closes of days in ascending order.</summary>
/// <remarks>Two schedules are equal when their days and levels are.</remarks>
public sealed class FixingSchedule : IEquatable<FixingSchedule>
{
    private FixingSchedule(IReadOnlyList<Fixing> fixings) => Fixings = fixings;

    /// <summary>Every moment.</summary>
    public static FixingSchedule Continuous { get; } = new([]);

    /// <summary>Whether it is every moment; then there are no fixings.</summary>
    public bool IsContinuous => Fixings.Count == 0;

    /// <summary>The fixings, dates strictly ascending.</summary>
    public IReadOnlyList<Fixing> Fixings { get; }

    /// <summary>The closes of the days of <paramref name="fixings"/>.</summary>
    /// <exception cref="ArgumentException">There is none, the dates do not ascend strictly, or a level is not a number above 0.</exception>
    public static FixingSchedule Of(params IReadOnlyList<Fixing> fixings)
    {
        if (fixings.Count == 0) throw new ArgumentException("There is no fixing; a schedule of days needs one at least.", nameof(fixings));
        for (var i = 0; i < fixings.Count; i++)
        {
            if (i > 0 && fixings[i].Date <= fixings[i - 1].Date)
                throw new ArgumentException($"Fixing {i} is on {fixings[i].Date:yyyy-MM-dd}; it must come after {fixings[i - 1].Date:yyyy-MM-dd}.", nameof(fixings));
            if (fixings[i].Value is { } level && !(level > 0 && double.IsFinite(level)))
                throw new ArgumentException($"Fixing {i} has the level {level}; it must be a number above 0.", nameof(fixings));
        }
        return new([.. fixings]);
    }

    /// <inheritdoc/>
    public bool Equals(FixingSchedule? other) => other is not null && Fixings.SequenceEqual(other.Fixings);

    /// <inheritdoc/>
    public override bool Equals(object? obj) => Equals(obj as FixingSchedule);

    /// <inheritdoc/>
    public override int GetHashCode() => Fixings.Aggregate(Fixings.Count, HashCode.Combine);
}
