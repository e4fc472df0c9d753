using RiskWorker.Domain.Runs;

namespace RiskWorker.Host.Options;

/// <summary>Reads <c>measures</c>: what is computed for every node.</summary>
public static class MeasuresSection
{
    private const int LongestHorizon = 2_520;
    private const int Most = 50;

    private static readonly Dictionary<string, MeasureKind> s_kinds = new(StringComparer.Ordinal)
    {
        ["var"] = MeasureKind.Var,
        ["es"] = MeasureKind.Es,
        ["les"] = MeasureKind.Les,
    };

    /// <summary>Reads the measures in their canonical order; absent means the defaults.</summary>
    public static IReadOnlyList<MeasureSpec> Read(SettingsValue? value)
    {
        if (value is not { } given) return new RunSettings().Measures;
        var items = given.Items();
        if (items.Count > Most) given.Fault($"at most {Most} measures");
        var measures = new SortedSet<MeasureSpec>();
        foreach (var item in items)
        {
            if (Measure(item) is { } measure && !measures.Add(measure)) item.Fault($"each measure once; {measure} is there already");
        }
        if (items.Count == 0) given.Fault("an array of at least one measure");
        return [.. measures];
    }

    private static MeasureSpec? Measure(SettingsValue item)
    {
        if (item.Section("measure", "confidence", "horizonDays") is not { } section) return null;
        var kind = section.Required("measure", "var, es or les")?.Choice(s_kinds);
        var confidence = section.Required("confidence", "a number strictly between 0 and 1")?.Fraction();
        var days = section["horizonDays"] is { } horizon ? horizon.Whole(1, LongestHorizon) : 1;
        return kind is null || confidence is null || days is null ? null : new(kind.Value, new(confidence.Value), new(days.Value));
    }
}
