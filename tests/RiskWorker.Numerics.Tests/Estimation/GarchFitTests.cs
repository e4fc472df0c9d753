using RiskWorker.Numerics.Estimation;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Estimation;

public sealed class GarchFitTests
{
    private static readonly double[] Marks = ReturnSeries.MarkPound();

    // Fiorentini, Calzolari and Panattoni (1996), the benchmark of McCullough and Renfro (1998) and Brooks, Burke and Persand (2001):
    // -0.00619041, 0.0107613, 0.153134, 0.805974 with -1106.608 (from memory; omega is printed cut, not rounded). The longer digits
    // were computed by scoring in extended precision.
    [Fact]
    public void Of_the_published_benchmark_gives_its_digits()
    {
        var fit = GarchFit.Of(Marks);

        Assert.True(fit.IsConverged);
        Assert.Equal(-0.00619041, fit.Parameters.Mean, 5e-9);
        Assert.Equal(0.0107613, fit.Parameters.Omega, 1e-7);
        Assert.Equal(0.153134, fit.Parameters.Alpha, 5e-7);
        Assert.Equal(0.805974, fit.Parameters.Beta, 5e-7);
        Assert.Equal(-0.006190408379964, fit.Parameters.Mean, 2e-9);
        Assert.Equal(0.010761397851751, fit.Parameters.Omega, 2e-9);
        Assert.Equal(0.153134061819908, fit.Parameters.Alpha, 2e-9);
        Assert.Equal(0.805973670306192, fit.Parameters.Beta, 2e-9);
        Assert.Equal(-1106.6078810412887, fit.LogLikelihood, 1e-9);
        Assert.Equal(GarchBounds.None, fit.Bounds);
        Assert.InRange(fit.SlopeNorm, 0, 1e-9);
        Assert.Equal(Marks.Length, fit.Variance.Variances.Length);
    }

    // garch-reference.csv: scipy's Nelder-Mead over the parameters themselves, from five starts.
    [Fact]
    public void Of_windows_equals_another_optimisers_maxima()
    {
        foreach (var row in Table.Rows("estimation/garch-reference.csv"))
        {
            var window = Marks.AsSpan((int)Table.Number(row[0]), (int)Table.Number(row[1]));

            var fit = GarchFit.Of(window, row[2].Length > 0 ? Table.Number(row[2]) : null);

            Assert.True(fit.IsConverged);
            Assert.InRange(fit.LogLikelihood, Table.Number(row[7]) - 1e-9, Table.Number(row[7]) + 1e-6);
            Assert.Equal(Table.Number(row[3]), fit.Parameters.Mean, 1e-6);
            Assert.Equal(Table.Number(row[4]), fit.Parameters.Omega, 1e-6);
            Assert.Equal(Table.Number(row[5]), fit.Parameters.Alpha, 1e-5);
            Assert.Equal(Table.Number(row[6]), fit.Parameters.Beta, 1e-5);
            Assert.Equal(Table.Number(row[8]), fit.Variance.Forecast, 1e-6);
        }
    }

    [Fact]
    public void Of_a_series_times_a_power_of_two_scales_to_the_bit()
    {
        var fit = GarchFit.Of(Marks.AsSpan(0, 600));
        var scaled = GarchFit.Of(Array.ConvertAll(Marks[..600], x => x / 128));

        BitAssert.Equal(fit.Parameters.Alpha, scaled.Parameters.Alpha);
        BitAssert.Equal(fit.Parameters.Beta, scaled.Parameters.Beta);
        BitAssert.Equal(fit.Parameters.Mean / 128, scaled.Parameters.Mean);
        BitAssert.Equal(fit.Parameters.Omega / (128 * 128), scaled.Parameters.Omega);
        BitAssert.Equal(fit.Variance.Forecast / (128 * 128), scaled.Variance.Forecast);
        Assert.Equal(fit.LogLikelihood + (600 * Math.Log(128)), scaled.LogLikelihood, 1e-9);
    }

    [Fact]
    public void Of_a_shifted_series_shifts_the_mean_alone()
    {
        var fit = GarchFit.Of(Marks.AsSpan(0, 600));
        var shifted = GarchFit.Of(Array.ConvertAll(Marks[..600], x => x + 3));

        Assert.Equal(fit.Parameters.Mean + 3, shifted.Parameters.Mean, 1e-8);
        Assert.Equal(fit.Parameters.Alpha, shifted.Parameters.Alpha, 1e-7);
        Assert.Equal(fit.Parameters.Beta, shifted.Parameters.Beta, 1e-7);
    }

    // Both estimates have standard errors of about 0.01 at 20,000 days.
    [Fact]
    public void Of_a_simulated_process_finds_its_parameters()
    {
        var process = new GarchParameters(0.01, 0.02, 0.08, 0.9);

        var fit = GarchFit.Of(ReturnSeries.Garch(process, 20_000, seed: 5));

        Assert.True(fit.IsConverged);
        Assert.Equal(process.Alpha, fit.Parameters.Alpha, 0.02);
        Assert.Equal(process.Beta, fit.Parameters.Beta, 0.03);
        Assert.Equal(process.LevelVariance, fit.Parameters.LevelVariance, 0.15);
    }

    [Fact]
    public void Of_independent_days_ends_at_no_reaction_or_close_to_it_and_says_so()
    {
        var seen = GarchBounds.None;
        for (var seed = 1; seed <= 20; seed++)
        {
            var series = ReturnSeries.Normals(500, seed);
            var fit = GarchFit.Of(series);
            Assert.True(fit.IsConverged, $"Seed {seed} ended with a slope of {fit.SlopeNorm}.");
            Assert.Equal(fit.Parameters.Alpha == 0, (fit.Bounds & GarchBounds.NoReaction) != 0);
            Assert.InRange(fit.Parameters.Alpha, 0, 0.15);
            // Constant variance is one of the processes, and stands for all that do not react.
            Assert.True(fit.LogLikelihood >= ConstantLikelihood(series) - 1e-9);
            if (fit.Parameters.Alpha == 0)
            {
                Assert.Equal(0, fit.Parameters.Beta);
                Assert.Equal(fit.Parameters.Omega, fit.Variance.Forecast);
                Assert.Equal(ConstantLikelihood(series), fit.LogLikelihood, 1e-9);
            }
            seen |= fit.Bounds;
        }
        Assert.True((seen & GarchBounds.NoReaction) != 0, "None of twenty series without reaction ended there.");
    }

    [Fact]
    public void Of_an_arch_series_finds_no_memory()
    {
        var seen = 0;
        for (var seed = 1; seed <= 10; seed++)
        {
            var fit = GarchFit.Of(ReturnSeries.Garch(new(0, 1, 0.5, 0), 1000, seed));
            Assert.True(fit.IsConverged);
            Assert.Equal(fit.Parameters.Beta == 0, (fit.Bounds & GarchBounds.NoMemory) != 0);
            Assert.InRange(fit.Parameters.Beta, 0, 0.15);
            seen += fit.Parameters.Beta == 0 ? 1 : 0;
        }
        Assert.InRange(seen, 1, 10);
    }

    // Variance that doubles in the middle and stays: the likelihood wants a unit root.
    [Fact]
    public void Of_a_series_whose_level_drifts_stays_below_a_persistence_of_one()
    {
        var series = ReturnSeries.Normals(1000, 3);
        for (var t = 0; t < series.Length; t++) series[t] *= Math.Exp(t / 250.0);

        var fit = GarchFit.Of(series);

        Assert.True(fit.IsConverged);
        Assert.True(fit.Parameters.Persistence < 1);
        Assert.InRange(fit.Parameters.Persistence, 0.98, 1);
    }

    [Fact]
    public void Of_stale_and_wild_series_converges_or_says_that_it_did_not()
    {
        for (var seed = 1; seed <= 30; seed++)
        {
            var series = ReturnSeries.Normals(300, seed);
            for (var t = 0; t < series.Length; t++)
            {
                if (seed % 3 == 0 && t % 3 != 0 || seed % 3 == 1 && t >= 270) series[t] = 0;
                if (seed % 5 == 0 && t % 97 == 50) series[t] *= 25;
            }
            var fit = GarchFit.Of(series, seed % 2 == 0 ? 0 : null);
            Assert.True(fit.IsConverged, $"Seed {seed}: slope {fit.SlopeNorm} at {fit.Parameters}, {fit.Iterations} steps.");
            Assert.All(fit.Variance.Variances, v => Assert.True(v > 0 && double.IsFinite(v)));
            Assert.True(fit.LogLikelihood >= ConstantLikelihood(series, seed % 2 == 0 ? 0 : null) - 1e-9);
        }
    }

    [Fact]
    public void Of_a_fixed_mean_keeps_it()
    {
        var fit = GarchFit.Of(Marks, 0.02);

        Assert.Equal(0.02, fit.Parameters.Mean);
        Assert.Equal(0.02, fit.Variance.Mean);
        Assert.True(fit.LogLikelihood < GarchFit.Of(Marks).LogLikelihood);
    }

    [Fact]
    public void LogLikelihoodOf_the_published_point_is_the_published_one() =>
        Assert.Equal(-1106.6078810439, GarchFit.LogLikelihoodOf(Marks, new GarchParameters(-0.00619041, 0.0107613, 0.153134, 0.805974).Filter(Marks)), 1e-9);

    [Fact]
    public void Variances_follow_the_recursion_by_hand()
    {
        var variance = new GarchParameters(0.5, 1, 0.25, 0.5).Filter([1.5, 0.5, -1.5]);

        const double start = 5.0 / 3;
        const double first = 1 + (0.25 * start) + (0.5 * start);
        Assert.Equal([first, 1 + 0.25 + (0.5 * first), 1 + (0.5 * (1.25 + (0.5 * first)))], variance.Variances);
        Assert.Equal(1 + (0.25 * 4) + (0.5 * variance.Variances[2]), variance.Forecast, 1e-15);
    }

    [Fact]
    public void Slope_equals_the_difference_quotient_of_the_likelihood()
    {
        var likelihood = new GarchLikelihood(Marks[..203]);
        var numbers = new SeededNumbers(8);
        double[] slope = new double[4], other = new double[4];
        for (var round = 0; round < 50; round++)
        {
            double[] x = [numbers.Between(0.001, 1), numbers.Between(0.01, 0.99), numbers.Between(0, 1), numbers.Between(-0.3, 0.3)];
            likelihood.Of(x, slope);
            for (var i = 0; i < 4; i++)
            {
                double[] up = [.. x], down = [.. x];
                (up[i], down[i]) = (x[i] + 1e-6, x[i] - 1e-6);
                var quotient = (likelihood.Of(up, other) - likelihood.Of(down, other)) / (up[i] - down[i]);
                Assert.Equal(quotient, slope[i], 1e-7 * (1 + Math.Abs(quotient)));
            }
        }
    }

    [Fact]
    public void Sums_equal_the_scalar_twin_to_the_bit()
    {
        var numbers = new SeededNumbers(9);
        for (var width = 0; width <= 264; width += 8)
        {
            var rows = numbers.Between(-2, 2, GarchSums.Rows * width);
            for (var t = 0; t < width; t++) rows[width + t] = numbers.Between(1e-6, 4);
            var (wide, narrow) = (GarchSums.Of(rows, width), GarchSums.OfInTurn(rows, width));
            BitAssert.Equal(
                [narrow.Logarithms, narrow.Ratios, narrow.Errors, narrow.Omega, narrow.Alpha, narrow.Beta, narrow.Mean],
                [wide.Logarithms, wide.Ratios, wide.Errors, wide.Omega, wide.Alpha, wide.Beta, wide.Mean]);
        }
    }

    [Fact]
    public void Of_what_is_no_series_says_what_is_wrong()
    {
        Assert.Contains("has 99 days; at least 100 are needed", Assert.Throws<ArgumentException>(() => GarchFit.Of(Marks.AsSpan(0, 99))).Message, StringComparison.Ordinal);
        Assert.Contains("a series that varies", Assert.Throws<ArgumentException>(() => GarchFit.Of(Enumerable.Repeat(0.1, 500).ToArray())).Message, StringComparison.Ordinal);
        Assert.Contains("a series that varies", Assert.Throws<ArgumentException>(() => GarchFit.Of(new double[500], 0)).Message, StringComparison.Ordinal);
        double[] broken = [.. Marks[..200]];
        broken[57] = double.NaN;
        Assert.Contains("NaN on day 57", Assert.Throws<ArgumentException>(() => GarchFit.Of(broken)).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => GarchFit.Of(Marks, double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => GarchFit.Of(Marks, fewestDays: 5));
        Assert.Throws<ArgumentException>(() => new GarchParameters(0, 0, 0.1, 0.8).Filter(Marks));
        Assert.Throws<ArgumentException>(() => new GarchParameters(0, 1, -0.1, 0.8).Filter(Marks));
    }

    private static double ConstantLikelihood(double[] series, double? mean = null)
    {
        var centre = mean ?? series.Average();
        return -0.5 * series.Length * (Math.Log(2 * Math.PI * series.Average(x => (x - centre) * (x - centre))) + 1);
    }
}
