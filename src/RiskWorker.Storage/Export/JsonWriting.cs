using System.Buffers;
using System.Text.Json;

namespace RiskWorker.Storage.Export;

/// <summary>What <see cref="Utf8JsonWriter"/> lacks for figures: undefined numbers as null, arrays of objects, compact stretches.</summary>
internal static class JsonWriting
{
    public static void Number(this Utf8JsonWriter json, string name, double? value)
    {
        if (value is { } number && double.IsFinite(number)) json.WriteNumber(name, number);
        else json.WriteNull(name);
    }

    public static void Integer(this Utf8JsonWriter json, string name, int? value)
    {
        if (value is { } number) json.WriteNumber(name, number);
        else json.WriteNull(name);
    }

    public static void Boolean(this Utf8JsonWriter json, string name, bool? value)
    {
        if (value is { } flag) json.WriteBoolean(name, flag);
        else json.WriteNull(name);
    }

    public static void Array<T>(this Utf8JsonWriter json, string name, IReadOnlyList<T> items, Action<Utf8JsonWriter, T> write)
    {
        json.WriteStartArray(name);
        foreach (var item in items)
        {
            json.WriteStartObject();
            write(json, item);
            json.WriteEndObject();
        }
        json.WriteEndArray();
    }

    /// <summary>Writes an array of small objects, each on a line of its own, as a member of the outermost object.</summary>
    public static void Lines<T>(this Utf8JsonWriter json, string name, IReadOnlyList<T> items, Action<Utf8JsonWriter, T> write)
    {
        var buffer = new ArrayBufferWriter<byte>();
        using var line = new Utf8JsonWriter(buffer);
        buffer.Write("["u8);
        for (var i = 0; i < items.Count; i++)
        {
            buffer.Write(i == 0 ? "\n    "u8 : ",\n    "u8);
            line.Reset();
            line.WriteStartObject();
            write(line, items[i]);
            line.WriteEndObject();
            line.Flush();
        }
        buffer.Write(items.Count == 0 ? "]"u8 : "\n  ]"u8);
        json.WritePropertyName(name);
        json.WriteRawValue(buffer.WrittenSpan, skipInputValidation: true);
    }

    /// <summary>Writes a long value on one line: hundreds of numbers are not made readable by a line each.</summary>
    public static void Compact(this Utf8JsonWriter json, string name, Action<Utf8JsonWriter> write)
    {
        var buffer = new ArrayBufferWriter<byte>();
        using (var compact = new Utf8JsonWriter(buffer)) write(compact);
        json.WritePropertyName(name);
        json.WriteRawValue(buffer.WrittenSpan, skipInputValidation: true);
    }
}
