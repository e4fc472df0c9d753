using RiskWorker.Domain.Market;

namespace RiskWorker.Domain.Runs;

/// <summary>
/// What a small move of one factor does to the value of a node, children included, in the node's currency: a central difference of full
/// revaluations, all other factors held. A factor that moves nothing in a node has none there.
/// </summary>
/// <param name="Book">The node's book.</param>
/// <param name="Factor">The factor.</param>
/// <param name="Class">Its class.</param>
/// <param name="Curve">Its curve, or null.</param>
/// <param name="TenorYears">Its place on the curve in years, or null.</param>
/// <param name="Measure">What is moved, and by how much.</param>
/// <param name="Value">The sensitivity, in money.</param>
/// <param name="Gamma">For a <see cref="SensitivityMeasure.Delta"/>, how much it grows when the factor rises by another 1% of its level; null for the others.</param>
public sealed record Sensitivity(string Book, string Factor, FactorClass Class, string? Curve, double? TenorYears, SensitivityMeasure Measure, double Value, double? Gamma);

/// <summary>A move of a factor and the profit that it stands for; spelt in lower case outside.</summary>
public enum SensitivityMeasure
{
    /// <summary>Profit for +1% of the level: half of the profit at +1% less that at -1%.</summary>
    Delta,

    /// <summary>Profit for +0.01 of volatility: half of the profit at +0.01 less that at -0.01.</summary>
    Vega,

    /// <summary>Profit for a fall of a rate by one basis point: half of the profit at -0.0001 less that at +0.0001.</summary>
    Dv01,

    /// <summary>Profit for a fall of a credit spread by one basis point, likewise.</summary>
    Cs01,
}
