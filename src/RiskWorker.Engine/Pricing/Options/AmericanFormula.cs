using RiskWorker.Numerics.Options;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>A plain option that may be exercised at any time up to its expiry.</summary>
public sealed class AmericanFormula(double strike, double years, bool isCall) : NumericFormula
{
    /// <inheritdoc/>
    public override void Price(double discount, double carry, double deviation, ReadOnlySpan<double> spots, Span<double> values, Span<double> standardErrors)
    {
        OptionAt(discount, carry, deviation).Value(spots, values);
        standardErrors.Clear();
    }

    /// <inheritdoc/>
    public override double? ExerciseSpot(double discount, double carry, double deviation) => OptionAt(discount, carry, deviation).ExerciseSpot;

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => [7, strike, years, isCall ? 1 : 0];

    // At the close of its last day nothing but the intrinsic value is left, whatever the rates.
    private AmericanOption OptionAt(double discount, double carry, double deviation) => years > 0
        ? new(strike, years, deviation / Math.Sqrt(years), discount / years, carry / years, isCall)
        : new(strike, 0, 0, 0, 0, isCall);
}
