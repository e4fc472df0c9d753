namespace RiskWorker.Domain.Runs;

/// <summary>How a model distributes the joint moves of the factors.</summary>
public enum ModelKind
{
    /// <summary>Correlated normal shocks: log-normal prices.</summary>
    Lognormal,

    /// <summary>Multivariate Student-t shocks, or a t copula with t margins.</summary>
    StudentT,

    /// <summary>The joint moves of the days of the window, each one a scenario.</summary>
    Historical,

    /// <summary>The residuals of the days of the window, scaled to the volatility of today (Barone-Adesi, Giannopoulos and Vosper 1999).</summary>
    FilteredHistorical,

    /// <summary>Normal shocks and compound Poisson jumps (Merton 1976).</summary>
    JumpDiffusion,

    /// <summary>Another model, calibrated to the span of the history that is worst for the top node.</summary>
    Stressed,
}

/// <summary>How settings, exports and reports spell a <see cref="ModelKind"/>.</summary>
public static class ModelKinds
{
    private static readonly Dictionary<string, ModelKind> s_byName = new(StringComparer.Ordinal)
    {
        ["lognormal"] = ModelKind.Lognormal,
        ["student-t"] = ModelKind.StudentT,
        ["historical"] = ModelKind.Historical,
        ["filtered-historical"] = ModelKind.FilteredHistorical,
        ["jump-diffusion"] = ModelKind.JumpDiffusion,
        ["stressed"] = ModelKind.Stressed,
    };

    private static readonly Dictionary<ModelKind, string> s_byKind = s_byName.ToDictionary(p => p.Value, p => p.Key);

    /// <summary>The kinds by their names.</summary>
    public static IReadOnlyDictionary<string, ModelKind> ByName => s_byName;

    /// <summary>The name of <paramref name="kind"/>.</summary>
    public static string NameOf(ModelKind kind) => s_byKind[kind];
}

/// <summary>Margins of a Student-t model.</summary>
public enum StudentMargins
{
    /// <summary>One number of degrees of freedom for all factors: the multivariate t.</summary>
    Common,

    /// <summary>Each factor its own degrees of freedom, joined by a t copula.</summary>
    Own,
}

/// <summary>What says how volatile each day of a history was.</summary>
public enum VolatilityFilter
{
    /// <summary>Exponentially weighted squares.</summary>
    Ewma,

    /// <summary>A GARCH(1,1) fitted by maximum likelihood (Bollerslev 1986).</summary>
    Garch,
}
