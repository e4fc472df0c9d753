using System.Text;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Sqlite;

/// <summary>A part of a snapshot with the text that its hash is of, as UTF-8.</summary>
internal readonly record struct SnapshotLeaf(SnapshotPart Part, byte[] Text)
{
    public static SnapshotLeaf Of(string path, string text)
    {
        var bytes = Encoding.UTF8.GetBytes(text);
        return new(new(path, SnapshotHash.OfBytes(bytes)), bytes);
    }
}
