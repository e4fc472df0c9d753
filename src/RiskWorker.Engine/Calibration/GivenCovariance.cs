using RiskWorker.Domain.Market;

namespace RiskWorker.Engine.Calibration;

/// <summary>The covariance of daily shocks as <c>covariance.csv</c> gives it: each pair once, in either order, or twice alike.</summary>
internal static class GivenCovariance
{
    /// <summary>The matrix in the order of <paramref name="factors"/>; entries of other factors are left out.</summary>
    /// <exception cref="CalibrationException">A pair of moving factors is missing, given twice with two values, or is no covariance.</exception>
    public static double[] Of(IReadOnlyList<CovarianceEntry> entries, IReadOnlyList<Factor> factors)
    {
        var n = factors.Count;
        var matrix = new double[n * n];
        Array.Fill(matrix, double.NaN);
        var number = factors.Select((factor, j) => (factor.Name, j)).ToDictionary(f => f.Name, f => f.j, StringComparer.Ordinal);
        foreach (var entry in entries)
        {
            if (!number.TryGetValue(entry.Factor, out var i) || !number.TryGetValue(entry.Other, out var j)) continue;
            if (!double.IsFinite(entry.Value)) throw Fault(entry.Factor, entry.Other, $"The covariance is {entry.Value}; it must be finite.");
            var known = matrix[(i * n) + j];
            if (!double.IsNaN(known) && known != entry.Value)
                throw Fault(entry.Factor, entry.Other, $"The covariance is given as {known:r} and as {entry.Value:r}.");
            matrix[(i * n) + j] = matrix[(j * n) + i] = entry.Value;
        }
        RequireVariances(matrix, factors);
        RequirePairs(matrix, factors);
        return matrix;
    }

    private static void RequireVariances(double[] matrix, IReadOnlyList<Factor> factors)
    {
        for (var i = 0; i < factors.Count; i++)
        {
            var variance = matrix[(i * factors.Count) + i];
            if (double.IsNaN(variance)) throw Fault(factors[i].Name, factors[i].Name, "The variance is not given.");
            if (variance < 0) throw Fault(factors[i].Name, factors[i].Name, $"The variance is {variance:r}; it must not be negative.");
        }
    }

    private static void RequirePairs(double[] matrix, IReadOnlyList<Factor> factors)
    {
        var n = factors.Count;
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j < i; j++)
            {
                var value = matrix[(i * n) + j];
                var still = matrix[(i * n) + i] == 0 || matrix[(j * n) + j] == 0;
                if (double.IsNaN(value) && !still) throw Fault(factors[j].Name, factors[i].Name, "The covariance is not given.");
                if (still && Math.Abs(value) > 0) throw Fault(factors[j].Name, factors[i].Name, $"The covariance is {value:r}, but one of the two has no variance.");
                if (still) matrix[(i * n) + j] = matrix[(j * n) + i] = 0;
            }
        }
    }

    private static CalibrationException Fault(string factor, string other, string reason) => new($"{factor}, {other}", reason);
}
