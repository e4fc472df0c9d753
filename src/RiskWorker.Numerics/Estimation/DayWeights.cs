namespace RiskWorker.Numerics.Estimation;

/// <summary>Weights of the days of a table, the oldest first and the newest 1; what is made of them divides by their sum.</summary>
public static class DayWeights
{
    /// <summary>All of them 1.</summary>
    public static double[] Equal(int days)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(days, 1);
        var weights = new double[days];
        Array.Fill(weights, 1);
        return weights;
    }

    /// <summary>λ^k at k days before the newest, by repeated multiplication.</summary>
    public static double[] Exponential(int days, double lambda)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(days, 1);
        if (!(lambda > 0 && lambda <= 1)) throw new ArgumentOutOfRangeException(nameof(lambda), lambda, "The decay factor lies above 0 and is at most 1.");
        var weights = new double[days];
        weights[^1] = 1;
        for (var t = days - 2; t >= 0; t--) weights[t] = weights[t + 1] * lambda;
        return weights;
    }
}
