using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Statistics;

/// <summary>Weights of days, normalised to sum to 1, and the number of equal days that tell as much: (Σw)²/Σw² (Kish 1965).</summary>
internal sealed class DayWeights
{
    private readonly double[] weights;

    private DayWeights(double[] weights, double effective)
    {
        this.weights = weights;
        Effective = effective;
    }

    /// <summary>The effective number of days; n where the weights are equal.</summary>
    public double Effective { get; }

    /// <summary>The days.</summary>
    public int Count => weights.Length;

    /// <summary>Checked and normalised.</summary>
    /// <param name="weights">One a day, 0 or more, not all 0; none at all means equal ones.</param>
    /// <param name="days">Days, at least 1.</param>
    public static DayWeights Of(ReadOnlySpan<double> weights, int days)
    {
        if (days < 1)
            throw new ArgumentException($"There are {days} days; a likelihood needs at least 1.", nameof(days));
        double[] normal = new double[days];
        if (weights.IsEmpty)
        {
            Array.Fill(normal, 1.0 / days);
            return new(normal, days);
        }

        Spans.RequireLength(days, weights.Length, nameof(weights));
        for (int t = 0; t < days; t++)
        {
            if (!(weights[t] >= 0.0 && double.IsFinite(weights[t])))
                throw new ArgumentException($"The weight of day {t} is {weights[t]}; it must be 0 or more and finite.", nameof(weights));
        }

        double sum = LaneSum.Of(weights);
        if (!(sum > 0.0 && double.IsFinite(sum)))
            throw new ArgumentException($"The weights add up to {sum}; their sum must be positive and finite.", nameof(weights));
        for (int t = 0; t < days; t++)
            normal[t] = weights[t] / sum;
        return new(normal, 1.0 / LaneSum.OfSquares(normal));
    }

    /// <summary>Σ w x, in <see cref="LaneSum"/>'s order; overwrites the values.</summary>
    public double Mean(Span<double> values)
    {
        for (int t = 0; t < values.Length; t++)
            values[t] *= weights[t];
        return LaneSum.Of(values);
    }

    /// <summary>Σ w ln(1 + x/divisor) for values of 0 or more, in room of as many.</summary>
    public double MeanLogOnePlus(ReadOnlySpan<double> values, double divisor, Span<double> room)
    {
        for (int t = 0; t < values.Length; t++)
            room[t] = 1.0 + (values[t] / divisor);
        Logarithm.Of(room, room);
        return Mean(room);
    }
}
