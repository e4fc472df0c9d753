using RiskWorker.Numerics.Paths;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>An option on the path of its underlying, priced by exact log-normal steps; every one from the same draws.</summary>
/// <param name="seed">Seed of the run.</param>
/// <param name="years">Time to expiry, positive.</param>
/// <param name="payoffAt">The payoff under a rate and a yield, both per year.</param>
/// <param name="terms">Every number that the payoff depends on.</param>
/// <param name="kink">The spot at which the value bends; null where there is none.</param>
public sealed class PathFormula(ulong seed, double years, Func<double, double, PathPayoff> payoffAt, IReadOnlyList<double> terms, double? kink = null) : NumericFormula
{
    private readonly PathPricer _pricer = new(seed);

    /// <inheritdoc/>
    public override double? Kink => kink;

    /// <inheritdoc/>
    public override SpotPrices At(double discount, double carry, double deviation) =>
        new Prices(_pricer, payoffAt(discount / years, carry / years), Math.Max(deviation, 0) / Math.Sqrt(years));

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => [8, seed, years, .. terms];

    /// <summary>The payoff under its rates.</summary>
    private sealed class Prices(PathPricer pricer, PathPayoff payoff, double volatility) : SpotPrices
    {
        public override void Price(ReadOnlySpan<double> spots, Span<double> values, Span<double> standardErrors) =>
            pricer.Price(payoff, [volatility], spots, values, standardErrors);
    }
}
