using System.Globalization;
using RiskWorker.Domain.Instruments;
using RiskWorker.TestKit;

namespace RiskWorker.Domain.Tests.Instruments;

public sealed class YearFractionTests
{
    private static DateOnly Date(string text) => DateOnly.ParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture);

    // The periods of ISDA's memorandum "The Actual/Actual Day Count Fraction" (1999), ISDA method; periods from memory, the
    // fractions (days of common years over 365, of leap years over 366) counted by hand.
    [Theory]
    [InlineData("2003-11-01", "2004-05-01", (61 / 365.0) + (121 / 366.0))]
    [InlineData("1999-02-01", "1999-07-01", 150 / 365.0)]
    [InlineData("1999-07-01", "2000-07-01", (184 / 365.0) + (182 / 366.0))]
    [InlineData("2002-08-15", "2003-07-15", 334 / 365.0)]
    [InlineData("2003-07-15", "2004-01-15", (170 / 365.0) + (14 / 366.0))]
    [InlineData("1999-07-30", "2000-01-30", (155 / 365.0) + (29 / 366.0))]
    [InlineData("2000-01-30", "2000-06-30", 152 / 366.0)]
    [InlineData("1999-11-30", "2000-04-30", (32 / 365.0) + (120 / 366.0))]
    public void Of_actual_over_actual_splits_by_year(string from, string to, double fraction) =>
        Assert.Equal(fraction, YearFraction.Of(DayCount.ActualActual, Date(from), Date(to)), 1e-16);

    // 2006 ISDA Definitions, section 4.16(f); the days are counted by hand from its formula: February is as it stands, a last day of 31
    // is 30 only where the first is 30 or 31.
    [Theory]
    [InlineData("2007-01-15", "2007-01-30", 15)]
    [InlineData("2007-01-15", "2007-02-15", 30)]
    [InlineData("2007-01-15", "2007-01-31", 16)]
    [InlineData("2007-09-30", "2008-03-31", 180)]
    [InlineData("2007-09-30", "2007-10-31", 30)]
    [InlineData("2007-10-31", "2007-11-30", 30)]
    [InlineData("2007-10-31", "2007-12-31", 60)]
    [InlineData("2006-08-31", "2007-02-28", 178)]
    [InlineData("2007-02-28", "2007-08-31", 183)]
    [InlineData("2007-02-28", "2007-03-31", 33)]
    [InlineData("2008-02-29", "2009-02-28", 359)]
    [InlineData("2008-02-28", "2008-08-30", 182)]
    [InlineData("2008-02-29", "2008-03-01", 2)]
    [InlineData("2007-12-29", "2008-12-31", 362)]
    public void Of_thirty_over_360_follows_the_bond_basis(string from, string to, int days) =>
        Assert.Equal(days / 360.0, YearFraction.Of(DayCount.Thirty360, Date(from), Date(to)));

    [Fact]
    public void Of_actual_over_a_fixed_year_counts_days()
    {
        Assert.Equal(366 / 360.0, YearFraction.Of(DayCount.Actual360, new(2024, 1, 1), new(2025, 1, 1)));
        Assert.Equal(366 / 365.0, YearFraction.Of(DayCount.Actual365Fixed, new(2024, 1, 1), new(2025, 1, 1)));
        Assert.Equal(1.0, YearFraction.Of(DayCount.ActualActual, new(2024, 1, 1), new(2025, 1, 1)));
        Assert.Equal(29 / 365.0, YearFraction.Of(DayCount.Actual365Fixed, new(2024, 2, 1), new(2024, 3, 1)));
    }

    // The year split again, a day at a time.
    [Fact]
    public void Of_actual_over_actual_is_the_sum_of_its_days()
    {
        var numbers = new SeededNumbers(1);
        for (var trial = 0; trial < 100; trial++)
        {
            var from = new DateOnly(1999, 1, 1).AddDays((int)(numbers.Unit() * 2000));
            var to = from.AddDays((int)(numbers.Unit() * 1500));
            int leap = 0, common = 0;
            for (var day = from; day < to; day = day.AddDays(1)) _ = DateTime.IsLeapYear(day.Year) ? leap++ : common++;
            Assert.Equal((leap / 366.0) + (common / 365.0), YearFraction.Of(DayCount.ActualActual, from, to), 1e-14);
        }
    }

    [Theory]
    [InlineData(DayCount.Thirty360)]
    [InlineData(DayCount.Actual360)]
    [InlineData(DayCount.Actual365Fixed)]
    [InlineData(DayCount.ActualActual)]
    public void Of_no_time_is_zero_and_time_does_not_run_back(DayCount dayCount)
    {
        Assert.Equal(0, YearFraction.Of(dayCount, new(2024, 2, 29), new(2024, 2, 29)));
        Assert.Throws<ArgumentOutOfRangeException>(() => YearFraction.Of(dayCount, new(2024, 2, 29), new(2024, 2, 28)));
    }
}
