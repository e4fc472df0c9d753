using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Runs;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.UseCases;

/// <summary>
/// A run of an invented book of four lines, from calibration to the report, on a core that reading the feed leaves idle: the code
/// that the real run waits for is compiled by the time the feed is read. Nothing of it is kept, and no figure depends on it.
/// </summary>
public sealed class Rehearsal
{
    private const int Days = 90;
    private const int Blocks = 12;
    private static readonly DateOnly s_first = new(2026, 1, 5);
    private readonly Lazy<Task> _run = new(() => Task.Run(Run));

    /// <summary>Starts it on another core, once in this process; where there is no other core, not at all.</summary>
    public void Start()
    {
        if (Environment.ProcessorCount > 1) _ = _run.Value;
    }

    /// <summary>Runs it here.</summary>
    /// <returns>The report, to show that it came through.</returns>
    public static byte[] Run()
    {
        var snapshot = InventedSnapshot();
        var results = new RunCalculator(snapshot, 1, null, CancellationToken.None).Calculate();
        var record = RunRecords.Of(snapshot, results, null) with { Run = "rehearsal", Command = "none" };
        _ = RunDocuments.JsonOf(record);
        return RunDocuments.LimitReportOf(new StoredRun(record, snapshot.Hash.Root));
    }

    private static Snapshot InventedSnapshot()
    {
        Factor[] factors =
        [
            new("share", FactorClass.Equity, ShockKind.Lognormal, "EUR"), new("foreign", FactorClass.Fx, ShockKind.Lognormal, "CHF"),
            new("rate", FactorClass.Rate, ShockKind.Normal), new("turbulence", FactorClass.Vol, ShockKind.Lognormal),
        ];
        var dates = Enumerable.Range(0, 2 * Days).Select(s_first.AddDays).Where(d => d.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday)).Take(Days).ToArray();
        var asOf = dates[^1];
        Instrument[] instruments =
        [
            new Spot("share") { Name = "share", Currency = "EUR" }, new Cash { Name = "francs", Currency = "CHF" },
            Call("call", new(0.2, null)), Call("moved", new(null, "turbulence")),
        ];
        return new Snapshot
        {
            AsOf = asOf,
            Settings = new() { Simulation = new() { Scenarios = Blocks * 4_096, Looks = 1, Cap = Blocks * 4_096 } },
            Books = [new("all", null, "Rehearsal", "EUR"), new("desk", "all", "Desk", "CHF")],
            Factors = factors,
            Observations = ObservationHistory.From(factors.Select(f => f.Name), [.. dates.SelectMany((date, day) => factors.Select((f, j) => new Observation(date, f.Name, LevelOf(j, day))))]),
            Adjustments = [],
            Holidays = [],
            Instruments = instruments.ToDictionary(i => i.Name, StringComparer.Ordinal),
            Positions = [.. instruments.Select(i => new Position("desk", i.Name, 100))],
            Limits = [new("limit", "all", new(MeasureKind.Var, new(0.99m), new(1)), 1e9)],
            ProfitAndLoss = [],
            Hash = SnapshotHash.Of([new("settings", SnapshotHash.OfText("rehearsal"))]),
        };

        Option Call(string name, VolatilityTerm volatility) =>
            new(new("share", null), 100, asOf.AddDays(200), OptionRight.Call, ExerciseStyle.European, volatility, null, null) { Name = name, Currency = "EUR" };
    }

    // Any path will do that moves every day and no two factors alike.
    private static double LevelOf(int factor, int day) => (factor == 0 ? 100 : 1 - (0.2 * factor)) * (1 + (0.01 * ((day * (factor + 7) % 11) - 5) / 5));
}
