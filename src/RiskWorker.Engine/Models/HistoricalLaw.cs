using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Models;

/// <summary>
/// Historical simulation: the joint moves of past days, each one a scenario. Scenario i ends i days before the newest shock; over h days
/// it is the sum of the h shocks up to there, so scenarios of more than one day overlap.
/// </summary>
/// <param name="Days">Days of shocks.</param>
/// <param name="LongestHorizon">The longest horizon in days.</param>
/// <param name="Shocks">A row a moving factor in the order of the plan, <paramref name="Days"/> apart, newest day first.</param>
/// <param name="Weights">Weight of each scenario, summing to 1; null where all weigh the same.</param>
/// <param name="Furthest">The largest move of a factor at any horizon, in standard deviations of that horizon.</param>
public sealed record HistoricalLaw(int Days, int LongestHorizon, double[] Shocks, double[]? Weights, double Furthest) : ScenarioLaw
{
    /// <summary>The days of <paramref name="window"/>.</summary>
    /// <param name="window">The shocks.</param>
    /// <param name="moving">The factors that move, in the order of the plan's rows.</param>
    /// <param name="deviations">Standard deviation of each factor.</param>
    /// <param name="model">Decay of the weights.</param>
    /// <param name="longest">The longest horizon in days.</param>
    /// <exception cref="CalibrationException">There are fewer days than the longest horizon needs.</exception>
    internal static HistoricalLaw Of(ShockWindow window, int[] moving, double[] deviations, ModelSettings model, int longest)
    {
        var days = window.Days.Count;
        if (days < longest)
            throw new CalibrationException("observations", $"The history has {days} complete days of shocks, fewer than the longest horizon of {longest} days that the model '{model.Name}' is asked for.");
        var shocks = new double[moving.Length * days];
        for (var row = 0; row < moving.Length; row++)
        {
            var newestFirst = shocks.AsSpan(row * days, days);
            window.Row(moving[row]).CopyTo(newestFirst);
            newestFirst.Reverse();
        }
        var law = new HistoricalLaw(days, longest, shocks, model.AgeWeight is { } decay ? AgeWeights(days - longest + 1, decay) : null, 0);
        return law with { Furthest = law.FurthestMove(moving, deviations) };
    }

    /// <inheritdoc/>
    public override bool GivesShocks => true;

    /// <inheritdoc/>
    public override int? ScenarioCount => Days - LongestHorizon + 1;

    /// <summary>The move of row <paramref name="row"/> over <paramref name="days"/> days in scenario <paramref name="scenario"/>, newest shock first.</summary>
    public double Move(int row, int scenario, int days)
    {
        var sum = 0.0;
        foreach (var shock in Shocks.AsSpan((row * Days) + scenario, days)) sum += shock;
        return sum;
    }

    /// <inheritdoc/>
    public override double Reach(int days) => Math.Max(Ordinary, 1.01 * Furthest);

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => [1, Days, LongestHorizon, .. Shocks, .. Weights ?? []];

    // Boudoukh, Richardson and Whitelaw, The best of both worlds (Risk, 1998): weight (1 - l) l^k / (1 - l^n) at age k.
    private static double[] AgeWeights(int count, double decay)
    {
        var weights = new double[count];
        var weight = 1.0;
        for (var k = 0; k < count; k++, weight *= decay) weights[k] = weight;
        var total = LaneSum.Of(weights);
        for (var k = 0; k < count; k++) weights[k] /= total;
        return weights;
    }

    private double FurthestMove(int[] moving, double[] deviations)
    {
        var furthest = 0.0;
        for (var row = 0; row < moving.Length; row++)
        {
            for (var day = 0; day < Days; day++) furthest = Math.Max(furthest, Math.Abs(Shocks[(row * Days) + day]) / deviations[moving[row]]);
        }
        return furthest;
    }
}
