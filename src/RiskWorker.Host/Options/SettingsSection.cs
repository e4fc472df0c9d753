using System.Text.Json;

namespace RiskWorker.Host.Options;

/// <summary>An object of the settings. Opening it finds unknown and repeated keys.</summary>
public sealed class SettingsSection
{
    private readonly Dictionary<string, SettingsValue> _values = new(StringComparer.Ordinal);
    private readonly List<SettingsFault> _faults;
    private readonly string _path;

    /// <summary>Opens <paramref name="element"/>, which is an object.</summary>
    /// <param name="element">The object.</param>
    /// <param name="path">Its JSON path; empty for the file itself.</param>
    /// <param name="faults">Where faults go.</param>
    /// <param name="keys">The keys that it may have, or null where they are names of the writer's own.</param>
    public SettingsSection(JsonElement element, string path, List<SettingsFault> faults, IReadOnlyList<string>? keys)
    {
        (_path, _faults) = (path, faults);
        var members = new List<(string, SettingsValue)>();
        foreach (var property in element.EnumerateObject())
        {
            var place = Place(property.Name);
            var value = new SettingsValue(property.Value, place, faults);
            if (keys is not null && !keys.Contains(property.Name, StringComparer.Ordinal)) faults.Add(Unknown(place, property.Name, keys));
            else if (keys is null && string.IsNullOrWhiteSpace(property.Name)) faults.Add(new(place, "an empty name", "a name"));
            else if (_values.TryAdd(property.Name, value)) members.Add((property.Name, value));
            else faults.Add(new(place, "the key a second time", "each key once"));
        }
        Members = members;
    }

    /// <summary>Keys and values in the order of the file, faulty keys left out.</summary>
    public IReadOnlyList<(string Name, SettingsValue Value)> Members { get; }

    /// <summary>The value at <paramref name="key"/>, or null where the key is absent.</summary>
    public SettingsValue? this[string key] => _values.TryGetValue(key, out var value) ? value : null;

    /// <summary>The value at <paramref name="key"/>; its absence is a fault.</summary>
    public SettingsValue? Required(string key, string expected)
    {
        if (this[key] is { } value) return value;
        _faults.Add(new(Place(key), "nothing", expected));
        return null;
    }

    private string Place(string key)
    {
        var simple = key.Length > 0 && key.All(c => char.IsAsciiLetterOrDigit(c) || c is '_' or '-');
        if (!simple) return $"{_path}[\"{Printable.Of(key, 60)}\"]";
        return _path.Length == 0 ? key : $"{_path}.{key}";
    }

    private static SettingsFault Unknown(string place, string key, IReadOnlyList<string> keys)
    {
        var meant = NearestKey.Of(key, keys);
        var expected = keys.Count == 0 ? "no key here" : "one of " + string.Join(", ", keys);
        return new(place, "an unknown key", meant is null ? expected : $"{expected}; did you mean '{meant}'?");
    }
}
