using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Paths;

/// <summary>
/// (average - K)⁺ for a call, (K - average)⁺ for a put, with average = past + Σ weight·S over the dates to come.
/// </summary>
/// <remarks>
/// Controls: the average itself, the geometric average, and the option on the geometric average (Kemna and Vorst 1990) with
/// the same strike, all with known expectations on the same dates. A call less a put is therefore exactly the forward of
/// the average, and an option that is sure to be exercised has no error.
/// </remarks>
public sealed class ArithmeticAsianPayoff : PathPayoff
{
    /// <summary>Equal steps of a continuous average where nothing else is asked for.</summary>
    public const int ContinuousSteps = 64;

    private readonly double[] shares;
    private readonly double total;
    private readonly double variance;
    private readonly double slope;
    private readonly double offset;

    /// <param name="schedule">Dates of the fixings to come; one at time 0 is fixed at the spot.</param>
    /// <param name="weights">Weight of each in the average; positive.</param>
    /// <param name="past">What the fixings of the past contribute to the average; 0 or more.</param>
    /// <param name="strike">K; positive.</param>
    /// <param name="isCall">Call, else put.</param>
    /// <exception cref="ArgumentException">A length or a number is at fault.</exception>
    public ArithmeticAsianPayoff(PathSchedule schedule, ReadOnlySpan<double> weights, double past, double strike, bool isCall)
        : base(schedule ?? throw new ArgumentNullException(nameof(schedule)))
    {
        Spans.RequireLength(schedule.Count, weights.Length, nameof(weights));
        RequirePositive(strike, nameof(strike));
        if (!(past >= 0.0) || double.IsInfinity(past))
            throw new ArgumentOutOfRangeException(nameof(past), past, $"past is {past}; it must be 0 or more, and finite.");
        foreach (double weight in weights)
        {
            RequirePositive(weight, nameof(weights));
            total += weight;
        }

        shares = new double[weights.Length];
        for (int k = 0; k < shares.Length; k++)
            shares[k] = weights[k] / total;
        variance = VarianceOfMean();
        double sign = isCall ? 1.0 : -1.0;
        (slope, offset) = (sign * total, sign * (past - strike));
    }

    /// <summary>The average of equally weighted fixings, some of them past.</summary>
    /// <param name="schedule">Dates of the fixings to come.</param>
    /// <param name="pastCount">Number of fixings of the past.</param>
    /// <param name="pastSum">Their sum.</param>
    /// <param name="strike">K.</param>
    /// <param name="isCall">Call, else put.</param>
    /// <exception cref="ArgumentException">A number is at fault.</exception>
    public static ArithmeticAsianPayoff OfFixings(PathSchedule schedule, int pastCount, double pastSum, double strike, bool isCall)
    {
        ArgumentNullException.ThrowIfNull(schedule);
        ArgumentOutOfRangeException.ThrowIfNegative(pastCount);
        if (!(pastSum >= 0.0) || (pastCount == 0 && pastSum != 0.0))
            throw new ArgumentOutOfRangeException(nameof(pastSum), pastSum, $"pastSum is {pastSum} of {pastCount} fixings; it must be 0 or more, and 0 without fixings.");
        double count = schedule.Count + pastCount;
        double[] weights = new double[schedule.Count];
        weights.AsSpan().Fill(1.0 / count);
        return new ArithmeticAsianPayoff(schedule, weights, pastSum / count, strike, isCall);
    }

    /// <summary>The continuous average from the issue to the expiry, on a trapezoid of equal steps and flat rates.</summary>
    /// <remarks>
    /// The trapezoid of m steps leaves out 1/(4m²) of the variance of the motion's average. Variance therefore runs by that much
    /// faster than time: the geometric average has its continuous law.
    /// </remarks>
    /// <param name="rate">r.</param>
    /// <param name="carryYield">q.</param>
    /// <param name="years">Time to the expiry; positive.</param>
    /// <param name="elapsedYears">Time since the issue; 0 or more.</param>
    /// <param name="pastAverage">The average so far; not used when no time has elapsed.</param>
    /// <param name="strike">K.</param>
    /// <param name="isCall">Call, else put.</param>
    /// <param name="steps">Steps of the trapezoid; at least one.</param>
    /// <exception cref="ArgumentException">A number is at fault.</exception>
    public static ArithmeticAsianPayoff Continuous(
        double rate, double carryYield, double years, double elapsedYears, double pastAverage, double strike, bool isCall, int steps = ContinuousSteps)
    {
        RequirePositive(years, nameof(years));
        ArgumentOutOfRangeException.ThrowIfLessThan(steps, 1);
        if (!(elapsedYears >= 0.0) || double.IsInfinity(elapsedYears))
            throw new ArgumentOutOfRangeException(nameof(elapsedYears), elapsedYears, $"elapsedYears is {elapsedYears}; it must be 0 or more, and finite.");
        double[] times = new double[steps + 1], weights = new double[steps + 1], logForwards = new double[steps + 1];
        double whole = years + elapsedYears, faster = 1.0 / (1.0 - (0.25 / ((double)steps * steps)));
        for (int k = 0; k <= steps; k++)
        {
            times[k] = faster * years * k / steps;
            logForwards[k] = (rate - carryYield) * years * k / steps;
            weights[k] = (k == 0 || k == steps ? 0.5 : 1.0) * years / (steps * whole);
        }

        double past = elapsedYears == 0.0 ? 0.0 : pastAverage * elapsedYears / whole;
        var schedule = new PathSchedule(times, logForwards, Exponential.Of(-rate * years));
        return new ArithmeticAsianPayoff(schedule, weights, past, strike, isCall);
    }

    internal override bool UsesBridges => false;

    internal override int Statistics => 2;

    internal override int Controls => 3;

    internal override void Reduce(PathBlock block, double volatility, bool isMirrored, Span<double> statistics)
    {
        Span<double> arithmetic = Row(statistics, 0), geometric = Row(statistics, 1);
        double signed = isMirrored ? -volatility : volatility, drift = 0.0;
        statistics.Clear();
        for (int k = 0; k < shares.Length; k++)
        {
            double driftOfDate = Schedule.Drift(k, volatility);
            drift = Math.FusedMultiplyAdd(shares[k], driftOfDate, drift);
            LaneLoop.Apply(new WeightedGrowth(signed, driftOfDate, shares[k]), block.Motion(k), arithmetic);
            LaneLoop.Apply(new WeightedSum(shares[k]), block.Motion(k), geometric);
        }

        LaneLoop.Apply(new Scaled(signed, drift), geometric, geometric);
        Exponential.Of(geometric, geometric);
    }

    internal override void Evaluate(double spot, ReadOnlySpan<double> statistics, Span<double> payoff, Span<double> controls)
    {
        statistics.CopyTo(controls);
        LaneLoop.Apply(new Hinge(slope * spot, offset), Row(statistics, 0), payoff);
        LaneLoop.Apply(new Hinge(slope * spot, offset), Row(statistics, 1), Row(controls, 2));
    }

    internal override void ControlMeans(double spot, double volatility, Span<double> means)
    {
        means.Clear();
        double drift = 0.0;
        for (int k = 0; k < shares.Length; k++)
        {
            means[0] = Math.FusedMultiplyAdd(shares[k], Exponential.Of(Schedule.LogForwards[k]), means[0]);
            drift = Math.FusedMultiplyAdd(shares[k], Schedule.Drift(k, volatility), drift);
        }

        means[1] = Exponential.Of(Math.FusedMultiplyAdd(0.5 * volatility * volatility, variance, drift));
        means[2] = LogNormalHinge.Mean(slope * spot, offset, means[1], volatility * Math.Sqrt(variance));
    }

    internal override double Certain(double spot) => 0.0;

    /// <summary>Σ share_j·share_k·min(t_j, t_k): the variance of the weighted motion.</summary>
    private double VarianceOfMean()
    {
        // Each step moves all the dates from its own on.
        double sum = 0.0, later = 0.0;
        for (int k = shares.Length - 1; k >= 0; k--)
        {
            later += shares[k];
            double step = Schedule.Years[k] - (k == 0 ? 0.0 : Schedule.Years[k - 1]);
            sum = Math.FusedMultiplyAdd(later * later, step, sum);
        }

        return sum;
    }
}
