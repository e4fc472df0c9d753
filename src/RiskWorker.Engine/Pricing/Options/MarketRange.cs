using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>The box of market points that a table covers.</summary>
/// <param name="X">Log-return of the underlying; it always moves.</param>
/// <param name="Discount">rT.</param>
/// <param name="Carry">qT.</param>
/// <param name="Deviation">σ√T.</param>
public readonly record struct MarketRange(InputRange X, InputRange Discount, InputRange Carry, InputRange Deviation)
{
    /// <summary>Whether a scenario lies inside; a NaN does not.</summary>
    public bool Holds(in MarketPoint market) =>
        Band.Holds(market.X, X.Low, X.High) && Band.Holds(market.Discount, Discount.Low, Discount.High)
        && Band.Holds(market.Carry, Carry.Low, Carry.High) && Band.Holds(market.Deviation, Deviation.Low, Deviation.High);

    /// <summary>Whether every scenario does.</summary>
    public bool Holds(in MarketSpans market) =>
        Band.Holds(market.X, X.Low, X.High) && Band.Holds(market.Discount, Discount.Low, Discount.High)
        && Band.Holds(market.Carry, Carry.Low, Carry.High) && Band.Holds(market.Deviation, Deviation.Low, Deviation.High);

    /// <summary>Every number of the box.</summary>
    public IEnumerable<double> Numbers() =>
        [X.Centre, X.HalfWidth, Discount.Centre, Discount.HalfWidth, Carry.Centre, Carry.HalfWidth, Deviation.Centre, Deviation.HalfWidth];

    /// <summary>Guards a box that came from outside, and cuts its deviations off at 0.</summary>
    internal MarketRange Checked()
    {
        X.Require(nameof(X));
        Discount.Require(nameof(Discount));
        Carry.Require(nameof(Carry));
        Deviation.Require(nameof(Deviation));
        if (!X.Moves) throw new ArgumentOutOfRangeException(nameof(X), X.HalfWidth, "The half-width of X is 0; a table needs a range of log-returns.");
        if (!Deviation.Moves || Deviation.Low >= 0) return this;
        var high = Math.Max(Deviation.High, 0);
        return this with { Deviation = new(high / 2, high / 2) };
    }
}
