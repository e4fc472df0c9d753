namespace RiskWorker.Storage.Sqlite.Writers;

/// <summary>What became of the rows of one file.</summary>
internal readonly record struct RowCounts(long Added, long Changed, long Removed, long Unchanged);

/// <summary>Brings the rows of one feed file into the store, within the transaction of the whole folder.</summary>
internal interface IRowWriter<TRow> : IDisposable
{
    /// <summary>Takes the next row.</summary>
    void Write(in TRow row);

    /// <summary>Does what can be done only after the last row.</summary>
    RowCounts Finish();
}
