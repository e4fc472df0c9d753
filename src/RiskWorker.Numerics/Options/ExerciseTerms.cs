using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Options;

/// <summary>One put's constants at the points of a grid, z = √(τ - u): what neither the boundary nor the spot changes.</summary>
internal sealed class ExerciseTerms
{
    public ExerciseTerms(ExerciseGrid grid, double years, double volatility, double rate, double carryYield)
    {
        int count = grid.Back.Length;
        (Inverse, Drift, Deviation) = (new double[count], new double[count], new double[count]);
        (Interest, Yield) = (new double[count], new double[count]);
        double root = Math.Sqrt(years), perDeviation = (rate - carryYield) / volatility;
        for (int j = 0; j < count; j++)
        {
            double z = root * grid.Back[j], weight = years * grid.Weight[j];
            Deviation[j] = volatility * z;
            Inverse[j] = 1.0 / Deviation[j];
            Drift[j] = Math.FusedMultiplyAdd(perDeviation, z, -0.5 * Deviation[j]);
            Interest[j] = rate * weight * Exponential.Of(-rate * z * z);
            Yield[j] = carryYield * weight * Exponential.Of(-carryYield * z * z);
        }
    }

    /// <summary>1/(v z).</summary>
    public double[] Inverse { get; }

    /// <summary>(r - q) z/v - v z/2.</summary>
    public double[] Drift { get; }

    /// <summary>v z.</summary>
    public double[] Deviation { get; }

    /// <summary>r e^(-rz²) and the weight of the point.</summary>
    public double[] Interest { get; }

    /// <summary>q e^(-qz²) and the weight of the point.</summary>
    public double[] Yield { get; }
}
