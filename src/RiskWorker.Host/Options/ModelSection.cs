using RiskWorker.Domain.Runs;

namespace RiskWorker.Host.Options;

/// <summary>Reads one model of <c>models</c>: each kind has keys of its own, and none of another's.</summary>
internal static class ModelSection
{
    private const double LargestDrift = 10;
    private const int LongestWindow = 100_000;
    private const double FewestFreedom = 2.05;
    private const double MostFreedom = 1_000;

    private static readonly string[] s_covarianceKeys = ["kind", "covariance", "lambda", "window", "drift", "drifts", "missingDays"];

    private static readonly Dictionary<ModelKind, string[]> s_keys = new()
    {
        [ModelKind.Lognormal] = [.. s_covarianceKeys, "ageing"],
        [ModelKind.StudentT] = [.. s_covarianceKeys, "degreesOfFreedom", "margins"],
        [ModelKind.Historical] = ["kind", "window", "ageWeight"],
        [ModelKind.FilteredHistorical] = ["kind", "window", "lambda", "volatility"],
        [ModelKind.JumpDiffusion] = [.. s_covarianceKeys, "jumps"],
        [ModelKind.Stressed] = ["kind", "model", "span"],
    };

    private static readonly Dictionary<string, AgeingKind> s_ageing = new(StringComparer.Ordinal) { ["none"] = AgeingKind.None, ["horizon"] = AgeingKind.Horizon };

    private static readonly Dictionary<string, CovarianceEstimator> s_covariances = new(StringComparer.Ordinal)
    {
        ["ewma"] = CovarianceEstimator.Ewma,
        ["equal"] = CovarianceEstimator.Equal,
        ["shrunk"] = CovarianceEstimator.Shrunk,
        ["given"] = CovarianceEstimator.Given,
    };

    private static readonly Dictionary<string, DriftKind> s_drifts = new(StringComparer.Ordinal)
    {
        ["zero"] = DriftKind.Zero,
        ["historical"] = DriftKind.Historical,
        ["explicit"] = DriftKind.Explicit,
    };

    private static readonly Dictionary<string, MissingDays> s_missing = new(StringComparer.Ordinal) { ["complete"] = MissingDays.Complete, ["pairwise"] = MissingDays.Pairwise };
    private static readonly Dictionary<string, StudentMargins> s_margins = new(StringComparer.Ordinal) { ["common"] = StudentMargins.Common, ["own"] = StudentMargins.Own };
    private static readonly Dictionary<string, VolatilityFilter> s_filters = new(StringComparer.Ordinal) { ["ewma"] = VolatilityFilter.Ewma, ["garch"] = VolatilityFilter.Garch };

    /// <summary>Reads the model called <paramref name="name"/>.</summary>
    /// <param name="name">Its name.</param>
    /// <param name="value">Its object.</param>
    /// <param name="calibrated">Where a stressed model names the one that it calibrates; null for the other kinds and where nothing stands.</param>
    public static ModelSettings Read(string name, SettingsValue value, out SettingsValue? calibrated)
    {
        calibrated = null;
        var defaults = new ModelSettings { Name = name };
        if (value.Section([.. s_keys.Values.SelectMany(k => k).Distinct()]) is not { } section) return defaults;
        var kind = section["kind"]?.Choice(ModelKinds.ByName) ?? ModelKind.Lognormal;
        RefuseOthersKeys(section, kind);
        var model = defaults with
        {
            Kind = kind,
            Covariance = section["covariance"]?.Choice(s_covariances) ?? defaults.Covariance,
            Lambda = Decay(section["lambda"]) ?? defaults.Lambda,
            Window = section["window"]?.Whole(2, LongestWindow) ?? defaults.Window,
            Drift = section["drift"]?.Choice(s_drifts) ?? defaults.Drift,
            Drifts = Drifts(section),
            MissingDays = section["missingDays"]?.Choice(s_missing) ?? defaults.MissingDays,
            DegreesOfFreedom = Freedom(section["degreesOfFreedom"]),
            Margins = section["margins"]?.Choice(s_margins) ?? defaults.Margins,
            AgeWeight = Decay(section["ageWeight"]),
            Volatility = section["volatility"]?.Choice(s_filters) ?? defaults.Volatility,
            Jumps = section["jumps"] is { } jumps ? JumpsSection.Read(jumps) : defaults.Jumps,
            Span = section["span"]?.Whole(20, LongestWindow) ?? defaults.Span,
            Ageing = section["ageing"]?.Choice(s_ageing) ?? defaults.Ageing,
        };
        CheckDriftsAreUsed(section, model);
        if (kind == ModelKind.Stressed) calibrated = section.Required("model", "the name of the model to calibrate to the worst span");
        return model;
    }

    private static void RefuseOthersKeys(SettingsSection section, ModelKind kind)
    {
        foreach (var (key, value) in section.Members)
        {
            if (!s_keys[kind].Contains(key, StringComparer.Ordinal))
                value.Fault($"no '{key}', which a model of kind '{ModelKinds.NameOf(kind)}' does not use; it has {string.Join(", ", s_keys[kind])}");
        }
    }

    private static double? Decay(SettingsValue? value) => value?.Number(l => l is > 0 and < 1, "a number strictly between 0 and 1");

    private static double? Freedom(SettingsValue? value) => value is { IsNull: false } given ? given.Number(n => n is >= FewestFreedom and <= MostFreedom, $"a number from {FewestFreedom} to {MostFreedom:N0}, or null to have it fitted") : null;

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
