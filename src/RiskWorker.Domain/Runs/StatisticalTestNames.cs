namespace RiskWorker.Domain.Runs;

/// <summary>The tests of backtest evidence by name.</summary>
public static class StatisticalTestNames
{
    /// <summary>Whether exceptions are as many as the confidence says.</summary>
    public const string KupiecFailures = "kupiec-failures";

    /// <summary>Whether the first exception came when it should.</summary>
    public const string KupiecFirstFailure = "kupiec-first-failure";

    /// <summary>Whether an exception makes one on the next day more or less likely.</summary>
    public const string ChristoffersenIndependence = "christoffersen-independence";

    /// <summary>Count and next-day independence together.</summary>
    public const string ChristoffersenConditional = "christoffersen-conditional";

    /// <summary>Count and times between exceptions together.</summary>
    public const string HaasMixed = "haas-mixed";

    /// <summary>Whether the chance of an exception depends on the time since the last.</summary>
    public const string Duration = "duration";

    /// <summary>Size of losses beyond VaR against expected shortfall, given exceptions.</summary>
    public const string AcerbiSzekelyZ1 = "acerbi-szekely-z1";

    /// <summary>Size and number of losses beyond VaR against expected shortfall.</summary>
    public const string AcerbiSzekelyZ2 = "acerbi-szekely-z2";

    /// <summary>Exceptions weighted by how far into the tail they lie.</summary>
    public const string CostanzinoCurran = "costanzino-curran";

    /// <summary>Largest distance of the distribution of forecast probabilities from the uniform one.</summary>
    public const string KolmogorovSmirnov = "kolmogorov-smirnov";

    /// <summary>The same with weight on the tails.</summary>
    public const string AndersonDarling = "anderson-darling";

    /// <summary>Mean, spread and autocorrelation of forecast probabilities as normals.</summary>
    public const string Berkowitz = "berkowitz";

    /// <summary>Mean and spread of the loss tail as censored normals.</summary>
    public const string BerkowitzTail = "berkowitz-tail";

    /// <summary>Rank correlation of hypothetical and risk-theoretical profit.</summary>
    public const string AttributionSpearman = "attribution-spearman";

    /// <summary>Largest distance of the distributions of hypothetical and risk-theoretical profit.</summary>
    public const string AttributionKolmogorovSmirnov = "attribution-kolmogorov-smirnov";

    /// <summary>All of them, in the order of a report.</summary>
    public static IReadOnlyList<string> All { get; } =
    [
        KupiecFailures, KupiecFirstFailure, ChristoffersenIndependence, ChristoffersenConditional, HaasMixed, Duration,
        AcerbiSzekelyZ1, AcerbiSzekelyZ2, CostanzinoCurran, KolmogorovSmirnov, AndersonDarling, Berkowitz, BerkowitzTail,
        AttributionSpearman, AttributionKolmogorovSmirnov,
    ];
}
