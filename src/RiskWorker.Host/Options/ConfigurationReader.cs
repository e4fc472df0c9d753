using System.Text.Json;

namespace RiskWorker.Host.Options;

/// <summary>Reads <c>riskworker.json</c>. The whole file is checked before anything starts, and all its faults come in one answer.</summary>
public static class ConfigurationReader
{
    /// <summary>Name of the settings file in its folder.</summary>
    public const string FileName = "riskworker.json";

    private static readonly string[] s_keys =
        ["store", "timeEffects", "models", "record", "challengers", "measures", "rules", "simulation", "curves", "backfill", "checks", "schedules", "evidence", "delivery", "page"];

    private const int LongestBackfill = 5_000;
    private static readonly Dictionary<string, bool> s_timeEffects = new(StringComparer.Ordinal) { ["excluded"] = false, ["included"] = true };

    /// <summary>Reads the settings of <paramref name="folder"/>; a folder without the file has the defaults.</summary>
    /// <exception cref="SettingsException">The folder is not there, the file cannot be read, or it has faults.</exception>
    public static async Task<Configuration> ReadAsync(string folder, CancellationToken cancellationToken)
    {
        if (!Directory.Exists(folder)) throw new SettingsException("--config", [new("--config", $"'{Printable.Of(folder)}'", "a folder that exists")]);
        var file = Path.Combine(folder, FileName);
        if (!Path.Exists(file)) return new();
        try
        {
            return Read(await File.ReadAllBytesAsync(file, cancellationToken), file);
        }
        catch (Exception refusal) when (refusal is IOException or UnauthorizedAccessException)
        {
            throw new SettingsException(file, [new(FileName, "a file that cannot be read", $"a readable file ({refusal.Message})")]);
        }
    }

    /// <summary>Reads settings from their bytes, UTF-8 with or without a byte order mark.</summary>
    /// <param name="json">The bytes.</param>
    /// <param name="source">What a message calls them.</param>
    /// <exception cref="SettingsException">They have faults.</exception>
    public static Configuration Read(ReadOnlyMemory<byte> json, string source)
    {
        var faults = new List<SettingsFault>();
        Configuration? configuration = null;
        using (var document = SettingsDocument.Parse(json, faults))
        {
            if (document is not null) configuration = Sections(document.RootElement, faults);
        }
        return faults.Count == 0 ? configuration! : throw new SettingsException(source, faults);
    }

    private static Configuration? Sections(JsonElement file, List<SettingsFault> faults)
    {
        if (file.ValueKind != JsonValueKind.Object)
        {
            new SettingsValue(file, "$", faults).Fault("an object");
            return null;
        }
        var root = new SettingsSection(file, "", faults, s_keys);
        var models = ModelsSection.Read(root);
        var record = ModelsSection.Record(root, models);
        root["delivery"]?.Section(); // reserved: nothing can be set in them yet
        root["page"]?.Section();
        return new()
        {
            Models = models,
            StorePath = StoreSection.Read(root["store"]),
            BackfillDays = root["backfill"]?.Whole(0, LongestBackfill) ?? 0,
            Schedules = SchedulesSection.Read(root["schedules"]),
            Signing = EvidenceSection.Read(root["evidence"]),
            Written = new()
            {
                Model = record,
                Challengers = ModelsSection.Challengers(root, models, record),
                Measures = MeasuresSection.Read(root["measures"]),
                Simulation = SimulationSection.Read(root["simulation"]),
                Checks = ChecksSection.Read(root["checks"]),
                CurveInterpolation = CurvesSection.Read(root["curves"]),
                Rules = RulesSection.Read(root["rules"]),
                TimeEffectsIncluded = root["timeEffects"]?.Choice(s_timeEffects) ?? false,
            },
        };
    }
}
