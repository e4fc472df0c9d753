using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Tests.Checks;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>
/// The mixed book with a history of 300 days of all its factors, and one model of every kind to fit to it. Shocks are uniform, with calm and wild
/// spells and a few jumps, without a function that differs by hardware.
/// </summary>
internal static class MixedHistory
{
    private const int Days = 300;

    /// <summary>Every kind of model, and every way to estimate it.</summary>
    public static IReadOnlyDictionary<string, ModelSettings> Models { get; } = new Dictionary<string, ModelSettings>
    {
        ["lognormal"] = new() { Window = 250 },
        ["shrunk"] = new() { Covariance = CovarianceEstimator.Shrunk, Window = 250 },
        ["pairwise"] = new() { Covariance = CovarianceEstimator.Equal, MissingDays = MissingDays.Pairwise, Window = 250 },
        ["student-given"] = new() { Kind = ModelKind.StudentT, DegreesOfFreedom = 3.5, Window = 250 },
        ["student-fitted"] = new() { Kind = ModelKind.StudentT, Covariance = CovarianceEstimator.Equal, Window = 250 },
        ["student-own"] = new() { Kind = ModelKind.StudentT, Margins = StudentMargins.Own, Window = 250 },
        ["historical"] = new() { Kind = ModelKind.Historical, Window = 240 },
        ["historical-aged"] = new() { Kind = ModelKind.Historical, Window = 240, AgeWeight = 0.99 },
        ["filtered"] = new() { Kind = ModelKind.FilteredHistorical, Window = 250 },
        ["filtered-garch"] = new() { Kind = ModelKind.FilteredHistorical, Volatility = VolatilityFilter.Garch, Window = 250 },
        ["jumps-found"] = new() { Kind = ModelKind.JumpDiffusion, Covariance = CovarianceEstimator.Equal, Window = 250, Drift = DriftKind.Historical },
        ["jumps-given"] = new()
        {
            Kind = ModelKind.JumpDiffusion,
            Window = 250,
            Jumps = new()
            {
                CommonPerYear = 6,
                Common = new Dictionary<string, JumpSize> { ["EQ"] = new(-0.05, 0.02), ["EQU"] = new(-0.06, 0.03), ["VOL"] = new(0.2, 0.1) },
                Own = new Dictionary<string, OwnJumps> { ["OIL"] = new(10, new(0.01, 0.05)), ["RATE"] = new(4, new(0, 0.001)) },
            },
        },
        ["stressed"] = new() { Kind = ModelKind.Stressed, Span = 60, Stressed = new() { Name = "base", Covariance = CovarianceEstimator.Equal } },
    };

    /// <summary>The kinds that a plan is compiled of, without a search for a span.</summary>
    public static IEnumerable<string> Laws => Models.Keys.Where(name => name != "stressed");

    public static Snapshot Of(string model)
    {
        var whole = MixedBook.Whole();
        var snapshot = new SnapshotBuilder
        {
            AsOf = whole.AsOf,
            Settings = whole.Settings with { Model = Models[model] with { Name = model } },
            Books = whole.Books,
            Factors = whole.Factors,
            Observations = [.. whole.Factors.SelectMany((f, j) => Observations(f, j, whole.Observations.Single(o => o.Factor == f.Name).Value)).Where(o => model != "pairwise" || !IsMissing(o))],
            Instruments = whole.Instruments,
            Positions = whole.Positions,
            Limits = whole.Limits,
        };
        return snapshot.Build();
    }

    // What a model that pairs days is for: two weeks of one factor, a day of another.
    private static bool IsMissing(Observation o) => o.Factor == "OIL" ? o.Date.Month == 6 && o.Date.Day < 15 : o.Factor == "GBP" && o.Date == new DateOnly(2026, 9, 9);

    private static IEnumerable<Observation> Observations(Factor factor, int number, double level)
    {
        var (dates, random) = (FridaySnapshot.Weekdays(MixedBook.AsOf, Days + 1), new Random(100 + number));
        var size = factor.Name switch { "STILL" => 0, "VOL" => 0.06, "RATE" => 0.0008, "GBP" or "USD" => 0.006, _ => 0.015 };
        for (var t = 0; t < dates.Length; t++)
        {
            var spell = t / 50 % 2 == 0 ? 0.6 : 1.4;
            var shock = size * spell * (random.NextDouble() + random.NextDouble() + random.NextDouble() - 1.5);
            if (t is 90 or 210 || (t == 150 && number % 3 == 0)) shock -= 6 * size;
            level = factor.Shock == ShockKind.Normal ? level + shock : level * (1 + shock);
            yield return new(dates[t], factor.Name, level);
        }
    }
}
