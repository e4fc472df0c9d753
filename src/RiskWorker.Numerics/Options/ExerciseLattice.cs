using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Options;

/// <summary>
/// An American put of strike 1 on the binomial tree of Leisen and Reimer (1996), two trees joined by Richardson's extrapolation:
/// for a carry yield below a rate below zero, where the put is exercised between two boundaries.
/// </summary>
internal sealed class ExerciseLattice(double years, double volatility, double rate, double carryYield)
{
    private const int Steps = 400;

    public double Value(double spot, double logSpot)
    {
        double few = Value(spot, logSpot, Steps + 1), many = Value(spot, logSpot, (2 * Steps) + 1);
        return Math.FusedMultiplyAdd(many - few, (Steps + 1.0) / Steps, many);
    }

    internal double Value(double spot, double logSpot, int steps)
    {
        double deviation = volatility * Math.Sqrt(years), step = years / steps;
        double d1 = ((logSpot + ((rate - carryYield) * years)) / deviation) + (0.5 * deviation);
        double up = Share(d1 - deviation, steps), growth = Exponential.Of((rate - carryYield) * step);
        if (up is 0.0 or 1.0)
            return DeterministicExercise.PutValue(spot, years, rate, carryYield);
        double rise = growth * Share(d1, steps) / up, fall = (growth - (up * rise)) / (1.0 - up);
        double discount = Exponential.Of(-rate * step);
        return Back(spot, steps, rise, fall, discount * up, discount * (1.0 - up));
    }

    private static double Back(double spot, int steps, double rise, double fall, double up, double down)
    {
        double[] level = new double[steps + 1], value = new double[steps + 1];
        double ratio = rise / fall;
        level[0] = spot;
        for (int i = 0; i < steps; i++)
            level[0] *= fall;
        for (int i = 1; i <= steps; i++)
            level[i] = level[i - 1] * ratio;
        for (int i = 0; i <= steps; i++)
            value[i] = Math.Max(1.0 - level[i], 0.0);
        for (int n = steps - 1; n >= 0; n--)
        {
            for (int i = 0; i <= n; i++)
            {
                level[i] /= fall;
                value[i] = Math.Max(1.0 - level[i], Math.FusedMultiplyAdd(up, value[i + 1], down * value[i]));
            }
        }

        return value[0];
    }

    /// <summary>The inversion of Peizer and Pratt (1968), its second form.</summary>
    private static double Share(double d, int n)
    {
        double scaled = d / (n + (1.0 / 3.0) + (0.1 / (n + 1)));
        double half = 0.5 * Math.Sqrt(1.0 - Exponential.Of(-scaled * scaled * (n + (1.0 / 6.0))));
        return d < 0.0 ? 0.5 - half : 0.5 + half;
    }
}
