using MathNet.Numerics.Distributions;

namespace RiskWorker.Benchmarks.Quality;

/// <summary>A statistic with its law where the draws are what they should be.</summary>
/// <param name="Name">What was tested.</param>
/// <param name="Statistic">Its value.</param>
/// <param name="Law">Its law.</param>
/// <param name="P">Probability of a value at least as large.</param>
internal sealed record QualityTest(string Name, double Statistic, string Law, double P)
{
    /// <summary>Draws that fit too well are as wrong as draws that do not fit: both ends count.</summary>
    public bool Passes(double line) => P >= line / 2 && P <= 1 - (line / 2);

    public static QualityTest Normal(string name, double z) => new(name, z, "N(0, 1)", MathNet.Numerics.Distributions.Normal.CDF(0, 1, -z));

    public static QualityTest ChiSquare(string name, double statistic, int freedom) => new(name, statistic, $"chi-square, {freedom:N0}", 1 - ChiSquared.CDF(freedom, statistic));

    /// <summary>Σ (observed - expected)² / expected.</summary>
    public static QualityTest Counts(string name, ReadOnlySpan<long> observed, ReadOnlySpan<double> expected)
    {
        var sum = 0.0;
        for (var i = 0; i < observed.Length; i++) sum += (observed[i] - expected[i]) * (observed[i] - expected[i]) / expected[i];
        return ChiSquare(name, sum, observed.Length - 1);
    }

    public static QualityTest EvenCounts(string name, ReadOnlySpan<long> observed, double total)
    {
        var expected = new double[observed.Length];
        Array.Fill(expected, total / observed.Length);
        return Counts(name, observed, expected);
    }

    /// <summary>Σ of squared correlations of many pairs of series, each of <paramref name="length"/> numbers of mean 0 and variance 1, times that length.</summary>
    public static QualityTest Correlations(string name, IEnumerable<double> products, double length)
    {
        var squares = products.Select(p => p * p / length).ToList();
        return ChiSquare(name, squares.Sum(), squares.Count);
    }
}
