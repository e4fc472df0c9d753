namespace RiskWorker.Storage.Feed;

/// <summary>Reads one row of a file; one implementation a file, with the memory that its rules across rows need.</summary>
internal interface IRowParser<TRow>
{
    /// <summary>Reads the current row; false when a fault of it was written down.</summary>
    bool TryParse(CellReader cells, out TRow row);
}
