using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Runs;
using RiskWorker.Engine.Tests.Checks;
using static RiskWorker.Engine.Tests.Checks.FridaySnapshot;

namespace RiskWorker.Engine.Tests.Backtesting;

/// <summary>Exceptions of the model of record and of its challengers on a made-up series, counted by hand.</summary>
public sealed class ModelBacktestsTests
{
    private const int Days = 301;
    private static readonly Confidence s_99 = new(0.99m);

    // VaR: 100 of the record, 50 of 'low' from day 200 on. Losses: 60 on days 10, 250 and 251, 120 on day 270, 0 else.
    [Fact]
    public void Each_model_is_counted_against_its_own_var_over_both_windows()
    {
        var backtests = Backtests(Runs());
        Assert.Equal([("record", 250), ("record", 500), ("low", 250), ("low", 500)], backtests.Select(b => (b.Model, b.Window)));
        Assert.Equal([(250, 1), (300, 1), (100, 3), (100, 3)], backtests.Select(b => (b.Days, b.Exceptions)));
        Assert.Equal([BacktestZone.Green, BacktestZone.Green, null, null], backtests.Select(b => b.Zone));
        // One exception in 250 days at 99%: p of Kupiec's ratio as in the worked examples (0.278...).
        Assert.Equal(0.2780714900139528, backtests[0].Coverage!.PValue, 1e-12);
        // Three in 100.
        Assert.Equal(Coverage(3, 100), backtests[2].Coverage!.Statistic, 1e-10);
    }

    // The greater of the actual and the hypothetical count; a book without rows has no actual one.
    [Fact]
    public void Actual_profit_counts_where_it_has_more_exceptions()
    {
        var (builder, dates) = (Runs(), Weekdays(Friday, Days));
        for (var t = 1; t < Days; t++) builder.Profit(dates[t], "FIRM", t is 100 or 150 or 200 ? -101 : 0);
        var backtests = Backtests(builder);
        Assert.Equal([3, 3, 3, 3], backtests.Select(b => b.Exceptions));
    }

    // The challenger's evidence begins with its first VaR; a close without one after that is an exception.
    [Fact]
    public void Close_without_the_challengers_var_is_an_exception_of_its_own()
    {
        var backtests = Backtests(Runs(isChallenged: t => t is >= 200 and not 220));
        Assert.Equal(1, backtests[0].Exceptions);
        Assert.Equal(4, backtests[2].Exceptions);
        Assert.Equal(100, backtests[2].Days);
    }

    [Fact]
    public void Challenger_that_never_ran_has_no_day()
    {
        var low = Backtests(Runs(isChallenged: _ => false))[2];
        Assert.Equal((0, 0), (low.Days, low.Exceptions));
        Assert.Null(low.Coverage);
        Assert.Null(low.Conditional);
    }

    [Fact]
    public void Run_without_challengers_has_none() =>
        Assert.Empty(Backtests(Runs().Settings(s => s with { Challengers = [] })));

    private static double Coverage(int x, int n)
    {
        var share = (double)x / n;
        return -2 * ((x * Math.Log(0.01 / share)) + ((n - x) * Math.Log(0.99 / (1 - share))));
    }

    private static IReadOnlyList<ModelBacktest> Backtests(FridaySnapshot builder)
    {
        var results = new RunCalculator(builder.Build(), 1, null, CancellationToken.None).Calculate();
        Assert.NotEmpty(results.Nodes);
        return results.ModelBacktests;
    }

    private static FridaySnapshot Runs(Func<int, bool>? isChallenged = null)
    {
        var dates = Weekdays(Friday, Days);
        var builder = new FridaySnapshot().Factor("A").Prices("A", Wave(Days)).Spot("A-UNIT", "A").Position("FIRM", "A-UNIT", 1)
            .Previous(dates[^2], new Domain.Books.Position("FIRM", "A-UNIT", 0))
            .Settings(s => s with
            {
                Model = s.Model with { Name = "record" },
                Challengers = [new() { Name = "low", Window = 60 }],
                Measures = [new(MeasureKind.Var, s_99, new(1))],
                Simulation = new() { Scenarios = 1_000, Cap = 1_000 },
            });
        for (var t = 0; t < Days - 1; t++)
        {
            var loss = t switch { 10 or 250 or 251 => 60.0, 270 => 120, _ => 0 };
            builder.Run(new($"run-{t}", "", dates[t], EvidenceKind.Recorded, [new("FIRM", s_99, 100)], t == 0 ? null : dates[t - 1], t == 0 ? [] : [new("FIRM", -loss)])
            {
                Challengers = (isChallenged?.Invoke(t) ?? t >= 200) ? [new("low", "FIRM", s_99, 50)] : [],
            });
        }
        return builder;
    }
}
