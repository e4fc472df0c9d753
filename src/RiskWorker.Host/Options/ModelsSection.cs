using RiskWorker.Domain.Runs;

namespace RiskWorker.Host.Options;

/// <summary>Reads <c>models</c>, <c>record</c> and <c>challengers</c>: the models by name and which of them is the one of record.</summary>
public static class ModelsSection
{
    private const double LargestDrift = 10;
    private const int LongestWindow = 100_000;

    private static readonly Dictionary<string, AgeingKind> s_ageing = new(StringComparer.Ordinal) { ["none"] = AgeingKind.None, ["horizon"] = AgeingKind.Horizon };

    private static readonly Dictionary<string, CovarianceEstimator> s_covariances = new(StringComparer.Ordinal)
    {
        ["ewma"] = CovarianceEstimator.Ewma,
        ["equal"] = CovarianceEstimator.Equal,
        ["given"] = CovarianceEstimator.Given,
    };

    private static readonly Dictionary<string, DriftKind> s_drifts = new(StringComparer.Ordinal)
    {
        ["zero"] = DriftKind.Zero,
        ["historical"] = DriftKind.Historical,
        ["explicit"] = DriftKind.Explicit,
    };

    /// <summary>Reads the models; without any there is one, the default, named after its kind.</summary>
    public static IReadOnlyDictionary<string, ModelSettings> Read(SettingsSection root)
    {
        var models = new SortedDictionary<string, ModelSettings>(StringComparer.Ordinal);
        foreach (var (name, value) in root["models"]?.Named() ?? []) models[name] = Model(name, value);
        if (models.Count == 0) models[new ModelSettings().Name] = new();
        return models;
    }

    /// <summary>The model of record: the one named, or the only one there is.</summary>
    public static ModelSettings Record(SettingsSection root, IReadOnlyDictionary<string, ModelSettings> models)
    {
        foreach (var challenger in root["challengers"]?.Items() ?? []) challenger.Fault("no challenger: challenger models are not available in this version");
        var expected = "the name of a model: " + string.Join(", ", models.Keys);
        var named = (models.Count > 1 ? root.Required("record", expected) : root["record"])?.Text(expected);
        if (named is null) return models.Values.First();
        if (models.TryGetValue(named, out var model)) return model;
        root["record"]!.Value.Fault(expected);
        return models.Values.First();
    }

    private static ModelSettings Model(string name, SettingsValue value)
    {
        var defaults = new ModelSettings { Name = name };
        if (value.Section("kind", "covariance", "lambda", "window", "drift", "drifts", "ageing") is not { } section) return defaults;
        CheckKind(section["kind"], defaults.Kind);
        var model = defaults with
        {
            Covariance = section["covariance"]?.Choice(s_covariances, "shrunk") ?? defaults.Covariance,
            Lambda = section["lambda"]?.Number(l => l is > 0 and < 1, "a number strictly between 0 and 1") ?? defaults.Lambda,
            Window = section["window"]?.Whole(2, LongestWindow) ?? defaults.Window,
            Drift = section["drift"]?.Choice(s_drifts) ?? defaults.Drift,
            Drifts = Drifts(section),
            Ageing = section["ageing"]?.Choice(s_ageing) ?? defaults.Ageing,
        };
        CheckDriftsAreUsed(section, model);
        return model;
    }

    private static void CheckKind(SettingsValue? value, string kind)
    {
        if (value is { } given && given.Text(kind) is { } text && text != kind) given.Fault($"{kind}; other kinds of model are not available in this version");
    }

    private static void CheckDriftsAreUsed(SettingsSection section, ModelSettings model)
    {
        if (model.Drift == DriftKind.Explicit) section.Required("drifts", "returns per year by factor, which drift 'explicit' needs");
        else section["drifts"]?.Fault("no drifts, which only drift 'explicit' uses");
    }

    private static SortedDictionary<string, double> Drifts(SettingsSection section)
    {
        var drifts = new SortedDictionary<string, double>(StringComparer.Ordinal);
        foreach (var (factor, value) in section["drifts"]?.Named() ?? [])
        {
            if (value.Number(d => Math.Abs(d) <= LargestDrift, $"a return per year from -{LargestDrift} to {LargestDrift}") is { } drift) drifts[factor] = drift;
        }
        return drifts;
    }
}
