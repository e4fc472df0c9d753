using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Checks;

namespace RiskWorker.Host.Options;

/// <summary>Reads <c>checks</c>: thresholds and severities.</summary>
public static class ChecksSection
{
    private static readonly Dictionary<string, FindingSeverity> s_severities = new(StringComparer.Ordinal)
    {
        ["blocking"] = FindingSeverity.Blocking,
        ["warning"] = FindingSeverity.Warning,
    };

    /// <summary>Reads the section; absent means the defaults.</summary>
    public static CheckSettings Read(SettingsValue? value)
    {
        var defaults = new CheckSettings();
        if (value?.Section("staleDays", "jumpSigmas", "minimumHistory", "valueTolerance", "grossChange", "severity") is not { } section) return defaults;
        return defaults with
        {
            StaleDays = section["staleDays"]?.Whole(1, 1_000) ?? defaults.StaleDays,
            JumpSigmas = section["jumpSigmas"]?.Number(s => s is > 0 and <= 1_000, "a number above 0, at most 1,000") ?? defaults.JumpSigmas,
            MinimumHistory = section["minimumHistory"]?.Whole(2, 100_000) ?? defaults.MinimumHistory,
            ValueTolerance = section["valueTolerance"]?.Number(t => t >= 0, "a number of at least 0") ?? defaults.ValueTolerance,
            GrossChange = section["grossChange"]?.Number(g => g > 0, "a number above 0") ?? defaults.GrossChange,
            Severity = Severities(section["severity"]),
        };
    }

    private static SortedDictionary<string, FindingSeverity> Severities(SettingsValue? value)
    {
        var severities = new SortedDictionary<string, FindingSeverity>(StringComparer.Ordinal);
        foreach (var (code, severity) in value?.Named() ?? [])
        {
            if (Refusal(code) is { } expected) severity.Fault(expected);
            else if (severity.Choice(s_severities) is { } chosen) severities[code] = chosen;
        }
        return severities;
    }

    /// <summary>What was expected in place of <paramref name="code"/>; null where its severity may be set.</summary>
    private static string? Refusal(string code)
    {
        var known = FindingCodes.All.FirstOrDefault(c => c.Code == code);
        if (known is { IsFixed: true }) return "nothing here: nothing can be computed past this finding, so it always blocks";
        if (known is not null) return null;
        var nearest = NearestKey.Of(code, FindingCodes.All.Select(c => c.Code));
        return "a code from the README's table of findings" + (nearest is null ? "" : $"; did you mean '{nearest}'?");
    }
}
