using RiskWorker.Numerics.LinearAlgebra;

namespace RiskWorker.Engine.Calibration;

/// <summary>A covariance taken apart: deviations, and the factor of the correlation of those factors that move at all.</summary>
internal sealed record MovingCorrelation
{
    /// <summary>Standard deviation of every factor; 0 for one that never moves.</summary>
    public required double[] Deviations { get; init; }

    /// <summary>The moving factors in pivot order.</summary>
    public required int[] Order { get; init; }

    /// <summary>The factor of their correlation.</summary>
    public required PivotedCholesky Factor { get; init; }

    /// <summary>Distance of the repair, or null.</summary>
    public required double? RepairDistance { get; init; }

    /// <summary>Takes an n × n covariance apart; where its correlation is indefinite the nearest one stands in.</summary>
    public static MovingCorrelation Of(double[] covariance, int n)
    {
        var deviations = new double[n];
        for (var i = 0; i < n; i++) deviations[i] = Math.Sqrt(covariance[(i * n) + i]);
        int[] moving = [.. Enumerable.Range(0, n).Where(i => deviations[i] > 0)];
        var correlation = Correlation(covariance, n, moving);
        var factor = PivotedCholesky.Factor(correlation, moving.Length);
        double? distance = null;
        if (factor.IsIndefinite)
        {
            var nearest = NearestCorrelation.Of(correlation, moving.Length);
            factor = PivotedCholesky.Factor(nearest.Matrix, moving.Length);
            distance = nearest.Distance;
        }
        return new() { Deviations = deviations, Order = Array.ConvertAll(factor.Order, k => moving[k]), Factor = factor, RepairDistance = distance };
    }

    /// <summary>The correlation of the factors of an n × n covariance that move.</summary>
    internal static double[] Correlation(double[] covariance, int n, int[] moving)
    {
        var size = moving.Length;
        var correlation = new double[size * size];
        for (var a = 0; a < size; a++)
        {
            correlation[(a * size) + a] = 1;
            var (row, variance) = (moving[a] * n, covariance[(moving[a] * n) + moving[a]]);
            for (var b = 0; b < a; b++)
            {
                // The root of the product, not the product of roots: shocks that are equal correlate by exactly 1.
                var other = covariance[(moving[b] * n) + moving[b]];
                correlation[(a * size) + b] = correlation[(b * size) + a] = covariance[row + moving[b]] / Math.Sqrt(variance * other);
            }
        }
        return correlation;
    }
}
