using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Tests;

/// <summary>A snapshot from the few facts that a test cares for; lists may stand in any order.</summary>
internal sealed class SnapshotBuilder
{
    public DateOnly AsOf { get; init; } = new(2026, 11, 27);
    public RunSettings Settings { get; init; } = new();
    public List<Book> Books { get; init; } = [new("ALL", null, "All", "EUR")];
    public List<Factor> Factors { get; init; } = [];
    public List<Observation> Observations { get; init; } = [];
    public List<Adjustment> Adjustments { get; init; } = [];
    public List<Holiday> Holidays { get; init; } = [];
    public List<Instrument> Instruments { get; init; } = [];
    public List<Position> Positions { get; init; } = [];
    public DatedPositions? Previous { get; init; }
    public List<Limit> Limits { get; init; } = [];
    public List<ProfitAndLoss> ProfitAndLoss { get; init; } = [];
    public List<CovarianceEntry> Covariance { get; init; } = [];
    public List<CountedRun> CountedRuns { get; init; } = [];
    public List<DatedPositions> EarlierPositions { get; init; } = [];

    public Snapshot Build() => new()
    {
        AsOf = AsOf,
        Settings = Settings,
        Books = [.. Books.OrderBy(b => b.Name, StringComparer.Ordinal)],
        Factors = [.. Factors.OrderBy(f => f.Name, StringComparer.Ordinal)],
        Observations = ObservationHistory.From(Factors.Select(f => f.Name), Observations).UpTo(AsOf),
        Adjustments = Adjustments,
        Holidays = Holidays,
        Instruments = Instruments.ToDictionary(i => i.Name, StringComparer.Ordinal),
        Positions = [.. Positions.OrderBy(p => p.Book, StringComparer.Ordinal).ThenBy(p => p.Instrument, StringComparer.Ordinal)],
        Previous = Previous,
        Limits = Limits,
        ProfitAndLoss = ProfitAndLoss,
        Covariance = Covariance,
        CountedRuns = CountedRuns,
        EarlierPositions = EarlierPositions,
        Hash = SnapshotHash.Of([]),
    };
}
