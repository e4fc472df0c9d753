using RiskWorker.Domain.Instruments;

namespace RiskWorker.Domain.Tests.Instruments;

public sealed class AccrualRuleTests
{
    private static AccrualPeriod First(DateOnly issue, DateOnly maturity, int frequency) => PaymentSchedule.Of(issue, maturity, frequency)[0];

    // The periods of ISDA's memorandum "The Actual/Actual Day Count Fraction" (1999), ISMA (now ICMA) method; from memory, counted again by
    // hand: days over frequency times the days of the regular period.
    [Fact]
    public void Of_security_on_actual_over_actual_pays_equal_regular_coupons()
    {
        Assert.Equal(0.5, AccrualRule.OfSecurity(DayCount.ActualActual, 2).Of(First(new(2003, 11, 1), new(2004, 5, 1), 2)));
        Assert.Equal(1.0, AccrualRule.OfSecurity(DayCount.ActualActual, 1).Of(First(new(1999, 7, 1), new(2000, 7, 1), 1)));
        Assert.Equal(0.5, AccrualRule.OfSecurity(DayCount.ActualActual, 2).Of(First(new(2003, 7, 15), new(2004, 1, 15), 2)));
    }

    // The same memorandum, short first period: 1 February to 1 July 1999 within 1 July 1998 to 1999, 150/(365 x 1) = 0.410958904110.
    [Fact]
    public void Of_security_on_actual_over_actual_measures_a_short_first_period_against_the_regular_one()
    {
        Assert.Equal(150 / 365.0, AccrualRule.OfSecurity(DayCount.ActualActual, 1).Of(First(new(1999, 2, 1), new(2002, 7, 1), 1)));
        Assert.Equal(31 / (2 * 184.0), AccrualRule.OfSecurity(DayCount.ActualActual, 2).Of(First(new(2024, 12, 15), new(2026, 1, 15), 2)));
    }

    [Fact]
    public void Of_swap_follows_the_day_count_to_the_letter()
    {
        var (leap, february) = (First(new(2003, 11, 1), new(2004, 5, 1), 2), First(new(2007, 2, 28), new(2007, 8, 31), 2));
        Assert.Equal((61 / 365.0) + (121 / 366.0), AccrualRule.OfSwap(DayCount.ActualActual, 2).Of(leap));
        Assert.Equal(183 / 360.0, AccrualRule.OfSwap(DayCount.Thirty360, 2).Of(february));
        Assert.Equal(0.5, AccrualRule.OfSecurity(DayCount.Thirty360, 2).Of(february));
        Assert.Equal(182 / 360.0, AccrualRule.OfSwap(DayCount.Actual360, 2).Of(leap));
        Assert.Equal(182 / 365.0, AccrualRule.OfSecurity(DayCount.Actual365Fixed, 2).Of(leap));
    }

    public static TheoryData<DayCount, int> Rules => new MatrixTheoryData<DayCount, int>(Enum.GetValues<DayCount>(), [1, 2, 4, 12]);

    // From 0 to the whole, never back and never beyond: what accrues is what the coupon then pays.
    [Theory]
    [MemberData(nameof(Rules))]
    public void Until_grows_from_nothing_to_the_whole_period(DayCount dayCount, int frequency)
    {
        foreach (var rule in new[] { AccrualRule.OfSecurity(dayCount, frequency), AccrualRule.OfSwap(dayCount, frequency) })
        {
            foreach (var period in PaymentSchedule.Of(new(2023, 11, 12), new(2025, 8, 31), frequency))
            {
                Assert.Equal(0, rule.Until(period, period.Start));
                var before = 0.0;
                for (var date = period.Start; date <= period.End; date = date.AddDays(1))
                {
                    var accrued = rule.Until(period, date);
                    Assert.InRange(accrued, before, rule.Of(period));
                    before = accrued;
                }
            }
        }
    }
}
