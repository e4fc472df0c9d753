using System.Globalization;

namespace RiskWorker.Domain.Runs;

/// <summary>A confidence level in (0, 1), kept as the decimal that was typed: N(1 - 0.99) is not exact in binary.</summary>
public readonly record struct Confidence : IComparable<Confidence>
{
    /// <summary>Takes a level strictly between 0 and 1.</summary>
    public Confidence(decimal level)
    {
        if (level is <= 0 or >= 1) throw new ArgumentOutOfRangeException(nameof(level), level, "A confidence level lies strictly between 0 and 1.");
        Level = level / 1.0000000000000000000000000000m; // 0.990 and 0.99 are one level, and print alike
    }

    /// <summary>The level as a decimal.</summary>
    public decimal Level { get; }

    /// <inheritdoc/>
    public int CompareTo(Confidence other) => Level.CompareTo(other.Level);

    /// <summary>As in '99%' or '97.5%'.</summary>
    public override string ToString() => (Level * 100).ToString("0.############################", CultureInfo.InvariantCulture) + "%";
}
