using System.Text.Json;
using System.Text.Json.Serialization;
using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Sqlite;

/// <summary>How a run record is laid out as JSON.</summary>
[JsonSourceGenerationOptions(
    PropertyNamingPolicy = JsonKnownNamingPolicy.CamelCase,
    IgnoreReadOnlyProperties = true,
    UseStringEnumConverter = true,
    NumberHandling = JsonNumberHandling.AllowNamedFloatingPointLiterals,
    Converters = [typeof(ConfidenceJson), typeof(HorizonJson), typeof(QuantileJson)])]
[JsonSerializable(typeof(RunRecord))]
[JsonSerializable(typeof(DayForecast))]
internal sealed partial class RecordContext : JsonSerializerContext;

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
