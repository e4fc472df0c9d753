using System.IO.Compression;
using System.Text.Json;
using System.Text.Json.Serialization;
using System.Text.Json.Serialization.Metadata;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Sqlite;

/// <summary>A run record as JSON: the same record gives the same bytes, and every number comes back to the bit.</summary>
[JsonSourceGenerationOptions(
    PropertyNamingPolicy = JsonKnownNamingPolicy.CamelCase,
    IgnoreReadOnlyProperties = true,
    UseStringEnumConverter = true,
    NumberHandling = JsonNumberHandling.AllowNamedFloatingPointLiterals,
    Converters = [typeof(ConfidenceJson), typeof(HorizonJson), typeof(QuantileJson)])]
[JsonSerializable(typeof(RunRecord))]
internal sealed partial class RecordJson : JsonSerializerContext
{
    // Generated code overwrites a property that the JSON lacks with null, losing the default of a field that a later version added;
    // reflection leaves it alone. So records are written by the one and read by the other.
    private static readonly JsonSerializerOptions s_reading = new(Default.Options)
    {
        TypeInfoResolver = new DefaultJsonTypeInfoResolver(),
        Converters = { new JsonStringEnumConverter() },
    };

    /// <summary>The record's canonical bytes; the chain vouches for their hash.</summary>
    public static byte[] Write(RunRecord record) => JsonSerializer.SerializeToUtf8Bytes(record, Default.RunRecord);

    /// <summary>The record that <see cref="Write"/> wrote, by this version or an earlier one.</summary>
    public static RunRecord Read(ReadOnlySpan<byte> json) => JsonSerializer.Deserialize<RunRecord>(json, s_reading)!;

    /// <summary>Compressed for the store.</summary>
    public static byte[] Pack(byte[] json)
    {
        using var packed = new MemoryStream();
        using (var deflate = new ZLibStream(packed, CompressionLevel.Optimal)) deflate.Write(json);
        return packed.ToArray();
    }

    /// <summary>Undoes <see cref="Pack"/>.</summary>
    /// <exception cref="InvalidDataException">The bytes are damaged.</exception>
    public static byte[] Unpack(byte[] packed)
    {
        using var json = new MemoryStream();
        using (var inflate = new ZLibStream(new MemoryStream(packed), CompressionMode.Decompress)) inflate.CopyTo(json);
        return json.ToArray();
    }
}

/// <summary>A confidence level as its decimal.</summary>
internal sealed class ConfidenceJson : JsonConverter<Confidence>
{
    public override Confidence Read(ref Utf8JsonReader reader, Type typeToConvert, JsonSerializerOptions options) => new(reader.GetDecimal());

    public override void Write(Utf8JsonWriter writer, Confidence value, JsonSerializerOptions options) => writer.WriteNumberValue(value.Level);
}

/// <summary>A horizon as its number of days.</summary>
internal sealed class HorizonJson : JsonConverter<Horizon>
{
    public override Horizon Read(ref Utf8JsonReader reader, Type typeToConvert, JsonSerializerOptions options) => new(reader.GetInt32());

    public override void Write(Utf8JsonWriter writer, Horizon value, JsonSerializerOptions options) => writer.WriteNumberValue(value.Days);
}

/// <summary>A quantile as [probability, profit, exact]: a record holds thousands of them.</summary>
internal sealed class QuantileJson : JsonConverter<Quantile>
{
    public override Quantile Read(ref Utf8JsonReader reader, Type typeToConvert, JsonSerializerOptions options)
    {
        var probability = Next(ref reader).GetDouble();
        var profit = Next(ref reader).TokenType == JsonTokenType.String ? double.NaN : reader.GetDouble();
        var exact = Next(ref reader).GetBoolean();
        Next(ref reader);
        return new(probability, profit, exact);
    }

    public override void Write(Utf8JsonWriter writer, Quantile value, JsonSerializerOptions options)
    {
        writer.WriteStartArray();
        writer.WriteNumberValue(value.Probability);
        if (double.IsFinite(value.Profit)) writer.WriteNumberValue(value.Profit);
        else writer.WriteStringValue("NaN");
        writer.WriteBooleanValue(value.Exact);
        writer.WriteEndArray();
    }

    private static ref Utf8JsonReader Next(ref Utf8JsonReader reader)
    {
        if (!reader.Read()) throw new JsonException("A quantile ends too early.");
        return ref reader;
    }
}
