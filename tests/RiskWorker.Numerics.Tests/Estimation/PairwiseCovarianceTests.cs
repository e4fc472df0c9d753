using RiskWorker.Numerics.Estimation;
using RiskWorker.Numerics.LinearAlgebra;

namespace RiskWorker.Numerics.Tests.Estimation;

public sealed class PairwiseCovarianceTests
{
    private const double Gap = double.NaN;

    [Fact]
    public void Of_two_rows_with_gaps_gives_sums_worked_by_hand()
    {
        var equal = PairwiseCovariance.Of([1, 2, Gap, 4, 3, Gap, 5, 6], 2, DayWeights.Equal(4), 1);

        Assert.Equal([21.0 / 3, (3 + 24) / 2.0, (3 + 24) / 2.0, 70.0 / 3], equal.Matrix);
        Assert.Equal(new CommonDays(0, 1, 2), equal.Fewest);

        // Weights 1/8, 1/4, 1/2, 1: of the day in the table, not of the days that a pair has.
        var faded = PairwiseCovariance.Of([1, 2, Gap, 4, 3, Gap, 5, 6], 2, DayWeights.Exponential(4, 0.5), 1);
        Assert.Equal(((1.0 / 8 * 3) + 24) / (9.0 / 8), faded.Matrix[1], 1e-15);
        Assert.Equal(((1.0 / 8) + (4.0 / 4) + 16) / (11.0 / 8), faded.Matrix[0], 1e-15);
    }

    [Fact]
    public void Of_complete_rows_equals_the_plain_covariance_to_the_bit()
    {
        var rows = ReturnSeries.Normals(7 * 90, 3);
        var weights = DayWeights.Exponential(90, 0.94);
        var plain = WeightedGram.Of(rows, 7, weights);
        var total = 0.0;
        foreach (var weight in weights) total += weight;

        var pairwise = PairwiseCovariance.Of(rows, 7, weights, 90);

        Assert.Equal(plain.Select(g => g / total), pairwise.Matrix);
        Assert.Equal(new CommonDays(0, 0, 90), pairwise.Fewest);
    }

    [Fact]
    public void Of_rows_with_gaps_equals_the_loop_over_each_pairs_days()
    {
        const int n = 19, days = 70;
        var rows = ReturnSeries.Normals(n * days, 8);
        for (var k = 0; k < rows.Length; k += 3 + (k % 4)) rows[k] = Gap;
        var weights = DayWeights.Exponential(days, 0.97);

        var pairwise = PairwiseCovariance.Of(rows, n, weights, 5);

        var fewest = int.MaxValue;
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j < n; j++)
            {
                var (sum, total, count) = (0.0, 0.0, 0);
                for (var t = 0; t < days; t++)
                {
                    var product = rows[(i * days) + t] * rows[(j * days) + t];
                    if (!double.IsNaN(product)) (sum, total, count) = (sum + (weights[t] * product), total + weights[t], count + 1);
                }
                Assert.Equal(sum / total, pairwise.Matrix[(i * n) + j], 1e-13);
                Assert.Equal(pairwise.Matrix[(j * n) + i], pairwise.Matrix[(i * n) + j]);
                fewest = Math.Min(fewest, count);
            }
        }
        Assert.Equal(fewest, pairwise.Fewest.Days);
    }

    // Three rows that pair by pair agree, agree, and contradict: no common distribution has these correlations, and the repair takes over.
    [Fact]
    public void Of_contradicting_pairs_is_indefinite_and_repairable()
    {
        double[] rows = [1, -1, 1, -1, Gap, Gap, 1, -1, Gap, Gap, 1, -1, Gap, Gap, 1, -1, -1, 1];

        var matrix = PairwiseCovariance.Of(rows, 3, DayWeights.Equal(6), 2).Matrix;

        Assert.Equal([1, 1, 1, 1, 1, -1, 1, -1, 1], matrix);
        Assert.True(PivotedCholesky.Factor(matrix, 3).IsIndefinite);
        Assert.False(PivotedCholesky.Factor(NearestCorrelation.Of(matrix, 3).Matrix, 3).IsIndefinite);
    }

    [Fact]
    public void Of_too_few_common_days_names_the_pair()
    {
        double[] rows = [1, 2, Gap, 4, 3, Gap, 5, 6, 1, 1, 1, 1];
        Assert.Contains("Rows 0 and 1 have 2 days in common; every pair must have at least 3",
            Assert.Throws<ArgumentException>(() => PairwiseCovariance.Of(rows, 3, DayWeights.Equal(4), 3)).Message, StringComparison.Ordinal);
        Assert.Equal(new CommonDays(0, 1, 2), PairwiseCovariance.FewestDays(rows, 3));
        Assert.Equal(new CommonDays(1, 1, 0), PairwiseCovariance.FewestDays([1, 2, Gap, Gap], 2) with { First = 1 });
    }

    [Fact]
    public void Of_faulty_arguments_says_what_is_wrong()
    {
        Assert.Contains("4 elements; 2 rows under 3 weights have 6", Assert.Throws<ArgumentException>(() => PairwiseCovariance.Of([1, 2, 3, 4], 2, [1, 1, 1], 1)).Message, StringComparison.Ordinal);
        Assert.Contains("in row 1 on day 0", Assert.Throws<ArgumentException>(() => PairwiseCovariance.Of([1, 2, double.NegativeInfinity, 4], 2, [1, 1], 1)).Message, StringComparison.Ordinal);
        Assert.Contains("weights has 0 on day 1", Assert.Throws<ArgumentException>(() => PairwiseCovariance.Of([1, 2], 1, [1, 0], 1)).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => PairwiseCovariance.Of([1, 2], 1, [1, 1], 0));
        Assert.Throws<ArgumentOutOfRangeException>(() => DayWeights.Exponential(3, 1.5));
        Assert.Throws<ArgumentOutOfRangeException>(() => DayWeights.Equal(0));
    }
}
