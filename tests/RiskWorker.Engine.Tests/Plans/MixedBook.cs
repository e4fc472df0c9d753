using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Tests.Plans;

/// <summary>
/// A book with one of everything that is priced: four nodes in three currencies, spots, cash, futures, forwards and options in
/// home and foreign currencies, on crosses, with flat and with moving volatilities, a factor of normal shocks and one that never moves.
/// </summary>
internal static class MixedBook
{
    public static readonly DateOnly AsOf = new(2026, 11, 27);

    public static readonly MeasureSpec[] Measures =
    [
        new(MeasureKind.Var, new(0.99m), new(1)), new(MeasureKind.Es, new(0.975m), new(1)),
        new(MeasureKind.Var, new(0.99m), new(10)), new(MeasureKind.Es, new(0.975m), new(10)),
    ];

    private static readonly (string Name, double Level, double Deviation)[] s_moving =
        [("EQ", 100, 0.012), ("EQU", 50, 0.02), ("GBP", 1.15, 0.005), ("OIL", 70, 0.025), ("RATE", 0.03, 0.0006), ("USD", 0.9, 0.006), ("VOL", 0.2, 0.04)];

    /// <summary>The instruments, by name.</summary>
    public static readonly Instrument[] Instruments =
    [
        new Spot("EQ") { Name = "EQ-UNIT", Currency = "EUR" },
        new Spot("EQU") { Name = "EQU-UNIT", Currency = "USD", Multiplier = 2 },
        new Spot("STILL") { Name = "STILL-UNIT", Currency = "EUR" },
        new Cash { Name = "EUR-CASH", Currency = "EUR" },
        new Cash { Name = "USD-CASH", Currency = "USD" },
        new Cash { Name = "GBP-CASH", Currency = "GBP", Multiplier = 100 },
        new Future("OIL") { Name = "OIL-FUTURE", Currency = "EUR", Multiplier = 10 },
        new Future("EQU") { Name = "EQU-FUTURE", Currency = "USD", Multiplier = 5 },
        new Future("RATE") { Name = "RATE-FUTURE", Currency = "EUR", Multiplier = 100_000 },
        new Forward(new("EQ", null), 101, AsOf.AddDays(180), RateTerm.Of(0.03), RateTerm.Of(0.01), null) { Name = "EQ-FORWARD", Currency = "EUR" },
        new Forward(new("EQU", null), 45, AsOf.AddDays(400), RateTerm.Of(0.05), null, null) { Name = "EQU-FORWARD", Currency = "USD", Multiplier = 3 },
        new Forward(new(null, "GBP"), 1.3, AsOf.AddDays(90), RateTerm.Of(0.04), RateTerm.Of(0.02), null) { Name = "GBPUSD-FORWARD", Currency = "USD", Multiplier = 1_000 },
        new Forward(new(null, "EUR"), 1.1, AsOf.AddDays(60), RateTerm.Of(0.04), RateTerm.Of(0.025), null) { Name = "EURUSD-FORWARD", Currency = "USD", Multiplier = 1_000 },
        Option("EQ-CALL", "EUR", new("EQ", null), 105, 120, OptionRight.Call, new(0.25, null), 0.03, 0.01),
        Option("EQ-PUT", "EUR", new("EQ", null), 95, 30, OptionRight.Put, new(null, "VOL"), 0.03, 0.0),
        Option("EQ-LAST-DAY", "EUR", new("EQ", null), 100, 0, OptionRight.Call, new(0.25, null), 0.03, 0.0),
        Option("EQU-PUT", "USD", new("EQU", null), 52, 200, OptionRight.Put, new(0.35, null), 0.05, 0.02),
        Option("OIL-CALL", "EUR", new("OIL", null), 75, 75, OptionRight.Call, new(0.4, null), 0.03, 0.03),
        Option("GBPUSD-CALL", "USD", new(null, "GBP"), 1.3, 90, OptionRight.Call, new(null, "VOL"), 0.04, 0.02),
        Option("USDEUR-PUT", "EUR", new(null, "USD"), 0.92, 45, OptionRight.Put, new(0.1, null), 0.025, 0.04),
        Option("EURGBP-CALL", "GBP", new(null, "EUR"), 0.87, 45, OptionRight.Call, new(0.08, null), 0.045, 0.025),
    ];

    private static readonly Position[] s_positions =
    [
        new("ALL", "EUR-CASH", 1_000), new("ALL", "USD-CASH", -500), new("ALL", "OIL-FUTURE", 12),
        new("AMERICA", "EQU-UNIT", 40), new("AMERICA", "EQU-PUT", 60), new("AMERICA", "USD-CASH", 2_000), new("AMERICA", "EQU-FUTURE", -8),
        new("AMERICA", "GBPUSD-CALL", 900), new("AMERICA", "EURUSD-FORWARD", -0.7), new("AMERICA", "EQU-FORWARD", 4),
        new("EUROPE", "EQ-UNIT", 55), new("EUROPE", "EQ-CALL", -130), new("EUROPE", "EQ-PUT", 210), new("EUROPE", "EQ-FORWARD", 25),
        new("EUROPE", "EQ-LAST-DAY", 17), new("EUROPE", "OIL-CALL", 33), new("EUROPE", "RATE-FUTURE", 3), new("EUROPE", "STILL-UNIT", 5), new("EUROPE", "USDEUR-PUT", 1_500),
        new("LONDON", "GBP-CASH", 7), new("LONDON", "EURGBP-CALL", -2_500), new("LONDON", "GBPUSD-FORWARD", 0.4), new("LONDON", "EQU-UNIT", -11),
    ];

    /// <summary>The whole book.</summary>
    public static SnapshotBuilder Whole() => Holding(s_positions);

    /// <summary>The same market, books and instruments with other positions.</summary>
    public static SnapshotBuilder Holding(params Position[] positions) => new()
    {
        AsOf = AsOf,
        Settings = new()
        {
            Model = new() { Covariance = CovarianceEstimator.Given, Drift = DriftKind.Explicit, Drifts = new Dictionary<string, double> { ["EQ"] = 0.07, ["OIL"] = -0.03, ["STILL"] = 0.1, ["RATE"] = 0.002 } },
            Measures = Measures,
            Simulation = new() { Scenarios = 10_000, Looks = 2, Cap = 20_000, Precision = 0.001 },
        },
        Books = [new("ALL", null, "All", "EUR"), new("AMERICA", "ALL", "America", "USD"), new("LONDON", "AMERICA", "London", "GBP"), new("EUROPE", "ALL", "Europe", "EUR")],
        Factors =
        [
            new("EQ", FactorClass.Equity, ShockKind.Lognormal, "EUR"), new("EQU", FactorClass.Equity, ShockKind.Lognormal, "USD"),
            new("GBP", FactorClass.Fx, ShockKind.Lognormal, "GBP"), new("USD", FactorClass.Fx, ShockKind.Lognormal, "USD"),
            new("OIL", FactorClass.Commodity, ShockKind.Lognormal, "EUR"), new("RATE", FactorClass.Rate, ShockKind.Normal, "EUR"),
            new("VOL", FactorClass.Vol, ShockKind.Lognormal), new("STILL", FactorClass.Equity, ShockKind.Lognormal, "EUR"),
        ],
        Observations = [.. s_moving.Select(f => new Observation(AsOf, f.Name, f.Level)), new(AsOf, "STILL", 20)],
        Covariance = [.. Covariance(), new("STILL", "STILL", 0)],
        Instruments = [.. Instruments],
        Positions = [.. positions],
        Limits =
        [
            new("europe-var", "EUROPE", Measures[0], 900), new("america-nav", "AMERICA", Measures[1], 0.05, LimitBasis.Nav),
            new("london-book", "LONDON", Measures[2], 3, LimitBasis.Book, "ALL"),
        ],
    };

    // Correlations 0.6 / (1 + |i - j|) of alternating sign: diagonally dominant enough to be positive definite.
    private static IEnumerable<CovarianceEntry> Covariance()
    {
        for (var i = 0; i < s_moving.Length; i++)
        {
            for (var j = 0; j <= i; j++)
            {
                var correlation = i == j ? 1 : 0.6 / (1 + i - j) * ((i + j) % 3 == 0 ? -1 : 1);
                yield return new(s_moving[i].Name, s_moving[j].Name, correlation * s_moving[i].Deviation * s_moving[j].Deviation);
            }
        }
    }

    private static Option Option(string name, string currency, Underlying underlying, double strike, int days, OptionRight right, VolatilityTerm volatility, double rate, double carry) =>
        new(underlying, strike, AsOf.AddDays(days), right, ExerciseStyle.European, volatility, RateTerm.Of(rate), RateTerm.Of(carry)) { Name = name, Currency = currency };
}
