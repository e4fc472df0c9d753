using System.Globalization;
using System.Text.Json;

namespace RiskWorker.Host.Options;

/// <summary>
/// A value of the settings together with its place. Each reading method returns the value, or records a fault and returns null,
/// so that one pass finds every fault of the file.
/// </summary>
/// <param name="element">The JSON value.</param>
/// <param name="path">Its JSON path.</param>
/// <param name="faults">Where faults go.</param>
public readonly struct SettingsValue(JsonElement element, string path, List<SettingsFault> faults)
{
    private const int LongestExcerpt = 60;

    /// <summary>The JSON path.</summary>
    public string Path { get; } = path;

    /// <summary>Whether a JSON null stands here.</summary>
    public bool IsNull => element.ValueKind == JsonValueKind.Null;

    /// <summary>A whole number from <paramref name="low"/> to <paramref name="high"/>, both included.</summary>
    public int? Whole(int low, int high)
    {
        if (element.ValueKind == JsonValueKind.Number && element.TryGetInt32(out var value) && value >= low && value <= high) return value;
        Fault(string.Create(CultureInfo.InvariantCulture, $"a whole number from {low:N0} to {high:N0}"));
        return null;
    }

    /// <summary>A whole number of 64 bits without sign.</summary>
    public ulong? Unsigned()
    {
        if (element.ValueKind == JsonValueKind.Number && element.TryGetUInt64(out var value)) return value;
        Fault($"a whole number from 0 to {ulong.MaxValue}");
        return null;
    }

    /// <summary>A finite number that <paramref name="accepts"/> takes.</summary>
    public double? Number(Func<double, bool> accepts, string expected)
    {
        if (element.ValueKind == JsonValueKind.Number && element.TryGetDouble(out var value) && double.IsFinite(value) && accepts(value)) return value;
        Fault(expected);
        return null;
    }

    /// <summary>A number kept as the decimal that was typed, strictly between 0 and 1.</summary>
    public decimal? Fraction()
    {
        if (element.ValueKind == JsonValueKind.Number && element.TryGetDecimal(out var value) && value is > 0 and < 1) return value;
        Fault("a number strictly between 0 and 1");
        return null;
    }

    /// <summary>true or false.</summary>
    public bool? Flag()
    {
        if (element.ValueKind is JsonValueKind.True or JsonValueKind.False) return element.GetBoolean();
        Fault("true or false");
        return null;
    }

    /// <summary>Text that is not empty.</summary>
    public string? Text(string expected)
    {
        if (element.ValueKind == JsonValueKind.String && element.GetString() is { Length: > 0 } text) return text;
        Fault(expected);
        return null;
    }

    /// <summary>One of a few words, each standing for a value.</summary>
    /// <param name="words">Words and values.</param>
    /// <param name="later">Words that are known and refused with a sentence: this version does not have them.</param>
    public T? Choice<T>(IReadOnlyDictionary<string, T> words, params string[] later) where T : struct
    {
        var expected = "one of " + string.Join(", ", words.Keys);
        if (Text(expected) is not { } word) return null;
        if (words.TryGetValue(word, out var value)) return value;
        Fault(later.Contains(word, StringComparer.Ordinal) ? $"{expected}; '{word}' is not available in this version" : expected);
        return null;
    }

    /// <summary>An object with none but <paramref name="keys"/>.</summary>
    public SettingsSection? Section(params string[] keys)
    {
        if (element.ValueKind == JsonValueKind.Object) return new(element, Path, faults, keys);
        Fault("an object");
        return null;
    }

    /// <summary>An object whose keys are names of the writer's own.</summary>
    public IReadOnlyList<(string Name, SettingsValue Value)> Named()
    {
        if (element.ValueKind == JsonValueKind.Object) return new SettingsSection(element, Path, faults, null).Members;
        Fault("an object of names");
        return [];
    }

    /// <summary>The items of an array.</summary>
    public IReadOnlyList<SettingsValue> Items()
    {
        if (element.ValueKind != JsonValueKind.Array)
        {
            Fault("an array");
            return [];
        }
        var (place, found) = (Path, faults);
        return [.. element.EnumerateArray().Select((item, i) => new SettingsValue(item, $"{place}[{i}]", found))];
    }

    /// <summary>Records that something else was expected here.</summary>
    public void Fault(string expected) => Fault(expected, Excerpt());

    /// <summary>Records the same and says what stands here in words of its own: for values that must not be printed.</summary>
    public void Fault(string expected, string found) => faults.Add(new(Path, found, expected));

    private string Excerpt() => element.ValueKind switch
    {
        JsonValueKind.Object => element.EnumerateObject().Any() ? "an object" : "an empty object",
        JsonValueKind.Array => element.GetArrayLength() > 0 ? "an array" : "an empty array",
        _ => Printable.Of(element.GetRawText(), LongestExcerpt),
    };
}
