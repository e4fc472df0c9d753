namespace RiskWorker.Domain.Instruments;

/// <summary>Fraction of a year between two dates, as the 2006 ISDA Definitions have it: the first day counts, the last does not.</summary>
public static class YearFraction
{
    /// <summary>The fraction from <paramref name="from"/> to <paramref name="to"/>.</summary>
    /// <remarks>
    /// 30/360 is section 4.16(f), the bond basis: a first day of 31 counts as 30, a last day of 31 as 30 where the first is 30 or 31,
    /// and February is as it stands. ACT/ACT is section 4.16(b): days in leap years over 366 plus days in other years over 365.
    /// </remarks>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="to"/> is before <paramref name="from"/>.</exception>
    public static double Of(DayCount dayCount, DateOnly from, DateOnly to)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(to, from);
        var days = to.DayNumber - from.DayNumber;
        return dayCount switch
        {
            DayCount.Thirty360 => Thirty360Days(from, to) / 360.0,
            DayCount.Actual360 => days / 360.0,
            DayCount.Actual365Fixed => days / 365.0,
            DayCount.ActualActual => ByYears(from, to),
            _ => throw new ArgumentOutOfRangeException(nameof(dayCount), dayCount, "A day count has a rule."),
        };
    }

    private static int Thirty360Days(DateOnly from, DateOnly to)
    {
        var first = Math.Min(from.Day, 30);
        var last = to.Day == 31 && first == 30 ? 30 : to.Day;
        return (360 * (to.Year - from.Year)) + (30 * (to.Month - from.Month)) + last - first;
    }

    private static double ByYears(DateOnly from, DateOnly to)
    {
        int common = 0, leap = 0;
        for (var year = from.Year; year <= to.Year; year++)
        {
            var start = year == from.Year ? from.DayOfYear - 1 : 0;
            var end = year == to.Year ? to.DayOfYear - 1 : DateTime.IsLeapYear(year) ? 366 : 365;
            if (DateTime.IsLeapYear(year)) leap += end - start;
            else common += end - start;
        }
        return (common / 365.0) + (leap / 366.0);
    }
}
