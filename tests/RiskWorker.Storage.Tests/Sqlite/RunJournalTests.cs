using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Tests.Sqlite;

public sealed class RunJournalTests : IDisposable
{
    private static readonly DateOnly s_day = new(2026, 11, 27);
    private readonly FeedFixture _fixture = new(withFiles: false);
    private readonly RiskStore _store;

    public RunJournalTests() => _store = _fixture.Open();

    public void Dispose()
    {
        _store.Dispose();
        _fixture.Dispose();
    }

    [Fact]
    public void Find_after_append_returns_every_field_to_the_bit()
    {
        var record = RunRecords.Of(s_day, profitFrom: s_day.AddDays(-1));

        var head = _store.Runs.Append(record);
        var stored = _store.Runs.Find(record.Run)!;

        Assert.Equal(head, stored.Head);
        BitEqual.Assert(record, stored.Record);
    }
}
