namespace RiskWorker.Domain.Instruments;

/// <summary>How the days of a period become a fraction of a year.</summary>
public enum DayCount
{
    /// <summary>30/360, the bond basis of the 2006 ISDA Definitions, section 4.16(f).</summary>
    Thirty360,

    /// <summary>Calendar days over 360.</summary>
    Actual360,

    /// <summary>Calendar days over 365, leap year or not.</summary>
    Actual365Fixed,

    /// <summary>Calendar days over those of the year (swaps) or of the coupon period (securities); see <see cref="AccrualRule"/>.</summary>
    ActualActual,
}

/// <summary>The feed's spelling of the day counts; the one table behind reading and messages.</summary>
public static class DayCounts
{
    /// <summary>Day counts by spelling, in the order in which messages list them.</summary>
    public static IReadOnlyDictionary<string, DayCount> BySpelling { get; } = new Dictionary<string, DayCount>(StringComparer.Ordinal)
    {
        ["30/360"] = DayCount.Thirty360,
        ["ACT/360"] = DayCount.Actual360,
        ["ACT/365F"] = DayCount.Actual365Fixed,
        ["ACT/ACT"] = DayCount.ActualActual,
    };
}
