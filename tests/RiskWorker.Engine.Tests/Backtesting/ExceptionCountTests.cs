using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting;
using RiskWorker.Engine.Tests.Checks;
using static RiskWorker.Engine.Tests.Checks.FridaySnapshot;

namespace RiskWorker.Engine.Tests.Backtesting;

public sealed class ExceptionCountTests
{
    private static readonly Confidence s_99 = new(0.99m);
    private static readonly Confidence s_95 = new(0.95m);
    private static readonly MeasureSpec[] s_measures =
        [new(MeasureKind.Var, s_99, new(1)), new(MeasureKind.Es, s_95, new(1)), new(MeasureKind.Var, s_95, new(10))];

    /// <summary>One factor on <paramref name="days"/> weekdays, a VaR of 100 of FIRM recorded on each but the last.</summary>
    private static FridaySnapshot Runs(int days, Func<int, double>? hypothetical = null, Func<int, bool>? isRun = null)
    {
        var builder = new FridaySnapshot().Factor("A").Prices("A", Wave(days));
        var dates = Weekdays(Friday, days);
        for (var i = 0; i < days - 1; i++)
        {
            if (isRun?.Invoke(i) == false) continue;
            builder.Run(Run(dates[i], 100, i == 0 ? null : dates[i - 1], hypothetical?.Invoke(i) ?? 0));
        }
        return builder;
    }

    private static CountedRun Run(DateOnly asOf, double var, DateOnly? from, double hypothetical, EvidenceKind evidence = EvidenceKind.Recorded) =>
        new($"run-{asOf:yyyyMMdd}", "", asOf, evidence, [new("FIRM", s_99, var)], from, from is null ? [] : [new("FIRM", hypothetical)]);

    private static HypotheticalProfit Today(double amount, int daysBack = 1) => new(Weekdays(Friday, daysBack + 1)[0], Friday, [new("FIRM", amount)]);

    private static BacktestResult Count(FridaySnapshot builder, HypotheticalProfit? today) => Assert.Single(All(builder, s_measures, today));

    private static IReadOnlyList<BacktestResult> All(FridaySnapshot builder, IEnumerable<MeasureSpec> measures, HypotheticalProfit? today)
    {
        var snapshot = builder.Build();
        return ExceptionCount.Of(snapshot, BookTree.Build(snapshot.Books).Tree!, measures, today);
    }

    [Fact]
    public void Of_losses_at_the_var_counts_none_and_beyond_it_each()
    {
        var result = Count(Runs(6, i => i switch { 1 => -100, 2 => -100.000001, 3 => 100, 4 => -99, _ => 0 }), Today(-250));

        Assert.Equal(("FIRM", s_99, "EUR", 5), (result.Book, result.Confidence, result.Currency, result.Days));
        Assert.Equal([-100, -100.000001, 100, -99, -250], result.Series.Select(d => d.Hypothetical));
        Assert.Equal([100, 100, 100, 100, 100], result.Series.Select(d => d.Var));
        Assert.Equal((2, 0, 0), (result.Hypothetical, result.MissingVar, result.Backfilled));
        Assert.Equal(Weekdays(Friday, 5), result.Series.Select(d => d.Date));
        Assert.Null(result.Zone);
    }

    [Fact]
    public void Of_a_book_without_any_row_has_no_actual_count()
    {
        var result = Count(Runs(6), Today(0));

        Assert.Null(result.Actual);
        Assert.Equal(0, result.Exceptions);
    }

    [Fact]
    public void Of_a_book_with_rows_counts_losses_beyond_the_var_and_missing_days()
    {
        var dates = Weekdays(Friday, 6);
        var result = Count(Runs(6).Profit(dates[1], "FIRM", -100).Profit(dates[2], "FIRM", -101).Profit(dates[4], "FIRM", 3).Profit(dates[5], "FIRM", 5), Today(0));

        // The fourth day has no row.
        Assert.Equal((2, 0, 2), (result.Actual, result.Hypothetical, result.Exceptions));
        Assert.Equal([-100, -101, null, 3, 5], result.Series.Select(d => d.Actual));
    }

    [Fact]
    public void Of_a_day_without_a_run_at_the_close_before_is_an_exception_of_both_kinds()
    {
        var builder = Runs(6, isRun: i => i != 2);
        foreach (var date in Weekdays(Friday, 6)) builder.Profit(date, "FIRM", 0);
        var result = Count(builder, Today(0));

        // Without the run of day 2 there is neither a VaR for day 3 nor a hypothetical profit of day 2.
        Assert.Equal((1, 1, 2), (result.MissingVar, result.Actual, result.Hypothetical));
        Assert.Equal([100, 100, null, 100, 100], result.Series.Select(d => d.Var));
        Assert.Equal([EvidenceKind.Recorded, EvidenceKind.Recorded, null, EvidenceKind.Recorded, EvidenceKind.Recorded], result.Series.Select(d => d.Evidence));
    }

    [Fact]
    public void Of_days_before_the_first_run_are_not_counted()
    {
        var result = Count(Runs(6, isRun: i => i >= 3), Today(0));

        Assert.Equal((2, 0), (result.Days, result.MissingVar));
    }

    [Fact]
    public void Of_no_stored_run_counts_no_day()
    {
        var result = Count(Runs(6, isRun: _ => false), Today(-1000));

        Assert.Equal((0, 0, 0), (result.Days, result.Hypothetical, result.MissingVar));
        Assert.Null(result.Zone);
    }

    [Fact]
    public void Of_a_book_that_came_later_counts_from_its_own_first_var()
    {
        var dates = Weekdays(Friday, 4);
        var builder = new FridaySnapshot().Book("FIRM", null).Book("NEW", "FIRM").Factor("A").Prices("A", Wave(4))
            .Run(new("r1", "", dates[0], EvidenceKind.Recorded, [new("FIRM", s_99, 1)], null, []))
            .Run(new("r2", "", dates[1], EvidenceKind.Recorded, [new("FIRM", s_99, 1)], null, []))
            .Run(new("r3", "", dates[2], EvidenceKind.Recorded, [new("FIRM", s_99, 1), new("NEW", s_99, 1)], null, []));

        Assert.Equal([("FIRM", 3), ("NEW", 1)], All(builder, s_measures, null).Select(r => (r.Book, r.Days)));
    }

    [Fact]
    public void Of_more_than_250_days_counts_the_newest_250()
    {
        var result = Count(Runs(300, i => i is 49 or 50 ? -101 : 0), Today(0));

        // 300 days: the counted ones are those of index 50 to 299.
        Assert.Equal((250, 1), (result.Days, result.Hypothetical));
        Assert.Equal(Weekdays(Friday, 250)[0], result.Series[0].Date);
        Assert.Equal(BacktestZone.Green, result.Zone);
    }

    [Theory]
    [InlineData(4, BacktestZone.Green)]
    [InlineData(5, BacktestZone.Yellow)]
    [InlineData(9, BacktestZone.Yellow)]
    [InlineData(10, BacktestZone.Red)]
    public void Of_250_days_falls_into_the_published_zone(int exceptions, BacktestZone zone)
    {
        var result = Count(Runs(251, i => i <= exceptions ? -101 : 0), Today(0));

        Assert.Equal((250, exceptions, zone), (result.Days, result.Exceptions, result.Zone!.Value));
    }

    [Fact]
    public void Of_the_two_counts_the_greater_sets_the_zone()
    {
        var builder = Runs(251, i => i <= 3 ? -101 : 0);
        var dates = Weekdays(Friday, 251);
        for (var i = 1; i < dates.Length; i++) builder.Profit(dates[i], "FIRM", i <= 5 ? -101 : 0);
        var result = Count(builder, Today(0));

        Assert.Equal((5, 3, 5), (result.Actual, result.Hypothetical, result.Exceptions));
        Assert.Equal(BacktestZone.Yellow, result.Zone);
    }

    [Theory]
    [InlineData(125, null)]
    [InlineData(126, BacktestZone.Green)]
    public void Of_fewer_than_125_days_has_no_zone(int observed, BacktestZone? zone) => Assert.Equal(zone, Count(Runs(observed), Today(0)).Zone);

    [Fact]
    public void Of_a_hypothetical_profit_over_more_than_a_day_is_missing()
    {
        Assert.Equal(1, Count(Runs(6), Today(0, daysBack: 2)).Hypothetical);
        Assert.Equal(1, Count(Runs(6), null).Hypothetical);

        var dates = Weekdays(Friday, 3);
        var builder = new FridaySnapshot().Factor("A").Prices("A", Wave(3)).Run(Run(dates[0], 100, null, 0)).Run(Run(dates[1], 100, dates[0].AddDays(-1), 0));
        Assert.Null(Count(builder, Today(0)).Series[0].Hypothetical);
    }

    [Fact]
    public void Of_earlier_positions_computes_what_no_run_holds()
    {
        // Prices 100, 101, 100, 101; the second run has no hypothetical profit, the positions of the first close are kept.
        var dates = Weekdays(Friday, 4);
        var builder = new FridaySnapshot().Factor("A").Prices("A", Wave(4)).Spot("A-UNIT", "A")
            .Run(Run(dates[0], 100, null, 0)).Run(Run(dates[1], 100, null, 0)).Run(Run(dates[2], 100, dates[1], 7))
            .Earlier(dates[0], new Position("FIRM", "A-UNIT", 500)).Earlier(dates[1], new Position("FIRM", "A-UNIT", 1));

        Assert.Equal([500, 7, -3], Count(builder, Today(-3)).Series.Select(d => d.Hypothetical));
    }

    [Fact]
    public void Of_days_skips_weekends_and_days_that_nobody_observed()
    {
        // Observed on Monday, Tuesday, Thursday, Friday, and on the Saturday before; Thursday's VaR is that of Tuesday.
        var dates = Weekdays(Friday, 5);
        var builder = new FridaySnapshot().Factor("A").Prices("A", 1, 2, double.NaN, 3, 4).Price("A", dates[0].AddDays(-2), 1)
            .Price("GHOST", dates[2], 1).Run(Run(dates[0], 10, null, 0)).Run(Run(dates[1], 20, dates[0], 0)).Run(Run(dates[3], 30, dates[1], 0));

        var series = Count(builder, Today(0)).Series;
        Assert.Equal([dates[1], dates[3], dates[4]], series.Select(d => d.Date));
        Assert.Equal([10, 20, 30], series.Select(d => d.Var));
        Assert.Equal([0, 0, 0], series.Select(d => d.Hypothetical));
    }

    [Fact]
    public void Of_backfilled_runs_counts_their_days()
    {
        var dates = Weekdays(Friday, 3);
        var builder = new FridaySnapshot().Factor("A").Prices("A", Wave(3))
            .Run(Run(dates[0], 100, null, 0, EvidenceKind.Backfilled)).Run(Run(dates[1], 100, dates[0], 0));

        Assert.Equal(1, Count(builder, Today(0)).Backfilled);
    }

    [Fact]
    public void Of_measures_gives_each_node_each_one_day_var_in_order()
    {
        var builder = new FridaySnapshot().Book("FIRM", null).Book("X", "FIRM").Factor("A").Prices("A", Wave(3));
        var results = All(builder, [.. s_measures, new(MeasureKind.Var, s_95, new(1)), new(MeasureKind.Var, s_99, new(1))], null);

        Assert.Equal([("FIRM", s_95), ("FIRM", s_99), ("X", s_95), ("X", s_99)], results.Select(r => (r.Book, r.Confidence)));
    }
}
