using System.Buffers;
using System.Collections.Frozen;
using System.Text;
using System.Text.Json;
using RiskWorker.Domain.Instruments;

namespace RiskWorker.Storage.Sqlite;

/// <summary>An instrument's terms, read from the JSON that they are stored as; the names of terms are the format's own strings, not one more each.</summary>
internal static class TermsText
{
    private const int LongestName = 64, LongestOnStack = 1024;

    private static readonly FrozenSet<string>.AlternateLookup<ReadOnlySpan<char>> s_names =
        InstrumentKinds.AllTerms.ToFrozenSet(StringComparer.Ordinal).GetAlternateLookup<ReadOnlySpan<char>>();

    /// <summary>The terms in the order in which they stand; of one that stands twice the later.</summary>
    /// <exception cref="JsonException">It is not an object of texts.</exception>
    public static Dictionary<string, string> Read(string json)
    {
        var most = Encoding.UTF8.GetMaxByteCount(json.Length);
        byte[]? rented = null;
        var utf8 = most <= LongestOnStack ? stackalloc byte[LongestOnStack] : rented = ArrayPool<byte>.Shared.Rent(most);
        var terms = Read(new Utf8JsonReader(utf8[..Encoding.UTF8.GetBytes(json, utf8)]));
        if (rented is not null) ArrayPool<byte>.Shared.Return(rented);
        return terms;
    }

    private static Dictionary<string, string> Read(Utf8JsonReader json)
    {
        var terms = new Dictionary<string, string>(capacity: 8, StringComparer.Ordinal);
        Require(json.Read() && json.TokenType == JsonTokenType.StartObject);
        while (json.Read() && json.TokenType == JsonTokenType.PropertyName)
        {
            var name = Name(ref json);
            Require(json.Read() && json.TokenType == JsonTokenType.String);
            terms[name] = json.GetString()!;
        }
        Require(json.TokenType == JsonTokenType.EndObject && !json.Read());
        return terms;
    }

    private static string Name(ref Utf8JsonReader json)
    {
        if (json.ValueSpan.Length > LongestName) return json.GetString()!;
        Span<char> name = stackalloc char[LongestName];
        name = name[..json.CopyString(name)];
        return s_names.TryGetValue(name, out var known) ? known : name.ToString();
    }

    private static void Require(bool holds)
    {
        if (!holds) throw new JsonException("The stored terms of an instrument are not an object of texts.");
    }
}
