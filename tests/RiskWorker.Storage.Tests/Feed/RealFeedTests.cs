using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Tests.Feed;

public sealed class RealFeedTests
{
    [Fact]
    public void Load_real_feed_stores_every_row_and_a_snapshot_holds_them()
    {
        using var fixture = new FeedFixture(withFiles: false);
        using var store = fixture.Open();

        var outcome = FeedFixture.Load(Path.Combine(AppContext.BaseDirectory, "Data", "real"), store);

        Assert.Empty(outcome.Faults);
        Assert.Empty(outcome.Warnings);
        Assert.Equal(4 * 1860, outcome.Files.Single(f => f.File == "observations.csv").Added);
        var reader = new SnapshotReader(store);
        var asOf = new DateOnly(1998, 8, 14);
        Assert.Equal([asOf], reader.PositionDates);
        Assert.Equal(1860, reader.ObservationDates.Count);
        var snapshot = reader.Take(asOf, new RunSettings(), "lognormal");
        Assert.Equal(["CAC", "DAX", "FTSE", "SMI"], snapshot.Observations.Factors);
        Assert.Equal(1628.75, snapshot.Observations.Column(1)[0]);
        Assert.Equal(["NORTH/DAX-UNIT", "NORTH/FTSE-UNIT", "SOUTH/CAC-UNIT", "SOUTH/SMI-UNIT"], snapshot.Positions.Select(p => $"{p.Book}/{p.Instrument}"));
        Assert.Equal(new Spot("DAX") { Name = "DAX-UNIT", Currency = "EUR" }, snapshot.Instruments["DAX-UNIT"]);
        Assert.Equal(["firm-var", "north-es"], snapshot.Limits.Select(l => l.Name));
    }
}
