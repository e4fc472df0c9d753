using RiskWorker.Numerics.Options;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>A plain option that may be exercised at any time up to its expiry.</summary>
public sealed class AmericanFormula(double strike, double years, bool isCall) : NumericFormula
{
    /// <inheritdoc/>
    public override double? Kink => years > 0 ? null : strike;

    /// <inheritdoc/>
    public override EarlyExercise? Exercise => new(strike, isCall ? 1 : -1);

    /// <inheritdoc/>
    public override SpotPrices At(double discount, double carry, double deviation) => new Prices(OptionAt(discount, carry, Math.Max(deviation, 0)));

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => [7, strike, years, isCall ? 1 : 0];

    // At the close of its last day nothing but the intrinsic value is left, whatever the rates.
    private AmericanOption OptionAt(double discount, double carry, double deviation) => years > 0
        ? new(strike, years, deviation / Math.Sqrt(years), discount / years, carry / years, isCall)
        : new(strike, 0, 0, 0, 0, isCall);

    /// <summary>The exercise boundary is found once.</summary>
    private sealed class Prices(AmericanOption option) : SpotPrices
    {
        public override double? ExerciseSpot => option.ExerciseSpot;

        public override void Price(ReadOnlySpan<double> spots, Span<double> values, Span<double> standardErrors)
        {
            option.Value(spots, values);
            standardErrors.Clear();
        }
    }
}
