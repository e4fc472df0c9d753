using RiskWorker.Numerics.Estimation;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Estimation;

public sealed class VarianceStepTests
{
    private static readonly GarchParameters Process = new(0.001, 0.02, 0.1, 0.85);

    [Fact]
    public void Advance_every_length_and_alignment_equals_the_scalar_form()
    {
        var numbers = new SeededNumbers(41);
        for (int length = 0; length <= 257; length++)
        {
            ReadOnlySpan<double> z = numbers.Between(-4, 4, length + 5).AsSpan(length % 5, length);
            var variance = new GuardedBuffer<double>(length, -1, length % 7);
            var move = new GuardedBuffer<double>(length, -1, length % 3);
            double[] expectedMove = new double[length], expectedVariance = new double[length];
            for (int s = 0; s < length; s++)
            {
                (variance.Span[s], move.Span[s]) = (numbers.Between(0, 3), numbers.Between(-1, 1));
                (expectedMove[s], expectedVariance[s]) = VarianceStep.Advance(Process, z[s], variance.Span[s], move.Span[s]);
            }

            VarianceStep.Advance(Process, z, variance.Span, move.Span);

            BitAssert.Equal(expectedMove, move.Span);
            BitAssert.Equal(expectedVariance, variance.Span);
            variance.AssertIntact();
            move.AssertIntact();
        }
    }

    // E[v_{n+h}] = level + persistence^(h-1) (v_{n+1} - level); the moves' variance is the sum of those.
    [Fact]
    public void Advance_over_days_has_the_mean_variance_of_the_process()
    {
        const int n = 200_000, days = 10;
        double[] variance = new double[n], move = new double[n];
        Array.Fill(variance, 1.0);
        for (var day = 0; day < days; day++) VarianceStep.Advance(Process, ReturnSeries.Normals(n, 100 + day), variance, move);

        var expected = Enumerable.Range(0, days).Sum(h => Process.LevelVariance + (Math.Pow(Process.Persistence, h) * (1 - Process.LevelVariance)));
        var centre = days * Process.Mean;
        var squares = move.Select(x => (x - centre) * (x - centre)).ToArray();
        var error = Math.Sqrt(squares.Average(x => (x - expected) * (x - expected)) / n);
        Assert.Equal(expected, squares.Average(), 4 * error);
        var last = Process.LevelVariance + (Math.Pow(Process.Persistence, days) * (1 - Process.LevelVariance));
        Assert.Equal(last, variance.Average(), 4 * Math.Sqrt(variance.Average(v => (v - last) * (v - last)) / n));
    }

    [Fact]
    public void Advance_of_a_filters_residuals_rebuilds_its_series()
    {
        var marks = ReturnSeries.MarkPound()[..300];
        var process = EwmaVariance.AsProcess(0.94, 0.01);
        var filtered = EwmaVariance.Of(marks, 0.94, 0.01);
        double variance = filtered.Variances[0], total = 0;
        for (var t = 0; t < marks.Length; t++)
        {
            Assert.Equal(filtered.Variances[t], variance, 1e-14);
            (total, variance) = VarianceStep.Advance(process, (marks[t] - 0.01) / Math.Sqrt(filtered.Variances[t]), variance, total);
        }
        Assert.Equal(filtered.Forecast, variance, 1e-14);
        Assert.Equal(marks.Sum(), total, 1e-12);
    }

    [Fact]
    public void Advance_allocates_nothing_and_refuses_unequal_lengths()
    {
        double[] z = new double[100], variance = new double[100], move = new double[100];
        Assert.Equal(0, Allocations.FewestOf(() => VarianceStep.Advance(Process, z, variance, move)));
        Assert.Throws<ArgumentException>(() => VarianceStep.Advance(Process, z, variance.AsSpan(1), move));
        Assert.Throws<ArgumentException>(() => VarianceStep.Advance(Process, z, variance, move.AsSpan(1)));
        Assert.Throws<ArgumentOutOfRangeException>(() => EwmaVariance.AsProcess(1));
    }
}
