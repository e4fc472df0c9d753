using System.Text;
using System.Text.Json;
using System.Text.Unicode;

namespace RiskWorker.Host.Options;

/// <summary>Turns the bytes of a settings file into JSON, or says where they stop being JSON. Comments and trailing commas are refused.</summary>
public static class SettingsDocument
{
    private const string Expected = "one JSON object in UTF-8, without comments or trailing commas";

    /// <summary>Parses <paramref name="json"/>; null, with one fault added, where that fails.</summary>
    public static JsonDocument? Parse(ReadOnlyMemory<byte> json, List<SettingsFault> faults)
    {
        var text = json.Span.StartsWith(Encoding.UTF8.Preamble) ? json[Encoding.UTF8.Preamble.Length..] : json;
        if (!Utf8.IsValid(text.Span))
        {
            faults.Add(new("$", "bytes that are not UTF-8", Expected));
            return null;
        }
        try
        {
            RefuseBrokenEscapes(text.Span);
            return JsonDocument.Parse(text);
        }
        catch (JsonException refusal)
        {
            faults.Add(new($"line {refusal.LineNumber + 1}, byte {refusal.BytePositionInLine + 1}", "text that is not JSON", $"{Expected} ({Reason(refusal)})"));
            return null;
        }
    }

    /// <summary>An escape such as \ud800 is half a character: it parses, and fails only when it is read as text.</summary>
    private static void RefuseBrokenEscapes(ReadOnlySpan<byte> text)
    {
        var reader = new Utf8JsonReader(text);
        while (reader.Read())
        {
            if (reader.TokenType is not (JsonTokenType.String or JsonTokenType.PropertyName) || !reader.ValueIsEscaped) continue;
            try
            {
                _ = reader.GetString();
            }
            catch (InvalidOperationException)
            {
                var before = text[..(int)reader.TokenStartIndex];
                throw new JsonException("An escape is half a surrogate pair.", null, before.Count((byte)'\n'), before.Length - (before.LastIndexOf((byte)'\n') + 1));
            }
        }
    }

    /// <summary>The parser's reason without the position, which the path gives already.</summary>
    private static string Reason(JsonException refusal)
    {
        var end = refusal.Message.IndexOf(" LineNumber:", StringComparison.Ordinal);
        return Printable.Of(end < 0 ? refusal.Message : refusal.Message[..end], 200).TrimEnd('.');
    }
}
