using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Paths;

/// <summary>
/// Prices of a path-dependent payoff by simulation of exact log-normal steps under the pricing measure, at many spots and
/// volatilities from one set of draws, in antithetic pairs and with regression on the payoff's controls.
/// </summary>
/// <remarks>
/// A price is a function of the seed, the number of pairs and the terms alone, to the last bit; as a function of spot and
/// volatility it is as smooth as the payoff averaged over the pairs lets it be, since all share the draws. Instances hold no
/// state and may be shared between threads.
/// </remarks>
public sealed class PathPricer
{
    /// <summary>Pairs of paths drawn where nothing else is asked for.</summary>
    public const int DefaultPairs = 16_384;

    private readonly ulong seed;
    private readonly int pairs;

    /// <param name="seed">The run's seed.</param>
    /// <param name="pairs">Pairs of paths, a multiple of 512.</param>
    /// <exception cref="ArgumentOutOfRangeException">The number of pairs is not a positive multiple of 512.</exception>
    public PathPricer(ulong seed, int pairs = DefaultPairs)
    {
        if (pairs <= 0 || pairs % PathBlock.Pairs != 0)
            throw new ArgumentOutOfRangeException(nameof(pairs), pairs, $"pairs is {pairs}; it must be a positive multiple of {PathBlock.Pairs}.");
        (this.seed, this.pairs) = (seed, pairs);
    }

    /// <summary>Values today of one unit, and their standard errors, at every volatility and spot.</summary>
    /// <param name="payoff">What is paid.</param>
    /// <param name="volatilities">Per root year, 0 or more.</param>
    /// <param name="spots">The underlying, positive.</param>
    /// <param name="values">A row of spots for each volatility.</param>
    /// <param name="standardErrors">As long as <paramref name="values"/>.</param>
    /// <exception cref="ArgumentException">A length is at fault, a spot is not positive or a volatility below zero, or not finite.</exception>
    public void Price(
        PathPayoff payoff, ReadOnlySpan<double> volatilities, ReadOnlySpan<double> spots, Span<double> values, Span<double> standardErrors)
    {
        ArgumentNullException.ThrowIfNull(payoff);
        Require(volatilities, spots, values.Length, standardErrors.Length);
        var block = new PathBlock(payoff.Schedule, payoff.UsesBridges);
        var scratch = new Scratch(payoff);
        var sums = new ControlledMean[values.Length];
        double[] means = new double[values.Length * payoff.Controls];
        for (int at = 0; at < values.Length; at++)
        {
            sums[at] = new ControlledMean(payoff.Controls);
            payoff.ControlMeans(spots[at % spots.Length], volatilities[at / spots.Length], means.AsSpan(at * payoff.Controls, payoff.Controls));
        }

        for (int first = 0; first < pairs; first += PathBlock.Pairs)
        {
            block.Fill(seed, (ulong)first);
            for (int v = 0, at = 0; v < volatilities.Length; v++)
            {
                payoff.Reduce(block, volatilities[v], false, scratch.Statistics);
                payoff.Reduce(block, volatilities[v], true, scratch.MirroredStatistics);
                foreach (double spot in spots)
                {
                    scratch.Evaluate(spot, means.AsSpan(at * payoff.Controls, payoff.Controls));
                    sums[at++].Add(scratch.Payoff, scratch.Controls);
                }
            }
        }

        for (int at = 0; at < values.Length; at++)
        {
            (double mean, double error) = sums[at].Result();
            values[at] = payoff.Schedule.Discount * (payoff.Certain(spots[at % spots.Length]) + mean);
            standardErrors[at] = payoff.Schedule.Discount * error;
        }
    }

    private static void Require(ReadOnlySpan<double> volatilities, ReadOnlySpan<double> spots, int values, int errors)
    {
        Spans.RequireLength(volatilities.Length * spots.Length, values, nameof(values));
        Spans.RequireLength(values, errors, "standardErrors");
        foreach (double volatility in volatilities)
        {
            if (!(volatility >= 0.0) || double.IsInfinity(volatility))
                throw new ArgumentOutOfRangeException(nameof(volatilities), volatility, $"A volatility is {volatility}; it must be 0 or more, and finite.");
        }

        foreach (double spot in spots)
        {
            if (!(spot > 0.0) || double.IsInfinity(spot))
                throw new ArgumentOutOfRangeException(nameof(spots), spot, $"A spot is {spot}; it must be positive and finite.");
        }
    }

    /// <summary>The rows of one block.</summary>
    private sealed class Scratch(PathPayoff payoff)
    {
        private readonly double[] mirroredPayoff = new double[PathBlock.Pairs];
        private readonly double[] mirroredControls = new double[payoff.Controls * PathBlock.Pairs];

        public double[] Statistics { get; } = new double[payoff.Statistics * PathBlock.Pairs];

        public double[] MirroredStatistics { get; } = new double[payoff.Statistics * PathBlock.Pairs];

        public double[] Payoff { get; } = new double[PathBlock.Pairs];

        public double[] Controls { get; } = new double[payoff.Controls * PathBlock.Pairs];

        /// <summary>The pairs' means: centred controls, and the payoff less the last of them, which leaves its expectation.</summary>
        public void Evaluate(double spot, ReadOnlySpan<double> means)
        {
            payoff.Evaluate(spot, Statistics, Payoff, Controls);
            payoff.Evaluate(spot, MirroredStatistics, mirroredPayoff, mirroredControls);
            LaneLoop.Apply(new PairMean(0.0), mirroredPayoff, Payoff);
            for (int c = 0; c < means.Length; c++)
            {
                int from = c * PathBlock.Pairs;
                LaneLoop.Apply(new PairMean(means[c]), mirroredControls.AsSpan(from, PathBlock.Pairs), Controls.AsSpan(from, PathBlock.Pairs));
            }

            // What no path tells about a payoff that none of them reaches, its closest control knows.
            LaneLoop.Apply(new WeightedSum(-1.0), Controls.AsSpan((means.Length - 1) * PathBlock.Pairs), Payoff);
        }
    }
}
