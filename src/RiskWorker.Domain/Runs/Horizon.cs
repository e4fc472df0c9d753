namespace RiskWorker.Domain.Runs;

/// <summary>A holding period in business days, at least 1.</summary>
public readonly record struct Horizon : IComparable<Horizon>
{
    /// <summary>Takes a number of business days.</summary>
    public Horizon(int days)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(days, 1);
        Days = days;
    }

    /// <summary>Business days.</summary>
    public int Days { get; }

    /// <inheritdoc/>
    public int CompareTo(Horizon other) => Days.CompareTo(other.Days);

    /// <summary>As in '1 day' or '10 days'.</summary>
    public override string ToString() => Days == 1 ? "1 day" : $"{Days} days";
}
