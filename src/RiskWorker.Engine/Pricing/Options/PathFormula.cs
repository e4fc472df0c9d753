using RiskWorker.Numerics.Paths;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>An option on the path of its underlying, priced by exact log-normal steps; every one from the same draws.</summary>
/// <param name="seed">Seed of the run.</param>
/// <param name="years">Time to expiry, positive.</param>
/// <param name="payoffAt">The payoff under a rate and a yield, both per year.</param>
/// <param name="terms">Every number that the payoff depends on.</param>
public sealed class PathFormula(ulong seed, double years, Func<double, double, PathPayoff> payoffAt, IReadOnlyList<double> terms) : NumericFormula
{
    private readonly PathPricer _pricer = new(seed);

    /// <inheritdoc/>
    public override void Price(double discount, double carry, double deviation, ReadOnlySpan<double> spots, Span<double> values, Span<double> standardErrors) =>
        _pricer.Price(payoffAt(discount / years, carry / years), [deviation / Math.Sqrt(years)], spots, values, standardErrors);

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => [8, seed, years, .. terms];
}
