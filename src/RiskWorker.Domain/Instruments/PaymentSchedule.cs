namespace RiskWorker.Domain.Instruments;

/// <summary>One coupon period; the coupon is paid at its end.</summary>
/// <param name="Start">First day that accrues.</param>
/// <param name="End">First day that no longer accrues, and the payment date.</param>
/// <param name="RegularStart">Where a whole period to the same end would start: <paramref name="Start"/>, or before it in a short first period.</param>
public readonly record struct AccrualPeriod(DateOnly Start, DateOnly End, DateOnly RegularStart)
{
    /// <summary>Whether it has its whole length.</summary>
    public bool IsRegular => Start == RegularStart;
}

/// <summary>
/// Coupon periods from issue to maturity. Dates are rolled back from maturity by whole months, each from maturity itself, so that a
/// maturity on the 31st gives the last day of shorter months and the 31st of longer ones again; none is moved for weekends or
/// holidays. What is left over at the start is a short first period.
/// </summary>
/// <remarks>A maturity on the last day of a shorter month gives that day in every month (28 February: 28 August), not month ends.</remarks>
public static class PaymentSchedule
{
    /// <summary>The earliest issue that is accepted.</summary>
    public static DateOnly EarliestIssue { get; } = new(1900, 1, 1);

    /// <summary>The most years that are accepted from issue to maturity.</summary>
    public const int MostYears = 200;

    /// <summary>The periods, earliest first.</summary>
    /// <param name="issue">Start of the first period.</param>
    /// <param name="maturity">End of the last period; after <paramref name="issue"/>.</param>
    /// <param name="frequency">Coupons a year: 1, 2, 4 or 12; 0 gives no period.</param>
    public static AccrualPeriod[] Of(DateOnly issue, DateOnly maturity, int frequency)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(issue, EarliestIssue);
        ArgumentOutOfRangeException.ThrowIfLessThanOrEqual(maturity, issue);
        if (frequency is not (0 or 1 or 2 or 4 or 12)) throw new ArgumentOutOfRangeException(nameof(frequency), frequency, "A frequency is 0, 1, 2, 4 or 12.");
        if (frequency == 0) return [];
        var periods = new List<AccrualPeriod>();
        for (var end = maturity; end > issue;)
        {
            var start = maturity.AddMonths(-12 / frequency * (periods.Count + 1));
            periods.Add(new(start > issue ? start : issue, end, start));
            end = start;
        }
        periods.Reverse();
        return [.. periods];
    }
}
