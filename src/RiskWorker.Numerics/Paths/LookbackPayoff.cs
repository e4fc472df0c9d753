using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Paths;

/// <summary>
/// A lookback option. Floating strike: S - min for a call, max - S for a put. Fixed strike: (max - K)⁺ for a call, (K - min)⁺ for a
/// put. The extreme runs over the past one, if any, and the dates to come, or every instant to the last of them.
/// </summary>
/// <remarks>
/// <para>All four are certain amounts, the forward, and one option (S·max - E)⁺ or (E - S·min)⁺ on the extreme to come, with E the
/// past extreme, or the strike where that lies beyond it; only that option is simulated. Without a past extreme a floating strike
/// leaves out the positive part.</para>
/// <para>Between dates the extreme is drawn exactly (<see cref="BridgeExtreme"/>), so continuous monitoring needs one date alone.
/// Controls: the last growth, the same option on it, and the option on the continuous extreme of the path with constant drift,
/// whose expectations are known (<see cref="ExtremeHinge"/>). Under flat rates and continuous monitoring the last control is the
/// payoff itself: the value is then exact and its error that of rounding.</para>
/// <para>The value bends where the spot passes the past extreme: a table of values should end there.</para>
/// </remarks>
public sealed class LookbackPayoff : PathPayoff
{
    private readonly bool isContinuous;
    private readonly double sign;
    private readonly double? level;
    private readonly double? strike;
    private readonly double flatDrift;

    /// <param name="schedule">
    /// The dates that are looked at, the expiry last; where monitoring is continuous those between which the forward changes its
    /// growth, the expiry alone under flat rates. A date at time 0 counts the spot itself.
    /// </param>
    /// <param name="isContinuous">Every instant from now on, else the dates alone.</param>
    /// <param name="strike">K; null for a floating strike.</param>
    /// <param name="extreme">The extreme so far, in the direction that the payoff looks; null if none has been observed.</param>
    /// <param name="isCall">Call, else put.</param>
    /// <exception cref="ArgumentException">A number is not positive and finite, or the expiry is now.</exception>
    public LookbackPayoff(PathSchedule schedule, bool isContinuous, double? strike, double? extreme, bool isCall)
        : this(schedule, isContinuous, strike, extreme, isCall, withExtremeControl: true)
    {
    }

    /// <summary>Without the control that is the continuous payoff itself: simulation alone.</summary>
    internal LookbackPayoff(PathSchedule schedule, bool isContinuous, double? strike, double? extreme, bool isCall, bool withExtremeControl)
        : base(schedule ?? throw new ArgumentNullException(nameof(schedule)))
    {
        if (strike is { } k)
            RequirePositive(k, nameof(strike));
        if (extreme is { } past)
            RequirePositive(past, nameof(extreme));
        if (schedule.Years[^1] == 0.0)
            throw new ArgumentException("The last date is now; a lookback needs time to its expiry.", nameof(schedule));
        (this.isContinuous, this.strike) = (isContinuous, strike);
        sign = isCall == strike.HasValue ? 1.0 : -1.0;
        level = strike is null || extreme is null ? strike ?? extreme
            : sign > 0.0 ? Math.Max(strike.Value, extreme.Value) : Math.Min(strike.Value, extreme.Value);
        flatDrift = schedule.LogForwards[^1] / schedule.Years[^1];
        Controls = withExtremeControl ? 3 : 2;
    }

    internal override bool UsesBridges => true;

    internal override int Statistics => 3;

    internal override int Controls { get; }

    internal override void Reduce(PathBlock block, double volatility, bool isMirrored, Span<double> statistics)
    {
        double scale = isMirrored ? -volatility : volatility;
        Span<double> extreme = Row(statistics, 0), growth = Row(statistics, 1), smooth = Row(statistics, 2);
        smooth.Clear();
        extreme.Fill(isContinuous ? 0.0 : double.NegativeInfinity);
        for (int k = 0; k < Schedule.Count; k++)
        {
            double drift = Schedule.Drift(k, volatility), before = k == 0 ? 0.0 : Schedule.Drift(k - 1, volatility);
            if (!isContinuous)
                LaneLoop.Apply(new LargerLog(sign * scale, sign * drift), block.Motion(k), extreme);
            else
                Bridge(block, k, scale, before, drift, isMirrored, extreme);
            Bridge(block, k, scale, FlatDrift(k - 1, volatility), FlatDrift(k, volatility), isMirrored, smooth);
        }

        int last = Schedule.Count - 1;
        growth.Clear();
        LaneLoop.Apply(new WeightedGrowth(scale, Schedule.Drift(last, volatility), 1.0), block.Motion(last), growth);
        ToGrowth(extreme);
        ToGrowth(smooth);
    }

    internal override void Evaluate(double spot, ReadOnlySpan<double> statistics, Span<double> payoff, Span<double> controls)
    {
        double slope = sign * spot, offset = -sign * (level ?? spot);
        if (level is null)
            LaneLoop.Apply(new Scaled(slope, offset), Row(statistics, 0), payoff);
        else
            LaneLoop.Apply(new Hinge(slope, offset), Row(statistics, 0), payoff);
        Row(statistics, 1).CopyTo(Row(controls, 0));
        LaneLoop.Apply(new Hinge(slope, offset), Row(statistics, 1), Row(controls, 1));
        if (Controls > 2)
            LaneLoop.Apply(new Hinge(slope, offset), Row(statistics, 2), Row(controls, 2));
    }

    internal override void ControlMeans(double spot, double volatility, Span<double> means)
    {
        double years = Schedule.Years[^1], at = level ?? spot;
        means[0] = Exponential.Of(Schedule.LogForwards[^1]);
        means[1] = LogNormalHinge.Mean(sign * spot, -sign * at, means[0], volatility * Math.Sqrt(years));
        if (Controls > 2)
            means[2] = ExtremeHinge.Mean(sign, spot, at, Math.FusedMultiplyAdd(-0.5 * volatility, volatility, flatDrift), volatility, years);
    }

    internal override double Certain(double spot)
    {
        double at = level ?? spot;
        return sign * (at - (strike ?? (spot * Exponential.Of(Schedule.LogForwards[^1]))));
    }

    private double FlatDrift(int k, double volatility) =>
        k < 0 ? 0.0 : Math.FusedMultiplyAdd(-0.5 * volatility, volatility, flatDrift) * Schedule.Years[k];

    private void Bridge(PathBlock block, int k, double scale, double before, double drift, bool isMirrored, Span<double> extreme)
    {
        double step = Schedule.Years[k] - (k == 0 ? 0.0 : Schedule.Years[k - 1]);
        if (step == 0.0)
            return;
        new BridgeExtreme(sign * scale, sign * before, sign * drift, 2.0 * scale * scale * step)
            .Apply(block.MotionBefore(k), block.Motion(k), block.LogUniform(k, isMirrored), extreme);
    }

    private void ToGrowth(Span<double> logarithms)
    {
        LaneLoop.Apply(new Scaled(sign, 0.0), logarithms, logarithms);
        Exponential.Of(logarithms, logarithms);
    }
}
