using System.Globalization;
using System.Text.Json;

namespace RiskWorker.Host.UseCases;

/// <summary>
/// Compares two texts of <c>results.json</c> value by value, in the file's own order. Numbers are written there in the shortest form that comes
/// back to the same bits, so equal texts are equal bits. The hash over the figures, which only repeats what differs, comes last.
/// </summary>
public sealed class ResultsComparison
{
    private const string Summary = "figures";

    // What names an item of a list, the most telling first.
    private static readonly string[][] s_names =
    [
        ["limit"], ["code", "subject"], ["measure", "confidence", "horizonDays"], ["factor", "date"], ["file"], ["date"],
        ["book", "instrument"], ["book", "factor", "measure"], ["book", "confidence"], ["book"], ["horizonDays"], ["probability"],
    ];

    private readonly List<ValueDifference> _differences = [];

    private ResultsComparison()
    {
    }

    /// <summary>Values that were compared.</summary>
    public int Values { get; private set; }

    /// <summary>Those that differ, in the file's order.</summary>
    public IReadOnlyList<ValueDifference> Differences => _differences;

    /// <summary>Compares.</summary>
    public static ResultsComparison Of(string recorded, string computed)
    {
        using var one = JsonDocument.Parse(recorded);
        using var other = JsonDocument.Parse(computed);
        var comparison = new ResultsComparison();
        comparison.Objects("", one.RootElement, other.RootElement, name => name != Summary);
        comparison.Objects("", one.RootElement, other.RootElement, name => name == Summary);
        return comparison;
    }

    /// <summary>The number that a JSON text is, or null.</summary>
    internal static double? NumberOf(string? json) =>
        json is not null && double.TryParse(json, NumberStyles.Float, CultureInfo.InvariantCulture, out var number) ? number : null;

    private void Compare(string path, JsonElement recorded, JsonElement computed)
    {
        if (recorded.ValueKind != computed.ValueKind) Single(path, recorded, computed);
        else if (recorded.ValueKind == JsonValueKind.Object) Objects(path + ".", recorded, computed, _ => true);
        else if (recorded.ValueKind == JsonValueKind.Array) Arrays(path, recorded, computed);
        else Single(path, recorded, computed);
    }

    private void Single(string path, JsonElement recorded, JsonElement computed)
    {
        Values++;
        if (!recorded.GetRawText().Equals(computed.GetRawText(), StringComparison.Ordinal)) _differences.Add(new(path, Text(recorded), Text(computed)));
    }

    private void Objects(string path, JsonElement recorded, JsonElement computed, Func<string, bool> isMeant)
    {
        foreach (var property in recorded.EnumerateObject().Where(p => isMeant(p.Name)))
        {
            if (computed.TryGetProperty(property.Name, out var other)) Compare(path + property.Name, property.Value, other);
            else _differences.Add(new(path + property.Name, Text(property.Value), null));
        }
        foreach (var property in computed.EnumerateObject().Where(p => isMeant(p.Name) && !recorded.TryGetProperty(p.Name, out _)))
            _differences.Add(new(path + property.Name, null, Text(property.Value)));
    }

    private void Arrays(string path, JsonElement recorded, JsonElement computed)
    {
        var (one, other) = (recorded.GetArrayLength(), computed.GetArrayLength());
        for (var i = 0; i < Math.Min(one, other); i++) Compare($"{path}[{NameOf(recorded[i]) ?? i.ToString(CultureInfo.InvariantCulture)}]", recorded[i], computed[i]);
        if (one != other) _differences.Add(new(path, Items(one), Items(other)));
    }

    private static string? NameOf(JsonElement item)
    {
        if (item.ValueKind != JsonValueKind.Object) return null;
        var keys = Array.Find(s_names, keys => keys.All(key => item.TryGetProperty(key, out _)));
        return keys is null ? null : string.Join(' ', keys.Select(key => item.GetProperty(key).ToString()));
    }

    private static string Text(JsonElement value) => value.ValueKind switch
    {
        JsonValueKind.Array => Items(value.GetArrayLength()),
        JsonValueKind.Object => "an object",
        _ => value.GetRawText(),
    };

    private static string Items(int count) => count == 1 ? "1 item" : $"{count} items";
}
