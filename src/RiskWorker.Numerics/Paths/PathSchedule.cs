using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Paths;

/// <summary>
/// The dates at which a path is looked at, the forward to each, and the discount factor of the payment: what all underlyings'
/// volatilities and spots share.
/// </summary>
public sealed class PathSchedule
{
    private readonly double[] years;
    private readonly double[] logForwards;

    /// <param name="years">Times from today, strictly ascending, the first 0 or more; at least one.</param>
    /// <param name="logForwards">ln(forward/spot) at each of them; as many, and 0 at time 0.</param>
    /// <param name="discount">Value today of one unit at the payment; positive.</param>
    /// <exception cref="ArgumentException">There is no date, a time does not ascend, a length or a number is at fault.</exception>
    public PathSchedule(ReadOnlySpan<double> years, ReadOnlySpan<double> logForwards, double discount)
    {
        if (years.IsEmpty)
            throw new ArgumentException("There are no dates; a path needs at least one.", nameof(years));
        Spans.RequireLength(years.Length, logForwards.Length, nameof(logForwards));
        for (int k = 0; k < years.Length; k++)
        {
            if (!double.IsFinite(years[k]) || years[k] < 0.0 || (k > 0 && years[k] <= years[k - 1]))
                throw new ArgumentException($"years[{k}] is {years[k]}; times must be finite, 0 or more, and ascend strictly.", nameof(years));
            if (!double.IsFinite(logForwards[k]) || (years[k] == 0.0 && logForwards[k] != 0.0))
                throw new ArgumentException($"logForwards[{k}] is {logForwards[k]}; it must be finite, and 0 at time 0.", nameof(logForwards));
        }

        if (!(discount > 0.0) || double.IsInfinity(discount))
            throw new ArgumentOutOfRangeException(nameof(discount), discount, $"discount is {discount}; it must be positive and finite.");
        (this.years, this.logForwards, Discount) = (years.ToArray(), logForwards.ToArray(), discount);
    }

    /// <summary>Flat continuous rates; paid at <paramref name="paymentYears"/>.</summary>
    /// <param name="years">Times from today.</param>
    /// <param name="rate">r.</param>
    /// <param name="carryYield">q: the forward grows at r - q.</param>
    /// <param name="paymentYears">Time of the payment, no earlier than the last date.</param>
    /// <exception cref="ArgumentException">A number is not finite, or the payment comes before the last date.</exception>
    public static PathSchedule Flat(ReadOnlySpan<double> years, double rate, double carryYield, double paymentYears)
    {
        if (!double.IsFinite(rate) || !double.IsFinite(carryYield))
            throw new ArgumentException($"The rate is {rate} and the carry yield {carryYield}; both must be finite.", nameof(rate));
        if (!years.IsEmpty && !(paymentYears >= years[^1]))
            throw new ArgumentException($"The payment lies at {paymentYears} years; it must not lie before the last date, {years[^1]}.", nameof(paymentYears));
        double[] logForwards = new double[years.Length];
        for (int k = 0; k < logForwards.Length; k++)
            logForwards[k] = (rate - carryYield) * years[k];
        return new PathSchedule(years, logForwards, Exponential.Of(-rate * paymentYears));
    }

    /// <summary>Times from today.</summary>
    public ReadOnlySpan<double> Years => years;

    /// <summary>ln(forward/spot) at each of them.</summary>
    public ReadOnlySpan<double> LogForwards => logForwards;

    /// <summary>Value today of one unit at the payment.</summary>
    public double Discount { get; }

    /// <summary>Number of dates.</summary>
    public int Count => years.Length;

    /// <summary>Mean of the log growth to a date under the pricing measure: ln(forward/spot) - v²t/2.</summary>
    internal double Drift(int k, double volatility) => Math.FusedMultiplyAdd(-0.5 * volatility * volatility, years[k], logForwards[k]);
}
