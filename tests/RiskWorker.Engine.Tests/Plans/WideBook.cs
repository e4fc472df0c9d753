using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Tests.Plans;

/// <summary>
/// A book with one of every kind that curves, formulas and pricers value: zero curves in two currencies, a credit curve, a curve of
/// implied volatilities, and a past of closes for the options that look back.
/// </summary>
internal static class WideBook
{
    public static readonly DateOnly AsOf = new(2026, 11, 27);

    private static readonly (Factor Factor, double Level, double Deviation)[] s_factors =
    [
        (new("ACME", FactorClass.Equity, ShockKind.Lognormal, "EUR"), 100, 0.015),
        (new("USD", FactorClass.Fx, ShockKind.Lognormal, "USD"), 0.9, 0.006),
        (new("EUR-1Y", FactorClass.Rate, ShockKind.Normal, "EUR", "EUR-ZERO", 1), 0.021, 0.0004),
        (new("EUR-5Y", FactorClass.Rate, ShockKind.Normal, "EUR", "EUR-ZERO", 5), 0.026, 0.0005),
        (new("EUR-10Y", FactorClass.Rate, ShockKind.Normal, "EUR", "EUR-ZERO", 10), 0.029, 0.0005),
        (new("USD-1Y", FactorClass.Rate, ShockKind.Normal, "USD", "USD-ZERO", 1), 0.041, 0.0006),
        (new("USD-10Y", FactorClass.Rate, ShockKind.Normal, "USD", "USD-ZERO", 10), 0.044, 0.0007),
        (new("NEG-1Y", FactorClass.Rate, ShockKind.Normal, "EUR", "NEG-ZERO", 1), -0.004, 0.0004),
        (new("BBB-2Y", FactorClass.Credit, ShockKind.Normal, null, "BBB", 2), 0.011, 0.0003),
        (new("BBB-7Y", FactorClass.Credit, ShockKind.Normal, null, "BBB", 7), 0.016, 0.0003),
        (new("ACME-V3M", FactorClass.Vol, ShockKind.Lognormal, null, "ACME-VOL", 0.25), 0.24, 0.04),
        (new("ACME-V1Y", FactorClass.Vol, ShockKind.Lognormal, null, "ACME-VOL", 1), 0.27, 0.025),
    ];

    /// <summary>The instruments.</summary>
    public static readonly Instrument[] Instruments =
    [
        new Spot("ACME") { Name = "SHARE", Currency = "EUR" },
        new Bond(new(0.03, 2, DayCount.ActualActual), Day(-400), Day(1_700), RateTerm.From("EUR-ZERO"), 100, null) { Name = "BOND", Currency = "EUR" },
        new Bond(new(0.05, 1, DayCount.Thirty360), Day(-30), Day(2_000), RateTerm.From("USD-ZERO"), 100, RateTerm.From("BBB")) { Name = "CREDIT", Currency = "USD" },
        new Bond(new(0, 0, DayCount.ActualActual), Day(-30), Day(900), RateTerm.From("NEG-ZERO"), 100, null) { Name = "ZERO", Currency = "EUR" },
        new Floater(new(RateTerm.From("EUR-ZERO"), 4, DayCount.Actual360, 0.002, 0.0215), Day(-60), Day(1_100), RateTerm.From("EUR-ZERO"), 100, RateTerm.From("BBB-2Y")) { Name = "FLOATER", Currency = "EUR" },
        new Swap(ReceivedLeg.Fixed, new(0.027, 1, DayCount.Thirty360), new(RateTerm.From("EUR-ZERO"), 2, DayCount.Actual360, 0, 0.0222), Day(-100), Day(3_000), RateTerm.From("EUR-ZERO"), 1_000) { Name = "RECEIVER", Currency = "EUR" },
        new Swap(ReceivedLeg.Float, new(0.043, 2, DayCount.Thirty360), new(RateTerm.From("USD-ZERO"), 4, DayCount.Actual360, 0, 0.0413), Day(-10), Day(1_500), RateTerm.From("USD-ZERO"), 1_000) { Name = "PAYER", Currency = "USD" },
        new Forward(new("ACME", null), 102, Day(300), RateTerm.From("EUR-ZERO"), RateTerm.Of(0.015), null) { Name = "FORWARD", Currency = "EUR" },
        new Forward(new(null, "USD"), 0.91, Day(180), RateTerm.From("EUR-ZERO"), RateTerm.From("USD-ZERO"), null) { Name = "FX-FORWARD", Currency = "EUR", Multiplier = 1_000 },
        new Option(new("ACME", null), 105, Day(200), OptionRight.Call, ExerciseStyle.European, new(null, "ACME-VOL"), RateTerm.From("EUR-ZERO"), RateTerm.Of(0.015)) { Name = "CALL", Currency = "EUR" },
        new Option(new("ACME", null), 95, Day(120), OptionRight.Put, ExerciseStyle.European, new(0.25, null), RateTerm.From("EUR-ZERO"), null) { Name = "PUT", Currency = "EUR" },
        new Option(new("ACME", null), 110, Day(250), OptionRight.Put, ExerciseStyle.American, new(0.25, null), RateTerm.Of(0.03), RateTerm.Of(0.01)) { Name = "AMERICAN", Currency = "EUR" },
        new Option(new("ACME", null), 100, Day(250), OptionRight.Call, ExerciseStyle.American, new(null, "ACME-V1Y"), RateTerm.From("EUR-ZERO"), RateTerm.Of(0.05)) { Name = "AMERICAN-MOVED", Currency = "EUR" },
        new Digital(new("ACME", null), 101, Day(90), OptionRight.Call, new(0.25, null), RateTerm.Of(0.02), null, DigitalPayoff.Cash, 50) { Name = "DIGITAL", Currency = "EUR" },
        new Digital(new(null, "USD"), 0.9, Day(90), OptionRight.Put, new(0.09, null), RateTerm.From("EUR-ZERO"), RateTerm.From("USD-ZERO"), DigitalPayoff.Asset, null) { Name = "DIGITAL-FX", Currency = "EUR", Multiplier = 100 },
        Barrier("DOWN-OUT", 85, BarrierKind.DownOut, 0, Monitoring.Continuous), Barrier("DOWN-IN", 85, BarrierKind.DownIn, 2, Monitoring.Daily),
        Barrier("UP-OUT", 130, BarrierKind.UpOut, 3, Monitoring.Daily), Barrier("UP-IN", 130, BarrierKind.UpIn, 0, Monitoring.Continuous),
        Barrier("KNOCKED", 89, BarrierKind.DownIn, 0, Monitoring.Continuous) with { Issue = Day(-20) },
        new Asian(new("ACME", null), 99, Day(60), OptionRight.Call, new(0.25, null), RateTerm.Of(0.02), null, AverageKind.Geometric, FixingSchedule.Of([new(Day(-14), 97.5), new(Day(-7), null), .. Weekly(60)]), null) { Name = "GEOMETRIC", Currency = "EUR" },
        new Asian(new("ACME", null), 99, Day(60), OptionRight.Put, new(null, "ACME-VOL"), RateTerm.From("EUR-ZERO"), null, AverageKind.Geometric, FixingSchedule.Continuous, Day(-14)) { Name = "GEOMETRIC-CONTINUOUS", Currency = "EUR" },
        new Asian(new("ACME", null), 99, Day(60), OptionRight.Call, new(0.25, null), RateTerm.Of(0.02), null, AverageKind.Arithmetic, FixingSchedule.Of([new(Day(-14), 97.5), .. Weekly(60)]), null) { Name = "ARITHMETIC", Currency = "EUR" },
        new Lookback(new("ACME", null), null, Day(80), OptionRight.Put, new(0.25, null), RateTerm.Of(0.02), null, Monitoring.Continuous, Day(-20)) { Name = "LOOKBACK", Currency = "EUR" },
    ];

    /// <summary>One book in euros with something of each instrument, and one in dollars with some of them.</summary>
    public static SnapshotBuilder Whole() => Holding([.. Instruments.Select((instrument, i) => new Position("HOME", instrument.Name, (i % 3) - 1.5)), new("AWAY", "CREDIT", 7), new("AWAY", "PAYER", -3), new("AWAY", "AMERICAN", 11)]);

    /// <summary>The same market with other positions.</summary>
    public static SnapshotBuilder Holding(params Position[] positions) => new()
    {
        AsOf = AsOf,
        Settings = new() { Model = new() { Covariance = CovarianceEstimator.Given }, Measures = MixedBook.Measures },
        Books = [new("ALL", null, "All", "EUR"), new("HOME", "ALL", "Home", "EUR"), new("AWAY", "ALL", "Away", "USD")],
        Factors = [.. s_factors.Select(f => f.Factor)],
        Observations = [.. Past(), .. s_factors.Select(f => new Observation(AsOf, f.Factor.Name, f.Level))],
        Covariance = [.. Covariance()],
        Instruments = [.. Instruments],
        Positions = [.. positions],
    };

    private static DateOnly Day(int days) => AsOf.AddDays(days);

    private static IEnumerable<Fixing> Weekly(int days) => Enumerable.Range(0, 1 + (days / 7)).Select(w => new Fixing(Day(7 * w), null));

    private static SingleBarrier Barrier(string name, double level, BarrierKind kind, double rebate, Monitoring monitoring) =>
        new(new("ACME", null), 100, Day(150), OptionRight.Call, new(0.25, null), RateTerm.Of(0.03), RateTerm.Of(0.01), level, kind, rebate, monitoring, Day(-5), null) { Name = name, Currency = "EUR" };

    // Closes of the share before today: down to 88 and back.
    private static IEnumerable<Observation> Past() =>
        Enumerable.Range(1, 25).Select(back => new Observation(Day(-back), "ACME", 100 - (12 * Math.Exp(-Math.Abs(back - 14) / 3.0)))).Where(o => o.Date.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday));

    private static IEnumerable<CovarianceEntry> Covariance()
    {
        for (var i = 0; i < s_factors.Length; i++)
        {
            for (var j = 0; j <= i; j++)
                yield return new(s_factors[i].Factor.Name, s_factors[j].Factor.Name, (i == j ? 1 : 0.5 / (1 + i - j) * ((i + j) % 3 == 0 ? -1 : 1)) * s_factors[i].Deviation * s_factors[j].Deviation);
        }
    }
}
