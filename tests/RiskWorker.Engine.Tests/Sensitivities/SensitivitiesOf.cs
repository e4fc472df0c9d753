using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Sensitivities;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Sensitivities;

/// <summary>The sensitivities of small books, to be asked for by book, factor and measure.</summary>
internal sealed class SensitivitiesOf(IReadOnlyList<Sensitivity> all)
{
    public IReadOnlyList<Sensitivity> All => all;

    /// <summary>Those of a snapshot's books.</summary>
    public static SensitivitiesOf Book(Snapshot snapshot) => Plan(CompiledBook.Of(snapshot, 10, 1));

    /// <summary>Those of a compiled book.</summary>
    public static SensitivitiesOf Plan(CompiledBook book) => new(BookSensitivities.Of(book.Plan, book.Model.Factors));

    /// <summary>Those of positions in instruments on factors at given levels, all in one book 'ALL' in EUR.</summary>
    public static SensitivitiesOf Holding((Factor Factor, double Level)[] market, params (Instrument Instrument, double Quantity)[] held) => Book(new SnapshotBuilder
    {
        Settings = new() { Model = new() { Covariance = CovarianceEstimator.Given, Drift = DriftKind.Explicit, Drifts = market.ToDictionary(m => m.Factor.Name, _ => 0.07) } },
        Factors = [.. market.Select(m => m.Factor)],
        Observations = [.. market.Select(m => new Observation(new(2026, 11, 27), m.Factor.Name, m.Level))],
        Covariance = [.. market.SelectMany((one, i) => market.Take(i + 1).Select(other => new CovarianceEntry(one.Factor.Name, other.Factor.Name, one == other ? 1e-4 : 0)))],
        Instruments = [.. held.Select(h => h.Instrument)],
        Positions = [.. held.Select(h => new Domain.Books.Position("ALL", h.Instrument.Name, h.Quantity))],
    }.Build());

    /// <summary>The one of a book and factor, or null where the factor moves nothing there.</summary>
    public Sensitivity? Find(string book, string factor) => all.SingleOrDefault(found => found.Book == book && found.Factor == factor);

    /// <summary>The value of the one of a book and factor, 0 where there is none.</summary>
    public double Value(string book, string factor) => Find(book, factor)?.Value ?? 0;

    /// <summary>Holds a sensitivity against what it should be, relative to its size.</summary>
    public void AssertValue(string book, string factor, SensitivityMeasure measure, double expected, double relative)
    {
        var found = Find(book, factor);
        Assert.NotNull(found);
        Assert.Equal((measure, expected), (found.Measure, Math.Abs(found.Value - expected) <= relative * Math.Abs(expected) ? expected : found.Value));
    }
}
