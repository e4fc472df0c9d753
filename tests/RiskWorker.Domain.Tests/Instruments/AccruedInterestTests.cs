using RiskWorker.Domain.Instruments;

namespace RiskWorker.Domain.Tests.Instruments;

public sealed class AccruedInterestTests
{
    private static Bond Bond(double coupon, DayCount dayCount, DateOnly maturity) =>
        new(new(coupon, 2, dayCount), maturity.AddYears(-10), maturity, RateTerm.Of(0), 100, null) { Name = "B", Currency = "USD" };

    private static Floater Floater(double? fixing) =>
        new(new(RateTerm.Of(0), 4, DayCount.Actual360, 0.002, fixing), new(2026, 1, 15), new(2027, 1, 15), RateTerm.Of(0), 1000, null) { Name = "F", Currency = "EUR" };

    // Hull, Options, Futures, and Other Derivatives, day count conventions: 8% on 1 March and 1 September, from 1 March to 3 July:
    // 124/184 x 4 = 2.6957 (actual/actual in period) and 122/180 x 4 = 2.7111 (30/360); 11% on 10 January and 10 July, on 5 March:
    // 54/181 x 5.5 = 1.64. Printed figures from memory, the days counted again by hand.
    [Fact]
    public void Of_bond_is_what_a_textbook_counts()
    {
        var (date, maturity) = (new DateOnly(2018, 7, 3), new DateOnly(2024, 9, 1));
        Assert.Equal(2.6957, AccruedInterest.Of(Bond(0.08, DayCount.ActualActual, maturity), date), 5e-5);
        Assert.Equal(2.7111, AccruedInterest.Of(Bond(0.08, DayCount.Thirty360, maturity), date), 5e-5);
        Assert.Equal(5.5 * 54 / 181, AccruedInterest.Of(Bond(0.11, DayCount.ActualActual, new(2025, 7, 10)), new(2018, 3, 5)), 1e-14);
        Assert.Equal(8 * 124 / 365.0, AccruedInterest.Of(Bond(0.08, DayCount.Actual365Fixed, maturity), date), 1e-14);
        Assert.Equal(8 * 124 / 360.0, AccruedInterest.Of(Bond(0.08, DayCount.Actual360, maturity), date), 1e-14);
    }

    // The same book's puzzle of 28 February to 1 March, of a year without a leap day: one day of a Treasury bond, three of a corporate one.
    [Fact]
    public void Of_bond_over_the_end_of_February_earns_three_days_where_months_have_thirty()
    {
        var maturity = new DateOnly(2024, 9, 1);
        double Earned(DayCount dayCount) => AccruedInterest.Of(Bond(0.08, dayCount, maturity), new(2018, 2, 28));
        Assert.Equal(4 * (1 - (180 / 181.0)), 4 - Earned(DayCount.ActualActual), 1e-14);
        Assert.Equal(4 * (3 / 180.0), 4 - Earned(DayCount.Thirty360), 1e-14);
    }

    [Theory]
    [InlineData(2014, 8, 31)]
    [InlineData(2014, 9, 1)]
    [InlineData(2020, 3, 1)]
    [InlineData(2024, 9, 1)]
    [InlineData(2030, 1, 1)]
    public void Of_bond_on_a_coupon_date_or_outside_its_life_is_nothing(int year, int month, int day) =>
        Assert.Equal(0, AccruedInterest.Of(Bond(0.08, DayCount.ActualActual, new(2024, 9, 1)), new(year, month, day)));

    [Fact]
    public void Of_bond_without_coupons_is_nothing() =>
        Assert.Equal(0, AccruedInterest.Of(Bond(0, DayCount.ActualActual, new(2024, 9, 1)) with { Leg = new(0, 0, DayCount.ActualActual) }, new(2020, 3, 3)));

    [Fact]
    public void Of_floater_grows_at_the_last_fixing_and_the_spread()
    {
        Assert.Equal(1000 * 0.032 * 31 / 360, AccruedInterest.Of(Floater(0.03), new(2026, 5, 16)), 1e-13);
        Assert.Equal(double.NaN, AccruedInterest.Of(Floater(null), new(2026, 5, 16)));
        Assert.Equal(0, AccruedInterest.Of(Floater(null), new(2026, 1, 15)));
    }
}
