using MathNet.Numerics.Distributions;
using RiskWorker.Domain.Instruments;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Ageing;

/// <summary>
/// Barriers, averages and extremes inside a horizon, scenario by scenario against the same instrument bound on the later date with the scenario's closes
/// as its past; and parities that hold whatever the path.
/// </summary>
public sealed class AgedPathTests
{
    private const int Horizon = 10;
    private static readonly DateOnly s_end = AgedMarket.Close(Horizon);
    private static readonly int[] s_days = [.. Enumerable.Range(1, Horizon)];

    public static TheoryData<BarrierKind, double, bool> Barriers => new()
    {
        { BarrierKind.DownOut, 96, false }, { BarrierKind.DownIn, 96, false }, { BarrierKind.UpOut, 104, false }, { BarrierKind.UpIn, 104, false },
        { BarrierKind.DownOut, 96, true }, { BarrierKind.DownIn, 96, true }, { BarrierKind.UpOut, 104, true }, { BarrierKind.UpIn, 104, true },
    };

    [Theory]
    [MemberData(nameof(Barriers))]
    public void Barrier_looked_at_daily_is_worth_what_its_closes_have_made_of_it(BarrierKind kind, double barrier, bool expiresInside)
    {
        var (expiry, isUp, isIn, rebate) = (expiresInside ? AgedMarket.Close(7) : AgedKinds.Later, kind is BarrierKind.UpIn or BarrierKind.UpOut, kind is BarrierKind.DownIn or BarrierKind.UpIn, 2.5);
        var option = AgedKinds.Barrier(kind, barrier, expiry, Monitoring.Daily, rebate);
        var plain = AgedKinds.Call(expiry);
        var (book, losses, levels) = Run(option, 300);
        var (last, hits) = (expiresInside ? 7 : Horizon, 0);
        for (var i = 0; i < 300; i++)
        {
            var isHit = s_days.Take(last).Any(d => isUp ? levels[d - 1][i] >= barrier : levels[d - 1][i] <= barrier);
            hits += isHit ? 1 : 0;
            var at = levels[last - 1][i];
            var untouched = !expiresInside ? Alive(at) : isIn ? rebate : Plain(at);
            var worth = !isHit ? untouched : isIn ? Plain(at) : rebate;
            Assert.Equal(Rebound.Value(option, AgedMarket.AsOf, AgedMarket.S0) - worth, losses[book.RowOf("BARRIER", Horizon)][i], 1e-10);
        }
        Assert.InRange(hits, 30, 270);

        double Alive(double at) => Rebound.Value(option with { Issue = s_end }, s_end, at);
        double Plain(double at) => Rebound.Value(plain, expiresInside ? expiry : s_end, at);
    }

    // Knocked in and knocked out make the plain option, wherever and however the barrier is looked at.
    [Theory]
    [InlineData(BarrierKind.DownIn, BarrierKind.DownOut, 97, Monitoring.Daily, 6)]
    [InlineData(BarrierKind.UpIn, BarrierKind.UpOut, 105, Monitoring.Continuous, 9)]
    [InlineData(BarrierKind.DownIn, BarrierKind.DownOut, 97, Monitoring.Continuous, 80)]
    public void In_and_out_make_the_plain_option(BarrierKind enters, BarrierKind leaves, double barrier, Monitoring monitoring, int day)
    {
        var expiry = AgedMarket.Close(day);
        var book = new AgedMarket().Holding(AgedKinds.Barrier(enters, barrier, expiry, monitoring, name: "IN"), AgedKinds.Barrier(leaves, barrier, expiry, monitoring, name: "OUT"), AgedKinds.Call(expiry)).Compile(Horizon);
        var losses = book.Losses(1_000);
        for (var i = 0; i < 1_000; i++)
            Assert.Equal(losses[book.RowOf("CALL", Horizon)][i], losses[book.RowOf("IN", Horizon)][i] + losses[book.RowOf("OUT", Horizon)][i], 1e-10);
    }

    // P(min of a Brownian motion with drift m over T <= b) = N((b - mT)/(s√T)) + e^(2mb/s²) N((b + mT)/(s√T)): the reflection principle, worked
    // here. One day has no close inside: all that crosses and comes back does so between two closes.
    [Theory]
    [InlineData(BarrierKind.DownOut, 98, 1)]
    [InlineData(BarrierKind.UpOut, 104, 1)]
    [InlineData(BarrierKind.DownOut, 96, 10)]
    [InlineData(BarrierKind.DownOut, 92, 10)]
    [InlineData(BarrierKind.UpOut, 105, 10)]
    public void Barrier_looked_at_every_moment_is_crossed_as_often_as_a_path_crosses_it(BarrierKind kind, double barrier, int days)
    {
        const int N = 100_000;
        const double Rebate = 1_000;
        var option = AgedKinds.Barrier(kind, barrier, AgedKinds.Later, Monitoring.Continuous, Rebate);
        var book = new AgedMarket().Holding(option).Compile(days);
        var knocked = Rebound.Value(option, AgedMarket.AsOf, AgedMarket.S0) - Rebate;
        var found = book.Losses(N)[book.RowOf("BARRIER", days)].Count(loss => Math.Abs(loss - knocked) < 1e-9) / (double)N;
        var side = kind == BarrierKind.DownOut ? 1 : -1;
        var (m, s, root) = (side * -AgedMarket.Sigma * AgedMarket.Sigma / 2, AgedMarket.Sigma, Math.Sqrt(days));
        var b = side * Math.Log(barrier / AgedMarket.S0);
        var expected = Normal.CDF(0, 1, (b - (m * days)) / (s * root)) + (Math.Exp(2 * m * b / (s * s)) * Normal.CDF(0, 1, (b + (m * days)) / (s * root)));
        Assert.InRange((found - expected) / Math.Sqrt(expected * (1 - expected) / N), -4, 4);
    }

    // Issued on the horizon's own day, it has one close to look at and no moment before it.
    [Fact]
    public void Barrier_looked_at_every_moment_counts_no_moment_before_its_issue()
    {
        var option = AgedKinds.Barrier(BarrierKind.DownOut, 97, AgedKinds.Later, Monitoring.Continuous, rebate: 1_000, issue: s_end);
        var (book, losses, levels) = Run(option, 300);
        for (var i = 0; i < 300; i++)
            Assert.Equal(levels[^1][i] <= 97, Math.Abs(losses[book.RowOf("BARRIER", Horizon)][i] - Rebound.Value(option, AgedMarket.AsOf, 100) + 1_000) < 1e-9);
    }

    [Fact]
    public void Barrier_touched_at_todays_close_pays_its_rebate_once()
    {
        var option = AgedKinds.Barrier(BarrierKind.DownOut, AgedMarket.S0, AgedKinds.Later, Monitoring.Daily, rebate: 4, issue: AgedMarket.AsOf);
        var book = new AgedMarket().Holding(option).Compile(Horizon);
        Assert.All(book.Losses(50)[book.RowOf("BARRIER", Horizon)], loss => Assert.Equal(0, loss, 1e-12));
    }

    [Fact]
    public void Barrier_issued_inside_is_looked_at_from_its_issue_on()
    {
        var option = AgedKinds.Barrier(BarrierKind.DownOut, 97, AgedKinds.Later, Monitoring.Daily, rebate: 1_000, issue: AgedMarket.Close(6));
        var (book, losses, levels) = Run(option, 300);
        for (var i = 0; i < 300; i++)
        {
            var isHit = Enumerable.Range(6, 5).Any(d => levels[d - 1][i] <= 97);
            Assert.Equal(isHit, Math.Abs(losses[book.RowOf("BARRIER", Horizon)][i] - Rebound.Value(option, AgedMarket.AsOf, 100) + 1_000) < 1e-9);
        }
    }

    public static TheoryData<AverageKind, OptionRight, double, int[]> Averages => new()
    {
        { AverageKind.Geometric, OptionRight.Call, 100, [-3, 2, 6, 14, 30] },
        { AverageKind.Geometric, OptionRight.Put, 101, [3, 9] },
        { AverageKind.Arithmetic, OptionRight.Call, 100, [-3, 2, 6, 9] },
        { AverageKind.Arithmetic, OptionRight.Call, 100, [2, 6, 14, 30] },
        { AverageKind.Arithmetic, OptionRight.Put, 103, [-3, 10, 12, 20] },
        { AverageKind.Arithmetic, OptionRight.Call, 60, [-3, 1, 2, 3, 4, 5, 6, 20] }, // what is fixed exceeds the strike: sure to be exercised
    };

    [Theory]
    [MemberData(nameof(Averages))]
    public void Average_of_closes_inside_is_worth_what_it_is_worth_with_these_fixed(AverageKind average, OptionRight right, double strike, int[] days)
    {
        Fixing[] fixings = [.. days.Select(d => d < 0 ? new Fixing(AgedMarket.AsOf.AddDays(d), 98.5) : new(AgedMarket.Close(d), null))];
        var option = AgedKinds.Asian(average, AgedMarket.Close(days[^1] == 9 ? 9 : days[^1] + 2), right, strike, fixings);
        var (book, losses, levels) = Run(option, 20);
        var date = option.Expiry < s_end ? option.Expiry : s_end;
        for (var i = 0; i < 20; i++)
        {
            double[] closes = [.. levels.Select(l => l[i])];
            var known = option with { Fixings = FixingSchedule.Of([.. days.Select((d, j) => d is > 0 and <= Horizon ? fixings[j] with { Value = closes[d - 1] } : fixings[j])]) };
            var worth = Rebound.Value(known, date, closes[(date == s_end ? Horizon : days[^1]) - 1]);
            // Tables of simulated prices are good to 1e-7 of the level or half a standard error; both sides walk the same paths.
            Assert.Equal(Rebound.Value(option, AgedMarket.AsOf, AgedMarket.S0) - worth, losses[book.RowOf("ASIAN", Horizon)][i], average == AverageKind.Arithmetic && days[^1] > Horizon ? 2e-4 : 1e-10);
        }
    }

    public static TheoryData<bool, OptionRight, double> Lookbacks => new()
    {
        { false, OptionRight.Call, 0 }, { false, OptionRight.Put, 0 }, { false, OptionRight.Call, 102 }, { false, OptionRight.Put, 98 },
        { true, OptionRight.Call, 0 }, { true, OptionRight.Put, 0 }, { true, OptionRight.Call, 102 }, { true, OptionRight.Put, 98 },
    };

    [Theory]
    [MemberData(nameof(Lookbacks))]
    public void Extreme_of_closes_inside_is_worth_what_it_is_worth_with_these_past(bool expiresInside, OptionRight right, double strike)
    {
        var option = AgedKinds.Lookback(strike == 0 ? null : strike, expiresInside ? AgedMarket.Close(8) : AgedMarket.Close(40), right, Monitoring.Daily);
        var (book, losses, levels) = Run(option, 20);
        var (date, last) = expiresInside ? (option.Expiry, 8) : (s_end, Horizon);
        for (var i = 0; i < 20; i++)
        {
            double[] closes = [.. levels.Take(last).Select(l => l[i])];
            Assert.Equal(Rebound.Value(option, AgedMarket.AsOf, AgedMarket.S0) - Rebound.Value(option, date, closes[^1], closes: closes), losses[book.RowOf("LOOKBACK", Horizon)][i], expiresInside ? 1e-10 : 1e-3);
        }
    }

    // The highest point of a driftless Brownian motion over T is the size of a normal: s√(2T/π) on average, with the variance s²T(1 - 2/π).
    [Fact]
    public void Extreme_of_every_moment_reaches_as_far_as_a_path_does()
    {
        const int N = 50_000;
        var option = AgedKinds.Lookback(1, s_end, OptionRight.Call, Monitoring.Continuous);
        var book = new AgedMarket { Drift = 252 * AgedMarket.Sigma * AgedMarket.Sigma / 2 }.Holding(option).Compile(Horizon);
        var premium = Rebound.Value(option, AgedMarket.AsOf, AgedMarket.S0);
        double[] reached = [.. book.Losses(N)[book.RowOf("LOOKBACK", Horizon)].Select(loss => Math.Log((premium - loss + 1) / AgedMarket.S0))];
        var expected = AgedMarket.Sigma * Math.Sqrt(2 * Horizon / Math.PI);
        Assert.InRange((reached.Average() - expected) / (AgedMarket.Sigma * Math.Sqrt(Horizon * (1 - (2 / Math.PI)) / N)), -4, 4);
    }

    // The trapezoid of a continuous average is not followed inside: it keeps today's date, and says so (AgeingChecksTests).
    [Fact]
    public void Continuous_average_keeps_the_valuation_date_of_today()
    {
        var option = new Asian(new("S", null), 100, AgedKinds.Later, OptionRight.Call, AgedKinds.Volatility, RateTerm.Of(0.03), null, AverageKind.Geometric, FixingSchedule.Continuous, AgedMarket.AsOf) { Name = "ASIAN", Currency = "EUR" };
        var book = new AgedMarket().Holding(option).Compile(Horizon);
        var still = new AgedMarket { Ageing = RiskWorker.Domain.Runs.AgeingKind.None }.Holding(option).Compile(Horizon);
        RiskWorker.TestKit.BitAssert.Equal(still.Losses(200)[still.RowOf("ASIAN", Horizon)], book.Losses(200)[book.RowOf("ASIAN", Horizon)]);
    }

    private static (CompiledBook Book, double[][] Losses, double[][] Levels) Run(Instrument option, int scenarios)
    {
        var book = new AgedMarket().Holding(option).Showing("S", s_days).Compile(Horizon);
        var losses = book.Losses(scenarios);
        return (book, losses, [.. s_days.Select(d => AgedMarket.Levels(book, losses, "S", d, Horizon))]);
    }
}
