using Microsoft.Data.Sqlite;

namespace RiskWorker.Storage.Sqlite;

/// <summary>What is wrong with a store.</summary>
public enum StoreFault
{
    /// <summary>Another process holds it; trying again later may help.</summary>
    Busy,

    /// <summary>It cannot be opened.</summary>
    Unreachable,

    /// <summary>It or its folder may not be written to.</summary>
    ReadOnly,

    /// <summary>The disk is full.</summary>
    Full,

    /// <summary>Its bytes are damaged, or it is no store at all.</summary>
    Corrupt,

    /// <summary>A newer version of the program has written it.</summary>
    Newer,

    /// <summary>What was asked for is not possible with what it holds.</summary>
    Refused,

    /// <summary>Anything else.</summary>
    Internal,
}

/// <summary>The store, a file, cannot do what it was asked to; the message says what is wrong and how to mend it.</summary>
public sealed class StoreException : IOException
{
    /// <summary>Takes the kind of fault and the sentence to show.</summary>
    public StoreException(StoreFault fault, string message, Exception? inner = null) : base(message, inner) => Fault = fault;

    /// <summary>What is wrong.</summary>
    public StoreFault Fault { get; }

    /// <summary>Whether the same call may succeed later without anybody mending anything.</summary>
    public bool IsTransient => Fault == StoreFault.Busy;

    internal static StoreException From(SqliteException error, string path)
    {
        var (fault, sentence) = error.SqliteErrorCode switch
        {
            5 or 6 => (StoreFault.Busy, "is locked by another process. Wait until that has finished, or end it; then try again."),
            8 => (StoreFault.ReadOnly, "cannot be written to. Give this user write permission on the file and on its folder."),
            10 => (StoreFault.Unreachable, "cannot be read or written: the disk or network drive reports an error. Check the drive; keep the store on a local disk."),
            11 => (StoreFault.Corrupt, "is damaged. Put the file aside and restore a backup."),
            26 => (StoreFault.Corrupt, "is not a SQLite database. Name another file, or move this one away."),
            13 => (StoreFault.Full, "cannot grow: the disk is full. Free some space; what was stored before is whole."),
            14 => (StoreFault.Unreachable, "cannot be opened. Check that its folder exists and that this user may read and write there."),
            _ when error.Message.Contains("append-only", StringComparison.Ordinal) => (StoreFault.Refused, "keeps its records for good: this row can be neither changed nor removed."),
            _ => (StoreFault.Internal, $"reports: {error.Message}"),
        };
        return new(fault, $"The store '{path}' {sentence}", error);
    }
}
