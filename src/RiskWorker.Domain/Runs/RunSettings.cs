using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Market;

namespace RiskWorker.Domain.Runs;

/// <summary>Everything in the settings that a run's figures may depend on; part of the snapshot and of its hash.</summary>
public sealed record RunSettings
{
    /// <summary>The model of record.</summary>
    public ModelSettings Model { get; init; } = new();

    /// <summary>Models that are run beside it, by name; their figures stand apart.</summary>
    public IReadOnlyList<ModelSettings> Challengers { get; init; } = [];

    /// <summary>Rule sets whose measures, window and models are among these settings, and whose limits are added to those of the feed.</summary>
    public IReadOnlyList<RuleChoice> Rules { get; init; } = [];

    /// <summary>The measures to compute, in the order of <see cref="MeasureSpec.CompareTo"/>; those that valid limits name are added by the run.</summary>
    public IReadOnlyList<MeasureSpec> Measures { get; init; } =
        [new(MeasureKind.Var, new(0.99m), new(1)), new(MeasureKind.Es, new(0.975m), new(1))];

    /// <summary>How many scenarios, from which seed, and how far looks may go.</summary>
    public SimulationSettings Simulation { get; init; } = new();

    /// <summary>Thresholds and severities of the checks.</summary>
    public CheckSettings Checks { get; init; } = new();

    /// <summary>Whether hypothetical profit moves the valuation date too.</summary>
    public bool TimeEffectsIncluded { get; init; }

    /// <summary>What curves are between two tenors.</summary>
    public CurveInterpolation CurveInterpolation { get; init; }
}
