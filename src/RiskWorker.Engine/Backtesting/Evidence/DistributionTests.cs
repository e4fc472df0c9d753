using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>Tests of the whole forecast distribution, from the forecast probabilities of each day's profit: uniform and independent where it is right.</summary>
public static class DistributionTests
{
    private static readonly Judgement s_kolmogorov = new(StatisticalTestNames.KolmogorovSmirnov, "Kolmogorov (1933); law by Moscovich and Nadler (2017), Simard and L'Ecuyer (2011)");
    private static readonly Judgement s_anderson = new(StatisticalTestNames.AndersonDarling, "Anderson and Darling (1954); law by Marsaglia and Marsaglia (2004)");
    private static readonly Judgement s_berkowitz = new(StatisticalTestNames.Berkowitz, "Berkowitz (2001), Testing density forecasts");

    /// <summary>Largest distance of the two distributions.</summary>
    public static StatisticalTest KolmogorovSmirnov(IReadOnlyList<double> transforms)
    {
        if (Sorted(transforms) is not { Length: > 0 } u) return s_kolmogorov.NotAssessed("No day with profit and forecast.");
        var distance = 0.0;
        for (var i = 0; i < u.Length; i++) distance = Math.Max(distance, Math.Max(((i + 1.0) / u.Length) - u[i], u[i] - ((double)i / u.Length)));
        var isExact = u.Length <= KolmogorovSmirnovLaw.MostDays;
        return s_kolmogorov.Of(distance, KolmogorovSmirnovLaw.AtLeast(u.Length, distance), isExact ? PValueMethod.Exact : PValueMethod.Asymptotic);
    }

    /// <summary>Squared distance weighted by the inverse of its variance: the tails count for more.</summary>
    public static StatisticalTest AndersonDarling(IReadOnlyList<double> transforms)
    {
        if (Sorted(transforms) is not { Length: > 0 } u) return s_anderson.NotAssessed("No day with profit and forecast.");
        var sum = 0.0;
        for (var i = 0; i < u.Length; i++) sum += ((2.0 * i) + 1) * (Logarithm.Of(u[i]) + Logarithm.Of(1 - u[u.Length - 1 - i]));
        var statistic = -u.Length - (sum / u.Length);
        var tail = AndersonDarlingLaw.AtLeast(u.Length, statistic);
        var note = tail < AndersonDarlingLaw.SmallestCorrected ? "The limit law's tail." : "The limit law, corrected for the number of days to about 2e-6.";
        return s_anderson.Of(statistic, tail, PValueMethod.Asymptotic, note);
    }

    /// <summary>
    /// Whether the inverse normals of the probabilities are independent with mean 0 and deviation 1, against any mean, deviation and
    /// correlation with the day before: chi-square with 3 degrees of freedom, which 4.6% to 5.4% of right series of 60 to 500 days exceed
    /// (measured on 4,000 or 5,000 each). J. Berkowitz, Testing density forecasts, with applications to risk management (Journal of Business and
    /// Economic Statistics, 2001).
    /// </summary>
    public static StatisticalTest Berkowitz(IReadOnlyList<double> transforms)
    {
        ForecastProbabilities.Require(transforms);
        if (transforms.Count < 20) return s_berkowitz.NotAssessed($"{transforms.Count} days: three numbers are fitted, which needs 20.");
        double[] z = [.. transforms];
        InverseNormal.Of(z, z);
        if (z.AsSpan().IndexOfAnyExcept(z[0]) < 0) return s_berkowitz.NotAssessed("All forecast probabilities are one number: nothing varies.");
        var (ratio, correlation, mean, deviation) = new BerkowitzLikelihood(z).Fit();
        return s_berkowitz.Of(ratio, Judgement.ChiSquareTail(ratio, 3), PValueMethod.Asymptotic,
            $"Mean {Judgement.Text(mean)}, deviation {Judgement.Text(deviation)}, correlation with the day before {Judgement.Text(correlation)}; 0, 1 and 0 expected.");
    }

    private static double[] Sorted(IReadOnlyList<double> transforms)
    {
        ForecastProbabilities.Require(transforms);
        double[] sorted = [.. transforms];
        Array.Sort(sorted);
        return sorted;
    }
}
