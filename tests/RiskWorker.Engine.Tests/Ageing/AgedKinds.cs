using RiskWorker.Domain.Instruments;

namespace RiskWorker.Engine.Tests.Ageing;

/// <summary>One instrument of every kind with dates inside ten business days, and the same with none.</summary>
internal static class AgedKinds
{
    private static readonly RateTerm s_curve = RateTerm.From("EUR");

    public static VolatilityTerm Volatility { get; } = new(0.3, null);

    public static DateOnly Later { get; } = AgedMarket.AsOf.AddDays(120);

    public static Option Call(DateOnly expiry, double strike = 100, ExerciseStyle style = ExerciseStyle.European, RateTerm? curve = null, OptionRight right = OptionRight.Call, string name = "CALL") =>
        new(new("S", null), strike, expiry, right, style, Volatility, curve ?? RateTerm.Of(0.03), RateTerm.Of(0.01)) { Name = name, Currency = "EUR" };

    public static SingleBarrier Barrier(BarrierKind kind, double barrier, DateOnly expiry, Monitoring monitoring, double rebate = 0, DateOnly? issue = null, OptionRight right = OptionRight.Call, string name = "BARRIER") =>
        new(new("S", null), 100, expiry, right, Volatility, RateTerm.Of(0.03), RateTerm.Of(0.01), barrier, kind, rebate, monitoring, issue ?? AgedMarket.AsOf.AddDays(-30), null) { Name = name, Currency = "EUR" };

    public static Asian Asian(AverageKind average, DateOnly expiry, OptionRight right, double strike, params Fixing[] fixings) =>
        new(new("S", null), strike, expiry, right, Volatility, RateTerm.Of(0.03), RateTerm.Of(0.01), average, FixingSchedule.Of(fixings), null) { Name = "ASIAN", Currency = "EUR" };

    public static Lookback Lookback(double? strike, DateOnly expiry, OptionRight right, Monitoring monitoring, DateOnly? issue = null) =>
        new(new("S", null), strike, expiry, right, Volatility, RateTerm.Of(0.03), RateTerm.Of(0.01), monitoring, issue ?? AgedMarket.AsOf) { Name = "LOOKBACK", Currency = "EUR" };

    public static Bond Bond(DateOnly issue, DateOnly maturity, int frequency = 1, string name = "BOND") =>
        new(new(0.04, frequency, DayCount.Actual365Fixed), issue, maturity, s_curve, 100, null) { Name = name, Currency = "EUR" };

    public static Floater Floater(DateOnly issue, DateOnly maturity, int frequency, double spread = 0, double fixing = 0.025) =>
        new(new(s_curve, frequency, DayCount.Actual365Fixed, spread, fixing), issue, maturity, s_curve, 100, null) { Name = "FLOATER", Currency = "EUR" };

    /// <summary>The book.</summary>
    public static AgedMarket All() => new AgedMarket().Showing("S", 2, 5).Holding(
        new Spot("T") { Name = "SPOT", Currency = "EUR" },
        new Future("S") { Name = "FUTURE", Currency = "EUR", Multiplier = 10 },
        Call(AgedMarket.Close(4), style: ExerciseStyle.American),
        Call(Later, curve: s_curve, name: "LATER"),
        new Digital(new("S", null), 101, AgedMarket.Close(7), OptionRight.Put, Volatility, s_curve, null, DigitalPayoff.Cash, 20) { Name = "DIGITAL", Currency = "EUR" },
        Barrier(BarrierKind.DownOut, 95, Later, Monitoring.Daily, rebate: 3),
        Barrier(BarrierKind.UpIn, 104, AgedMarket.Close(8), Monitoring.Continuous, rebate: 1, name: "BARRIER-IN"),
        Asian(AverageKind.Geometric, Later, OptionRight.Call, 100, new(AgedMarket.Close(3), null), new(Later, null)),
        Lookback(null, AgedMarket.Close(6), OptionRight.Call, Monitoring.Daily),
        Bond(AgedMarket.Close(5).AddYears(-3), AgedMarket.Close(5).AddYears(2)),
        Floater(AgedMarket.Close(3).AddYears(-1), AgedMarket.Close(3).AddYears(1), 2, spread: 0.001));
}
