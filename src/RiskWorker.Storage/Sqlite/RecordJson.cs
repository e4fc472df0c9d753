using System.Text.Json;
using System.Text.Json.Serialization;
using System.Text.Json.Serialization.Metadata;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Sqlite;

/// <summary>A run record as JSON: the same record gives the same bytes, and every number comes back to the bit.</summary>
internal static class RecordJson
{
    // Generated code overwrites a property that the JSON lacks with null, losing the default of a field that a later version added;
    // reflection leaves it alone. So records are written by the one and read by the other.
    private static readonly JsonSerializerOptions s_reading = new(RecordContext.Default.Options)
    {
        TypeInfoResolver = new DefaultJsonTypeInfoResolver(),
        Converters = { new JsonStringEnumConverter() },
    };

    /// <summary>The record's canonical bytes; the chain vouches for their hash.</summary>
    public static byte[] Write(RunRecord record) => JsonSerializer.SerializeToUtf8Bytes(record, RecordContext.Default.RunRecord);

    /// <summary>The record that <see cref="Write"/> wrote, by this version or an earlier one.</summary>
    public static RunRecord Read(ReadOnlySpan<byte> json) => JsonSerializer.Deserialize<RunRecord>(json, s_reading)!;
}
