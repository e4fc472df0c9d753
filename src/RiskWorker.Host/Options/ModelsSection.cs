using RiskWorker.Domain.Runs;

namespace RiskWorker.Host.Options;

/// <summary>Reads <c>models</c>, <c>record</c> and <c>challengers</c>: the models by name, which of them is the one of record, and which run beside it.</summary>
public static class ModelsSection
{
    /// <summary>Reads the models; without any there is one, the default, named after its kind.</summary>
    public static IReadOnlyDictionary<string, ModelSettings> Read(SettingsSection root)
    {
        var models = new SortedDictionary<string, ModelSettings>(StringComparer.Ordinal);
        var stressed = new List<(string Name, SettingsValue? Base)>();
        foreach (var (name, value) in root["models"]?.Named() ?? [])
        {
            models[name] = ModelSection.Read(name, value, out var calibrated);
            if (models[name].Kind == ModelKind.Stressed) stressed.Add((name, calibrated));
        }
        foreach (var (name, calibrated) in stressed) models[name] = models[name] with { Stressed = Calibrated(calibrated, models) };
        if (models.Count == 0) models[new ModelSettings().Name] = new();
        return models;
    }

    /// <summary>The model of record: the one named, or the only one there is.</summary>
    public static ModelSettings Record(SettingsSection root, IReadOnlyDictionary<string, ModelSettings> models)
    {
        var expected = Expected(models);
        var named = (models.Count > 1 ? root.Required("record", expected) : root["record"])?.Text(expected);
        if (named is null) return models.Values.First();
        if (models.TryGetValue(named, out var model)) return model;
        root["record"]!.Value.Fault(expected);
        return models.Values.First();
    }

    /// <summary>The models that run beside the one of record, in the order of their names.</summary>
    public static IReadOnlyList<ModelSettings> Challengers(SettingsSection root, IReadOnlyDictionary<string, ModelSettings> models, ModelSettings record)
    {
        var found = new SortedDictionary<string, ModelSettings>(StringComparer.Ordinal);
        foreach (var item in root["challengers"]?.Items() ?? [])
        {
            if (item.Text(Expected(models)) is not { } name) continue;
            if (!models.TryGetValue(name, out var model)) item.Fault(Expected(models));
            else if (name == record.Name) item.Fault("another model than the one of record");
            else if (!found.TryAdd(name, model)) item.Fault("each challenger once");
        }
        return [.. found.Values];
    }

    private static string Expected(IReadOnlyDictionary<string, ModelSettings> models) => "the name of a model: " + string.Join(", ", models.Keys);

    // Which span is worst can be searched only for what is calibrated to a history.
    private static ModelSettings? Calibrated(SettingsValue? named, SortedDictionary<string, ModelSettings> models)
    {
        string[] fit = [.. models.Where(m => m.Value is { Kind: not ModelKind.Stressed, Covariance: not CovarianceEstimator.Given }).Select(m => m.Key)];
        var expected = fit.Length == 0 ? "the name of a model that is calibrated to the history; there is none" : "the name of a model that is calibrated to the history: " + string.Join(", ", fit);
        if (named?.Text(expected) is not { } name) return null;
        if (fit.Contains(name, StringComparer.Ordinal)) return models[name];
        named.Value.Fault(expected);
        return null;
    }
}
