using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing;

/// <summary>
/// Values bound instruments one at a time, at given levels and date. The option formula is the scalar twin of the batch kernel,
/// so a base value here equals a scenario with no move to the last bit.
/// </summary>
public static class Valuer
{
    /// <summary>Value of one unit held, in the instrument's currency. NaN where a level that it needs is NaN.</summary>
    /// <param name="bound">The instrument; must not have expired before <paramref name="date"/>.</param>
    /// <param name="levels">Level of every factor.</param>
    /// <param name="date">Valuation date.</param>
    public static double ValueOf(in BoundInstrument bound, ReadOnlySpan<double> levels, DateOnly date) => bound.Shape switch
    {
        PayoffShape.Cash => bound.Multiplier,
        PayoffShape.Spot => bound.Multiplier * bound.Underlying.LevelOf(levels),
        PayoffShape.Future => 0,
        PayoffShape.Forward => bound.Multiplier * ForwardValue(bound, bound.Underlying.LevelOf(levels), bound.YearsFrom(date)),
        _ => bound.Multiplier * OptionValue(bound, levels, date),
    };

    /// <summary>
    /// Profit of one unit held from <paramref name="before"/> to <paramref name="after"/>, in the instrument's currency: the change of value,
    /// and for a future the change of its price.
    /// </summary>
    public static double ProfitOf(in BoundInstrument bound, ReadOnlySpan<double> before, DateOnly beforeDate, ReadOnlySpan<double> after, DateOnly afterDate) =>
        bound.Shape == PayoffShape.Future
            ? bound.Multiplier * (bound.Underlying.LevelOf(after) - bound.Underlying.LevelOf(before))
            : ValueOf(bound, after, afterDate) - ValueOf(bound, before, beforeDate);

    /// <summary>What one unit held stands for in the market: its value, and for a future its price.</summary>
    public static double ExposureOf(in BoundInstrument bound, ReadOnlySpan<double> levels, DateOnly date) =>
        bound.Shape == PayoffShape.Future ? bound.Multiplier * bound.Underlying.LevelOf(levels) : ValueOf(bound, levels, date);

    /// <summary>e^(-q T): units of the underlying that a forward of time <paramref name="years"/> holds.</summary>
    public static double ForwardUnits(in BoundInstrument bound, double years) => Exponential.Of(-bound.Carry * years);

    /// <summary>The terms of an option at <paramref name="spot"/>, for scenarios that move it by log-returns.</summary>
    public static EuropeanOptionTerms OptionTerms(in BoundInstrument bound, double spot, double years, double volatility) =>
        new(spot, bound.Strike, years, volatility, bound.Rate, bound.Rate - bound.Carry, bound.IsCall);

    /// <summary>Value of one option before its multiplier: the flat or the factor's volatility, each by its own kernel.</summary>
    public static double OptionValue(in BoundInstrument bound, double spot, double years, double volatility)
    {
        var terms = OptionTerms(bound, spot, years, volatility);
        return bound.VolatilityFactor < 0 ? EuropeanOption.Value(terms, 0, spot) : EuropeanOption.Value(terms, 0, spot, volatility);
    }

    private static double ForwardValue(in BoundInstrument bound, double spot, double years) =>
        (spot * ForwardUnits(bound, years)) - (bound.Strike * Exponential.Of(-bound.Rate * years));

    private static double OptionValue(in BoundInstrument bound, ReadOnlySpan<double> levels, DateOnly date)
    {
        var spot = bound.Underlying.LevelOf(levels);
        var volatility = bound.VolatilityFactor < 0 ? bound.Volatility : levels[bound.VolatilityFactor];
        return !(spot > 0) || !(volatility >= 0) ? double.NaN : OptionValue(bound, spot, bound.YearsFrom(date), volatility);
    }
}
