namespace RiskWorker.Domain.Runs;

/// <summary>What the choices behind a run's figures do to the measures of the top node, each tried once on the same few draws.</summary>
public sealed record RunEffects
{
    /// <summary>Scenarios that every comparison stands on.</summary>
    public required int Scenarios { get; init; }

    /// <summary>The measures with one choice made otherwise.</summary>
    public IReadOnlyList<ChoiceEffect> Choices { get; init; } = [];

    /// <summary>The measures with the factors of one class moving alone, by class; empty where only one class moves.</summary>
    public IReadOnlyList<ClassEffect> Classes { get; init; } = [];

    /// <summary>Measures of more than one day beside those of one day times the root of the days.</summary>
    public IReadOnlyList<RootOfTime> RootsOfTime { get; init; } = [];

    /// <summary>What filled days do to a factor's volatility and correlation; empty where none was filled.</summary>
    public IReadOnlyList<FillEffect> Fills { get; init; } = [];
}

/// <summary>A choice made otherwise.</summary>
/// <param name="Choice">What was chosen.</param>
/// <param name="Instead">What was tried in its place.</param>
/// <param name="Measures">The measures both ways.</param>
public sealed record ChoiceEffect(string Choice, string Instead, IReadOnlyList<PairedMeasure> Measures);

/// <summary>A measure of the top node, in its currency, as it is and otherwise, on the same draws.</summary>
public readonly record struct PairedMeasure(MeasureSpec Spec, double Value, double Otherwise);

/// <summary>The measures of the top node with only the factors of one class moving.</summary>
public sealed record ClassEffect(Market.FactorClass Class, IReadOnlyList<PairedMeasure> Measures);

/// <summary>A measure as simulated, and the same of one day times the root of its days: a comparison, never a figure of the report.</summary>
/// <param name="Spec">The measure, of more than one day.</param>
/// <param name="Simulated">As it was measured.</param>
/// <param name="Scaled">That of one day times the root of the days.</param>
public readonly record struct RootOfTime(MeasureSpec Spec, double Simulated, double Scaled);

/// <summary>What filling a factor's missing days from its proxy does, over the same window, equal weights.</summary>
/// <param name="Factor">The factor.</param>
/// <param name="Proxy">Whose moves stand in.</param>
/// <param name="Days">Days filled.</param>
/// <param name="Share">Those days as a fraction of the window.</param>
/// <param name="Volatility">Standard deviation of its daily shocks with the filled days.</param>
/// <param name="OwnVolatility">That of its own days alone; null where it has fewer than two.</param>
/// <param name="Other">The factor whose correlation with it changes most.</param>
/// <param name="Correlation">Correlation with that factor with the filled days.</param>
/// <param name="OwnCorrelation">The same on its own days alone.</param>
public sealed record FillEffect(string Factor, string Proxy, int Days, double Share, double Volatility, double? OwnVolatility, string? Other, double? Correlation, double? OwnCorrelation);
