using RiskWorker.Numerics.Distributions;
using RiskWorker.Numerics.LinearAlgebra;
using RiskWorker.Numerics.Optimisation;
using RiskWorker.Numerics.Statistics;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Statistics;

public sealed class StudentLikelihoodTests
{
    // Ten days of two factors under the covariance {1.5, 0.9; 0.9, 1.8}.
    private static readonly double[] Shocks =
    [
        0.31, -1.10, 0.05, 2.95, -0.48, 0.66, -0.12, -3.40, 0.83, -0.27,
        -0.42, -0.35, 0.22, 3.60, 0.10, 0.91, -0.77, -1.95, -0.15, 0.38,
    ];

    // scipy: the sum of stats.multivariate_t.logpdf + ½ ln det, maximised in 1/ν by optimize.minimize_scalar, the interval by brentq.
    [Fact]
    public void Fit_ten_days_equals_an_independent_maximisation()
    {
        DegreesOfFreedomFit fit = StudentLikelihood.Fit(Distances(), 2);
        Near(fit, 2.8962476881578274, -25.36109221083794, -28.22131828314107, 2.243674784895833, 12.651798946974008, 10);
    }

    // The same with weights 0.9^age, times the effective number of days.
    [Fact]
    public void Fit_weighted_days_equals_an_independent_maximisation()
    {
        double[] weights = [.. Enumerable.Range(0, 10).Select(t => Math.Pow(0.9, 9 - t))];
        DegreesOfFreedomFit fit = StudentLikelihood.Fit(Distances(), 2, weights);
        Near(fit, 2.970981968907604, -23.609444772478575, fit.NormalLogLikelihood, 2.249520450012234, 21.281820773870106, 9.175730307650229);
    }

    // scipy: half the sum over both factors of stats.t.logpdf of the standardised shocks.
    [Fact]
    public void FitComposite_ten_days_equals_an_independent_maximisation()
    {
        DegreesOfFreedomFit fit = StudentLikelihood.FitComposite(Standardised(), 2);
        Near(fit, 2.8179842944175175, -14.254197112271214, -15.623226998713394, 2.140639397139876, 200, 10);
    }

    [Fact]
    public void Fit_log_likelihood_is_the_sum_of_log_densities()
    {
        double[] x = StudentShocks.Of(1, 400, 5, 0, 3);
        DegreesOfFreedomFit fit = StudentLikelihood.FitComposite(x, 1);
        var student = new StudentT(fit.Nu);
        Assert.Equal(x.Sum(value => student.LogDensity(value / student.UnitScale) - Math.Log(student.UnitScale)), fit.LogLikelihood, 1e-10);
        Assert.Equal(x.Sum(value => -0.5 * ((value * value) + Math.Log(2 * Math.PI))), fit.NormalLogLikelihood, 1e-10);
    }

    [Theory]
    [InlineData(3)]
    [InlineData(5)]
    [InlineData(12)]
    public void Fit_seeded_samples_finds_the_degrees_within_the_interval(int nu)
    {
        const int factors = 5, days = 1500;
        double[] rows = StudentShocks.Of(factors, days, nu, 0.4, 11), squares = new double[days];
        MahalanobisDistances.Of(PivotedCholesky.Factor(StudentShocks.Correlation(factors, 0.4), factors), rows, squares);
        DegreesOfFreedomFit joint = StudentLikelihood.Fit(squares, factors), composite = StudentLikelihood.FitComposite(rows, factors);
        Assert.InRange(nu, joint.IntervalLow, joint.IntervalHigh);
        Assert.InRange(nu, composite.IntervalLow, composite.IntervalHigh);
        Assert.InRange(joint.IntervalHigh / joint.IntervalLow, 1, 1.8);
        Assert.True(composite.IntervalHigh / composite.IntervalLow > joint.IntervalHigh / joint.IntervalLow);
        Assert.True(joint.LogLikelihood > joint.NormalLogLikelihood + 2);
    }

    [Fact]
    public void Fit_normal_days_ends_near_the_normal_limit()
    {
        double[] rows = StudentShocks.Of(4, 800, 0, 0.3, 12), squares = new double[800];
        MahalanobisDistances.Of(PivotedCholesky.Factor(StudentShocks.Correlation(4, 0.3), 4), rows, squares);
        DegreesOfFreedomFit fit = StudentLikelihood.Fit(squares, 4);
        Assert.True(fit.Nu > 40);
        Assert.Equal(200, fit.IntervalHigh);
        Assert.InRange(fit.NormalLogLikelihood - fit.LogLikelihood, -2, 2);
    }

    // 60 samples of 250 days: 57 intervals are expected to hold the truth, fewer than 51 one time in a hundred. Seeds fixed.
    [Fact]
    public void FitComposite_intervals_of_one_factor_hold_the_truth_as_often_as_they_say()
    {
        int held = 0;
        for (ulong seed = 1; seed <= 60; seed++)
        {
            DegreesOfFreedomFit fit = StudentLikelihood.FitComposite(StudentShocks.Of(1, 250, 5, 0, 1000 + seed), 1);
            held += fit.IntervalLow <= 5 && fit.IntervalHigh >= 5 ? 1 : 0;
        }

        Assert.InRange(held, 51, 60);
    }

    [Fact]
    public void Fit_days_of_no_weight_are_days_left_out()
    {
        double[] squares = Distances(), weights = [1, 1, 1, 1, 1, 1, 1, 1, 0, 0];
        DegreesOfFreedomFit weighted = StudentLikelihood.Fit(squares, 2, weights), shorter = StudentLikelihood.Fit(squares.AsSpan(0, 8), 2);
        Near(weighted, shorter.Nu, shorter.LogLikelihood, shorter.NormalLogLikelihood, shorter.IntervalLow, shorter.IntervalHigh, 8);
    }

    [Fact]
    public void Fit_again_gives_the_same_bits()
    {
        DegreesOfFreedomFit first = StudentLikelihood.Fit(Distances(), 2), second = StudentLikelihood.Fit(Distances(), 2);
        BitAssert.Equal(first.Nu, second.Nu);
        BitAssert.Equal(first.LogLikelihood, second.LogLikelihood);
    }

    [Fact]
    public void Faulty_data_are_refused_by_place_and_value()
    {
        Assert.Contains("day 1 is -1", Assert.Throws<ArgumentException>(() => StudentLikelihood.Fit([1, -1], 2)).Message, StringComparison.Ordinal);
        Assert.Contains("0 days", Assert.Throws<ArgumentException>(() => StudentLikelihood.Fit([], 2)).Message, StringComparison.Ordinal);
        Assert.Contains("0 factors", Assert.Throws<ArgumentOutOfRangeException>(() => StudentLikelihood.Fit([1], 0)).Message, StringComparison.Ordinal);
        Assert.Contains("Factor 1 has NaN on day 0", Assert.Throws<ArgumentException>(() => StudentLikelihood.FitComposite([1, 2, double.NaN, 3], 2)).Message, StringComparison.Ordinal);
        Assert.Contains("3 elements", Assert.Throws<ArgumentException>(() => StudentLikelihood.FitComposite([1, 2, 3], 2)).Message, StringComparison.Ordinal);
        Assert.Contains("weight of day 1 is -0.5", Assert.Throws<ArgumentException>(() => StudentLikelihood.Fit([1, 2], 2, [1, -0.5])).Message, StringComparison.Ordinal);
        Assert.Contains("add up to 0", Assert.Throws<ArgumentException>(() => StudentLikelihood.Fit([1, 2], 2, [0, 0])).Message, StringComparison.Ordinal);
        Assert.Contains("1 elements; it must have 2", Assert.Throws<ArgumentException>(() => StudentLikelihood.Fit([1, 2], 2, [1])).Message, StringComparison.Ordinal);
    }

    private static double[] Distances()
    {
        double[] squares = new double[10];
        MahalanobisDistances.Of(PivotedCholesky.Factor([1.5, 0.9, 0.9, 1.8], 2), Shocks, squares);
        return squares;
    }

    private static double[] Standardised() => [.. Shocks.Select((x, i) => x / Math.Sqrt(i < 10 ? 1.5 : 1.8))];

    private static void Near(DegreesOfFreedomFit fit, double nu, double logLikelihood, double atNormal, double low, double high, double days)
    {
        Assert.InRange(fit.Nu / nu, 1 - 1e-6, 1 + 1e-6);
        Assert.Equal(logLikelihood, fit.LogLikelihood, 1e-11);
        Assert.Equal(atNormal, fit.NormalLogLikelihood, 1e-11);
        Assert.InRange(fit.IntervalLow / low, 1 - 1e-8, 1 + 1e-8);
        Assert.InRange(fit.IntervalHigh / high, 1 - 1e-8, 1 + 1e-8);
        Assert.Equal(days, fit.Days, 1e-12);
    }
}
