namespace RiskWorker.Domain.Instruments;

/// <summary>How interest grows over a coupon period: a day count as securities or as swaps read it.</summary>
/// <remarks>
/// A swap follows <see cref="YearFraction"/> to the letter. The holder of a security expects equal regular coupons where the day
/// count does not name its own year: under ACT/ACT it follows ICMA rule 251 (days over frequency times the days of the regular
/// period), and under 30/360 a regular period is 1/frequency even where it starts at the end of February; no part of a period
/// exceeds that. ACT/360 and ACT/365F count days for both.
/// </remarks>
public readonly record struct AccrualRule
{
    private AccrualRule(DayCount dayCount, int frequency, bool isSecurity) => (DayCount, Frequency, IsSecurity) = (dayCount, frequency, isSecurity);

    /// <summary>The day count.</summary>
    public DayCount DayCount { get; }

    /// <summary>Coupons a year.</summary>
    public int Frequency { get; }

    /// <summary>Whether it is read as securities do.</summary>
    public bool IsSecurity { get; }

    /// <summary>The rule of a bond or floater.</summary>
    public static AccrualRule OfSecurity(DayCount dayCount, int frequency) => new(dayCount, frequency, true);

    /// <summary>The rule of a swap's leg.</summary>
    public static AccrualRule OfSwap(DayCount dayCount, int frequency) => new(dayCount, frequency, false);

    /// <summary>Fraction of a year that the whole of <paramref name="period"/> pays for.</summary>
    public double Of(in AccrualPeriod period) =>
        IsSecurity && period.IsRegular && DayCount == DayCount.Thirty360 ? 1.0 / Frequency : Until(period, period.End);

    /// <summary>Fraction of a year accrued from the start of <paramref name="period"/> to <paramref name="date"/>, which is inside it.</summary>
    public double Until(in AccrualPeriod period, DateOnly date)
    {
        if (!IsSecurity) return YearFraction.Of(DayCount, period.Start, date);
        return DayCount switch
        {
            DayCount.ActualActual => (date.DayNumber - period.Start.DayNumber) / ((double)Frequency * (period.End.DayNumber - period.RegularStart.DayNumber)),
            DayCount.Thirty360 => Math.Min(YearFraction.Of(DayCount, period.Start, date), 1.0 / Frequency),
            _ => YearFraction.Of(DayCount, period.Start, date),
        };
    }
}
