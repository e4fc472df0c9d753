using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Checks;
using static RiskWorker.Engine.Tests.Checks.FridaySnapshot;

namespace RiskWorker.Engine.Tests.Checks;

public sealed class DayChecksTests
{
    private static double[] With(double[] prices, params int[] missing)
    {
        foreach (var i in missing) prices[i] = double.NaN;
        return prices;
    }

    private static FridaySnapshot TwoFactors(double[] a, double[] b, string? calendarOfB = null) =>
        new FridaySnapshot().Factor("A").Prices("A", a).Factor("B", calendar: calendarOfB).Prices("B", b).Spot("A-UNIT", "A").Position("FIRM", "A-UNIT", 1);

    [Fact]
    public void Run_with_days_that_others_have_counts_them_by_factor()
    {
        var findings = FindingsOf.Feed(TwoFactors(With(Wave(80), 70), With(Wave(80), 75, 77)));

        Assert.StartsWith("3 prices are missing in the window where others of the same calendar have one (A 1 day, B 2 days)", findings.One(FindingCodes.DayMissing).Message, StringComparison.Ordinal);
        // Each of the three isolated gaps takes out two shocks; 75 and 77 share the one between them: days 70, 71, 75, 76, 77, 78.
        Assert.StartsWith("6 days are left out of the covariance because not every factor has a shock on them (B 4 days, A 2 days)", findings.One(FindingCodes.DaysDropped).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_a_day_that_nobody_has_finds_no_day_missing() =>
        FindingsOf.Feed(TwoFactors(With(Wave(80), 70), With(Wave(80), 70))).None(FindingCodes.DayMissing);

    [Fact]
    public void Run_with_days_before_a_factor_began_finds_no_day_missing() =>
        FindingsOf.Feed(TwoFactors(Wave(80), [.. Enumerable.Repeat(double.NaN, 10), .. Wave(70)])).None(FindingCodes.DayMissing);

    [Fact]
    public void Run_with_a_day_missing_before_the_window_finds_nothing() => Assert.Empty(FindingsOf.Feed(TwoFactors(Wave(80), With(Wave(80), 10))));

    [Fact]
    public void Run_with_a_holiday_of_one_calendar_finds_dropped_days_and_none_missing()
    {
        var findings = FindingsOf.Feed(TwoFactors(Wave(80), With(Wave(80), 70), "NYSE").Holiday("NYSE", Weekdays(Friday, 10)[0]));

        findings.None(FindingCodes.DayMissing);
        Assert.StartsWith("1 day is left out", findings.One(FindingCodes.DaysDropped).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_prices_on_closed_days_of_the_window_counts_them()
    {
        var builder = TwoFactors(Wave(80), Wave(80), "NYSE").Holiday("NYSE", Weekdays(Friday, 10)[0]).Price("A", Friday.AddDays(-6), 100);

        Assert.StartsWith("2 prices stand on days of the window when the calendar is closed (A 1 day, B 1 day)", FindingsOf.Feed(builder).One(FindingCodes.DayClosed).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_a_price_on_a_closed_day_before_the_window_says_nothing() =>
        FindingsOf.Feed(Sound().Price("A", Friday.AddDays(-200), 100)).None(FindingCodes.DayClosed);

    [Fact]
    public void Run_where_each_day_lacks_a_factor_blocks()
    {
        // Of four days A has a shock on the second and third, B on the fourth and first.
        var (a, b) = (Wave(399), Wave(399));
        for (var i = 0; i < 399; i++)
        {
            if (i % 4 == 3) a[i] = double.NaN;
            if (i % 4 == 1) b[i] = double.NaN;
        }
        var finding = FindingsOf.Feed(TwoFactors(a, b)).One(FindingCodes.DaysNone);

        Assert.Equal(FindingSeverity.Blocking, finding.Severity);
        Assert.Throws<CalibrationException>(() => Calibrator.Calibrate(TwoFactors(a, b).Build()));
    }

    [Fact]
    public void Run_with_calendars_full_of_holes_counts_days_as_the_calibration_does()
    {
        var (random, compared) = (new Random(20261127), 0);
        for (var trial = 0; trial < 50; trial++)
        {
            var builder = TwoFactors(Holes(random, 200), Holes(random, 200), "NYSE").Factor("C", proxy: "A", beta: 0.8)
                .Prices("C", Holes(random, 30)).Holiday("NYSE", Weekdays(Friday, 60)[random.Next(50)]).Holiday("NYSE", Weekdays(Friday, 60)[random.Next(50)]);
            var (snapshot, findings) = (builder.Build(), FindingsOf.Feed(builder));
            if (findings.Any(f => f.Severity == FindingSeverity.Blocking)) continue;

            var dropped = Calibrator.Calibrate(snapshot).DroppedDays.Count;
            Assert.StartsWith($"{dropped} day", findings.One(FindingCodes.DaysDropped).Message, StringComparison.Ordinal);
            compared++;
        }
        Assert.InRange(compared, 40, 50);
    }

    private static double[] Holes(Random random, int count)
    {
        var prices = Wave(count);
        for (var i = 0; i < count - 1; i++)
        {
            if (random.NextDouble() < 0.05) prices[i] = double.NaN;
        }
        return prices;
    }
}
