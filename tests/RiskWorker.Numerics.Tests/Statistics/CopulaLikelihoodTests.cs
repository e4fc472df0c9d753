using RiskWorker.Numerics.Distributions;
using RiskWorker.Numerics.LinearAlgebra;
using RiskWorker.Numerics.Optimisation;
using RiskWorker.Numerics.Statistics;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Statistics;

public sealed class CopulaLikelihoodTests
{
    // Two factors, ten days, standardised; margins of 3.5 and 6 degrees, correlation 0.9/√(1.5·1.8).
    private static readonly double[] First = [.. new[] { 0.31, -1.10, 0.05, 2.95, -0.48, 0.66, -0.12, -3.40, 0.83, -0.27 }.Select(x => x / Math.Sqrt(1.5))];
    private static readonly double[] Second = [.. new[] { -0.42, -0.35, 0.22, 3.60, 0.10, 0.91, -0.77, -1.95, -0.15, 0.38 }.Select(x => x / Math.Sqrt(1.8))];
    private static readonly double Correlation = 0.9 / Math.Sqrt(1.5 * 1.8);

    // scipy: stats.norm.ppf(stats.t.cdf(x √(m/(m-2)), m)).
    [Fact]
    public void NormalScores_equal_independent_ones()
    {
        double[] expected =
        [
            0.3566433314927209, -1.1468933191715336, 0.05809815947144843, 2.2150620128676737, -0.544701197134453, 0.7342764060907643, -0.13925674333275617,
            -2.3749167091992014, 0.902611557265913, -0.31138195552114883, -0.36563694509768746, -0.30525021145347747, 0.19235374733851915, 2.393466963020046,
            0.08754805381602956, 0.7756838568877453, -0.6612491773356646, -1.5326602666020794, -0.13126604879342715, 0.3311701025049804,
        ];
        double[] scores = Scores();
        for (int i = 0; i < expected.Length; i++)
            Assert.Equal(expected[i], scores[i], 1e-13);
    }

    // scipy: the sum of stats.multivariate_t.logpdf(stats.t.ppf(u, ν)) less stats.t.logpdf, maximised in 1/ν; its value there by mpmath, in
    // fifty digits, since the quantiles of scipy carry ten.
    [Fact]
    public void Fit_ten_days_equals_an_independent_maximisation()
    {
        DegreesOfFreedomFit fit = CopulaLikelihood.Fit(Scores(), PivotedCholesky.Factor([1, Correlation, Correlation, 1], 2));
        Assert.InRange(fit.Nu / 2.4868214578557057, 1 - 1e-6, 1 + 1e-6);
        Assert.Equal(4.90684843584957934, fit.LogLikelihood, 1e-11);
        Assert.Equal(4.280054441192973, fit.NormalLogLikelihood, 1e-10);
        Assert.Equal(2.05, fit.IntervalLow);
        Assert.Equal(200, fit.IntervalHigh);
    }

    [Fact]
    public void Fit_by_the_only_pair_is_the_fit_of_the_whole()
    {
        double[] weights = [1, 2, 3, 4, 5, 6, 7, 8, 9, 10];
        DegreesOfFreedomFit whole = CopulaLikelihood.Fit(Scores(), PivotedCholesky.Factor([1, Correlation, Correlation, 1], 2), weights);
        DegreesOfFreedomFit pair = CopulaPairLikelihood.Fit(Scores(), 2, [new(1, 0, Correlation)], weights);
        Assert.InRange(pair.Nu / whole.Nu, 1 - 1e-6, 1 + 1e-6);
        Assert.Equal(whole.LogLikelihood, pair.LogLikelihood, 1e-11);
        Assert.Equal(whole.NormalLogLikelihood, pair.NormalLogLikelihood, 1e-11);
        Assert.Equal(55.0 * 55 / 385, pair.Days, 1e-12);
    }

    // Independent factors of a normal copula have the density 1 in the limit: nothing to gain, whatever the margins.
    [Fact]
    public void Fit_independent_correlation_has_a_normal_limit_of_nothing()
    {
        double[] scores = StudentShocks.Of(3, 200, 0, 0, 21);
        DegreesOfFreedomFit fit = CopulaLikelihood.Fit(scores, PivotedCholesky.Factor(StudentShocks.Correlation(3, 0), 3));
        Assert.Equal(0, fit.NormalLogLikelihood, 1e-10);
        Assert.True(fit.Nu > 15);
    }

    // A t copula of 4 degrees under margins of 3 and 9 in turn: margins by their own likelihood, then the copula's.
    [Fact]
    public void Fit_seeded_sample_finds_margins_and_copula_within_their_intervals()
    {
        const int factors = 4, days = 1500, nu = 4;
        double[] shocks = StudentShocks.Of(factors, days, nu, 0.5, 22), scores = new double[shocks.Length];
        double unscale = Math.Sqrt(nu / (nu - 2.0));
        for (int j = 0; j < factors; j++)
        {
            double degrees = j % 2 == 0 ? 3 : 9;
            Span<double> row = shocks.AsSpan(j * days, days);
            for (int t = 0; t < days; t++)
                row[t] *= unscale;
            MarginMap.ToUnitVariance(nu, degrees).Of(row, row);
            DegreesOfFreedomFit margin = StudentLikelihood.FitComposite(row, 1);
            Assert.InRange(degrees, margin.IntervalLow, margin.IntervalHigh);
            CopulaLikelihood.NormalScores(row, margin.Nu, scores.AsSpan(j * days, days));
        }

        DegreesOfFreedomFit whole = CopulaLikelihood.Fit(scores, PivotedCholesky.Factor(StudentShocks.Correlation(factors, 0.5), factors));
        DegreesOfFreedomFit pairs = CopulaPairLikelihood.Fit(scores, factors, [new(0, 1, 0.5), new(1, 2, 0.5), new(2, 3, 0.5), new(3, 0, 0.5)]);
        Assert.InRange(nu, whole.IntervalLow, whole.IntervalHigh);
        Assert.InRange(nu, pairs.IntervalLow, pairs.IntervalHigh);
        Assert.True(whole.LogLikelihood > whole.NormalLogLikelihood + 50);
    }

    [Fact]
    public void NormalScores_far_out_are_cut_and_odd()
    {
        double[] scores = new double[5];
        CopulaLikelihood.NormalScores([1e200, -1e200, 0, 2.5, -2.5], 30, scores);
        Assert.Equal(CopulaLikelihood.HighestScore, scores[0]);
        Assert.Equal(-CopulaLikelihood.HighestScore, scores[1]);
        Assert.Equal(0, scores[2]);
        BitAssert.Equal(scores[3], -scores[4]);
    }

    [Fact]
    public void Faulty_data_are_refused_by_place_and_value()
    {
        PivotedCholesky factor = PivotedCholesky.Factor([1, 0.5, 0.5, 1], 2);
        Assert.Contains("Factor 1 has the score NaN on day 0", Assert.Throws<ArgumentException>(() => CopulaLikelihood.Fit([1, 2, double.NaN, 3], factor)).Message, StringComparison.Ordinal);
        Assert.Contains("3 elements", Assert.Throws<ArgumentException>(() => CopulaLikelihood.Fit([1, 2, 3], factor)).Message, StringComparison.Ordinal);
        Assert.Contains("rank 1 of 2", Assert.Throws<ArgumentException>(() => CopulaLikelihood.Fit(new double[4], PivotedCholesky.Factor([1, 1, 1, 1], 2))).Message, StringComparison.Ordinal);
        Assert.Contains("at least 2", Assert.Throws<ArgumentException>(() => CopulaLikelihood.Fit([1], PivotedCholesky.Factor([1], 1))).Message, StringComparison.Ordinal);
        Assert.Contains("day 1 is NaN", Assert.Throws<ArgumentException>(() => CopulaLikelihood.NormalScores([1, double.NaN], 5, new double[2])).Message, StringComparison.Ordinal);
        Assert.Contains("at least one", Assert.Throws<ArgumentException>(() => CopulaPairLikelihood.Fit(new double[4], 2, [])).Message, StringComparison.Ordinal);
        Assert.Contains("factors 1 and 1", Assert.Throws<ArgumentException>(() => CopulaPairLikelihood.Fit(new double[4], 2, [new(1, 1, 0.5)])).Message, StringComparison.Ordinal);
        Assert.Contains("correlation 1", Assert.Throws<ArgumentException>(() => CopulaPairLikelihood.Fit(new double[4], 2, [new(0, 1, 1)])).Message, StringComparison.Ordinal);
    }

    private static double[] Scores()
    {
        double[] scores = new double[20];
        CopulaLikelihood.NormalScores(First, 3.5, scores.AsSpan(0, 10));
        CopulaLikelihood.NormalScores(Second, 6, scores.AsSpan(10));
        return scores;
    }
}
