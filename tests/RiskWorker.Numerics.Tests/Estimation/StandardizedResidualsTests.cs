using RiskWorker.Numerics.Estimation;

namespace RiskWorker.Numerics.Tests.Estimation;

public sealed class StandardizedResidualsTests
{
    [Fact]
    public void Write_residuals_of_a_filter_have_mean_zero_and_variance_one()
    {
        var marks = ReturnSeries.MarkPound();
        var fit = GarchFit.Of(marks);
        var residuals = new double[marks.Length];

        var taken = StandardizedResiduals.Write(marks, fit.Variance, residuals);

        Assert.Equal(0, residuals.Average(), 1e-15);
        Assert.Equal(1, residuals.Average(z => z * z), 1e-14);
        Assert.InRange(taken.Mean, -0.1, 0.1);
        Assert.Equal(1, taken.Deviation, 0.01);
        var day = 700;
        var raw = (marks[day] - fit.Parameters.Mean) / Math.Sqrt(fit.Variance.Variances[day]);
        Assert.Equal((raw - taken.Mean) / taken.Deviation, residuals[day], 1e-14);
    }

    [Fact]
    public void Write_by_hand()
    {
        var residuals = new double[2];

        var taken = StandardizedResiduals.Write([3, -1], new(1, [4, 1], 1), residuals);

        Assert.Equal(new StandardizedResiduals(-0.5, 1.5), taken);
        Assert.Equal([1, -1], residuals);
    }

    [Fact]
    public void Write_into_the_same_memory_equals_writing_apart()
    {
        double[] series = ReturnSeries.Normals(101, 4), apart = new double[101];
        var variance = EwmaVariance.Of(series, 0.94);
        StandardizedResiduals.Write(series, variance, apart);
        StandardizedResiduals.Write(series, variance, series);
        Assert.Equal(apart, series);
    }

    [Fact]
    public void Write_series_that_does_not_vary_gives_zeros()
    {
        var residuals = new double[] { 9, 9, 9 };
        Assert.Equal(0, StandardizedResiduals.Write([0, 0, 0], EwmaVariance.Of([0, 0, 0], 0.94), residuals).Deviation);
        Assert.Equal([0, 0, 0], residuals);
        Assert.Equal(0, StandardizedResiduals.Write([0.1, 0.1, 0.1], new(0, [0.3, 0.3, 0.3], 0.3), residuals).Deviation);
        Assert.Equal([0, 0, 0], residuals);
    }

    [Fact]
    public void Write_faulty_arguments_says_what_is_wrong()
    {
        var fault = Assert.Throws<ArgumentException>(() => StandardizedResiduals.Write([0, 1], new(0, [0, 0], 0), new double[2]));
        Assert.Contains("The variance of day 1 is 0", fault.Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => StandardizedResiduals.Write([0, 1], new(0, [1], 0), new double[2]));
        Assert.Throws<ArgumentException>(() => StandardizedResiduals.Write([0, 1], new(0, [1, 1], 0), new double[3]));
        Assert.Throws<ArgumentException>(() => StandardizedResiduals.Write([0, double.NaN], new(0, [1, 1], 0), new double[2]));
    }
}
