using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Checks;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Runs;
using RiskWorker.Engine.Tests.Checks;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Pricing;

/// <summary>Options that look back: what of their past is known, and what that makes of them. The share fell to 88 fourteen days ago and is at 100.</summary>
public sealed class OptionBinderTests
{
    private static readonly Snapshot s_snapshot = WideBook.Whole().Build();
    private static readonly double[] s_levels = Calibrator.Calibrate(s_snapshot).Levels;
    private static readonly InstrumentBinder s_binder = new("EUR", s_snapshot.Factors, new ClosingLevels(s_snapshot));

    private static T Named<T>(string name) where T : Instrument => (T)s_snapshot.Instruments[name];

    private static BoundInstrument Bound(Instrument instrument, InstrumentBinder? binder = null)
    {
        Assert.Null((binder ?? s_binder).Bind(instrument, WideBook.AsOf, out var bound));
        return bound!;
    }

    private static double ValueOf(Instrument instrument) => Bound(instrument).Value(s_levels);

    private static Option PlainOf(SingleBarrier b) => new(b.Underlying, b.Strike, b.Expiry, b.Right, ExerciseStyle.European, b.Volatility, b.Curve, b.Carry) { Name = "plain", Currency = b.Currency };

    [Fact]
    public void Barrier_crossed_since_the_issue_makes_a_knock_in_plain_and_a_knock_out_worthless()
    {
        var knocked = Named<SingleBarrier>("KNOCKED");
        Assert.Equal(ValueOf(PlainOf(knocked)), ValueOf(knocked), 1e-12);
        Assert.Equal(0, ValueOf(knocked with { BarrierKind = BarrierKind.DownOut, Rebate = 5 })); // the rebate was paid then
        Assert.StartsWith("its barrier 89 was crossed on 2026-11-13", Bound(knocked).CrossedBarrier, StringComparison.Ordinal);
    }

    [Fact]
    public void Barrier_crossed_before_the_issue_or_only_in_the_feeds_words_counts_as_the_terms_say()
    {
        var later = Named<SingleBarrier>("KNOCKED") with { Issue = WideBook.AsOf.AddDays(-3) };
        Assert.Null(Bound(later).CrossedBarrier);
        Assert.InRange(ValueOf(later), 0, 0.99 * ValueOf(PlainOf(later)));
        Assert.NotNull(Bound(later with { Knocked = WideBook.AsOf.AddDays(-1) }).CrossedBarrier);
        Assert.Null(Bound(later with { Knocked = WideBook.AsOf.AddDays(1) }).CrossedBarrier);
    }

    // Touched by today's close itself: the rebate is due now.
    [Fact]
    public void Barrier_reached_today_pays_its_rebate()
    {
        var out100 = Named<SingleBarrier>("DOWN-OUT") with { Barrier = 100, Rebate = 3, Issue = WideBook.AsOf };
        Assert.Equal(3, ValueOf(out100), 1e-12);
        Assert.Null(Bound(out100).CrossedBarrier);
    }

    [Fact]
    public void Fixing_of_the_past_comes_from_the_terms_or_else_from_the_observations()
    {
        var asian = Named<Asian>("GEOMETRIC");
        var observed = new ClosingLevels(s_snapshot).On(UnderlyingKey.Of(s_snapshot.Factors.ToList().FindIndex(f => f.Name == "ACME")), WideBook.AsOf.AddDays(-7), WideBook.AsOf);
        var given = asian with { Fixings = FixingSchedule.Of([.. asian.Fixings.Fixings.Select(f => f.Date == WideBook.AsOf.AddDays(-7) ? new Fixing(f.Date, observed) : f)]) };
        Assert.Equal(ValueOf(given), ValueOf(asian), 1e-13);
        Assert.True(ValueOf(given with { Fixings = FixingSchedule.Of([.. given.Fixings.Fixings.Select((f, i) => i == 0 ? f with { Value = 140 } : f)]) }) > ValueOf(given));
    }

    [Fact]
    public void Fixing_known_from_nowhere_is_named_with_its_date()
    {
        var asian = Named<Asian>("ARITHMETIC") with { Fixings = FixingSchedule.Of([new(WideBook.AsOf.AddDays(-300), null), new(WideBook.AsOf.AddDays(30), null)]) };
        var unpriced = s_binder.Bind(asian, WideBook.AsOf, out _)!;
        Assert.Equal(UnpricedReason.MissingFixing, unpriced.Reason);
        Assert.Contains("its fixing of 2026-01-31 is missing", unpriced.Clause, StringComparison.Ordinal);
    }

    [Fact]
    public void Option_that_looks_back_on_nothing_is_not_priced_as_if_it_began_today()
    {
        var blind = new InstrumentBinder("EUR", s_snapshot.Factors);
        Assert.Equal(UnpricedReason.MissingFixing, blind.Bind(Named<Lookback>("LOOKBACK"), WideBook.AsOf, out _)!.Reason);
        Assert.Equal(UnpricedReason.MissingFixing, blind.Bind(Named<Asian>("GEOMETRIC-CONTINUOUS"), WideBook.AsOf, out _)!.Reason);
    }

    [Fact]
    public void Lookback_on_its_last_day_pays_from_the_extreme_of_the_closes()
    {
        var put = Named<Lookback>("LOOKBACK") with { Expiry = WideBook.AsOf };
        Assert.Equal(0, ValueOf(put)); // highest close 100, at 100
        Assert.Equal(100 - Lowest(), ValueOf(put with { Right = OptionRight.Call }), 1e-12);
        Assert.Equal(95 - Lowest(), ValueOf(put with { Strike = 95 }), 1e-12);

        static double Lowest() => s_snapshot.Observations.Column(s_snapshot.Observations.ColumnOf("ACME")).ToArray().Where(x => x > 0).TakeLast(16).Min();
    }

    [Fact]
    public void Average_without_fixings_to_come_is_worth_its_discounted_payoff()
    {
        var asian = Named<Asian>("ARITHMETIC") with { Fixings = FixingSchedule.Of([new(WideBook.AsOf.AddDays(-9), 104), new(WideBook.AsOf.AddDays(-2), 110)]) };
        Assert.Equal((107 - 99) * Math.Exp(-0.02 * 60 / 365), ValueOf(asian), 1e-12);
    }

    [Fact]
    public void Crossed_barrier_is_a_finding_that_names_it()
    {
        var snapshot = WideBook.Holding(new Position("HOME", "KNOCKED", 2), new("HOME", "SHARE", 1)).Build();
        var results = new RunCalculator(snapshot with { Settings = snapshot.Settings with { Checks = new() { MinimumHistory = 1 }, Simulation = new() { Scenarios = 1_000, Looks = 1, Cap = 1_000 } } }, 1, null, CancellationToken.None).Calculate();
        Assert.Contains("KNOCKED: its barrier 89 was crossed on 2026-11-13", results.Findings.One(FindingCodes.BarrierCrossed).Message, StringComparison.Ordinal);
    }
}
