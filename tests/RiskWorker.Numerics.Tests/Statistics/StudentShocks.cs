using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Statistics;

/// <summary>Seeded multivariate Student-t shocks of unit variance: normals with one common factor, mixed by χ² from sums of squared normals.</summary>
internal static class StudentShocks
{
    /// <summary>A row a factor. The mixing draw goes back to no code under test: ν is whole, and χ² a sum of ν squares. 0 means normal.</summary>
    public static double[] Of(int factors, int days, int nu, double common, ulong seed)
    {
        var numbers = new SeededNumbers(seed);
        double[] rows = new double[factors * days];
        for (int t = 0; t < days; t++)
        {
            double square = 0, shared = Normal(numbers);
            for (int k = 0; k < nu; k++)
            {
                double z = Normal(numbers);
                square += z * z;
            }

            double multiplier = nu == 0 ? 1 : Math.Sqrt((nu - 2) / square);
            for (int j = 0; j < factors; j++)
                rows[(j * days) + t] = multiplier * ((Math.Sqrt(common) * shared) + (Math.Sqrt(1 - common) * Normal(numbers)));
        }

        return rows;
    }

    /// <summary>Their correlation matrix.</summary>
    public static double[] Correlation(int factors, double common)
    {
        double[] matrix = new double[factors * factors];
        Array.Fill(matrix, common);
        for (int j = 0; j < factors; j++)
            matrix[(j * factors) + j] = 1;
        return matrix;
    }

    private static double Normal(SeededNumbers numbers) => InverseNormal.Of(Math.Max(numbers.Unit(), 1e-16));
}
