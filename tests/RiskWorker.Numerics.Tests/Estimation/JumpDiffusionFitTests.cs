using RiskWorker.Numerics.Estimation;

namespace RiskWorker.Numerics.Tests.Estimation;

public sealed class JumpDiffusionFitTests
{
    // Twenty days of ±1 and two jumps, 9 and 11: all of it can be done by hand.
    [Fact]
    public void Of_a_series_by_hand_separates_days_and_keeps_the_variance()
    {
        double[] series = [1, -1, 1, -1, 1, -1, 9, 1, -1, 1, -1, 1, -1, 1, 11, -1, 1, -1, 1, -1, 1, -1];

        var fit = JumpDiffusionFit.Of(series, 4);

        Assert.Equal(1, fit.Diffusion, 1e-15);
        Assert.Equal(2.0 / 22, fit.Own.Intensity);
        Assert.Equal(10, fit.Own.Mean);
        Assert.Equal(0, fit.Own.Deviation);
        Assert.Equal(2, fit.Own.Days);
        Assert.Equal(JumpCaveats.None, fit.Own.Caveats);
        Assert.Equal(JumpCaveats.NoJumps, fit.Common.Caveats);
        Assert.Equal((20 + 81 + 121) / 22.0, fit.Variance, 1e-13);
    }

    [Fact]
    public void Of_a_simulated_process_finds_its_parameters()
    {
        // Standard errors at 20,000 days and 200 jumps: intensity 0.0007, mean 0.0014, deviation 0.001, diffusion 0.00005. Jumps
        // below the threshold are missed: 1 in 27 here.
        var series = ReturnSeries.Jumping(20_000, 0.01, 0.01, -0.08, 0.02, seed: 4);

        var fit = JumpDiffusionFit.Of(series, 4);

        Assert.Equal(0.01, fit.Diffusion, 0.0002);
        Assert.Equal(0.01, fit.Own.Intensity, 0.003);
        Assert.Equal(-0.08, fit.Own.Mean, 0.006);
        Assert.Equal(0.02, fit.Own.Deviation, 0.004);
    }

    [Theory]
    [InlineData(0.01, -0.05, 0.03)]
    [InlineData(0.03, 0, 0.06)]
    [InlineData(0.002, 0.04, 0)]
    [InlineData(0, 0, 0)]
    public void Variance_of_the_fit_is_the_mean_square_of_the_series(double intensity, double mean, double deviation)
    {
        for (var seed = 1; seed <= 40; seed++)
        {
            var series = ReturnSeries.Jumping(250, 0.01, intensity, mean, deviation, seed);
            for (var c = 2.5; c < 6; c += 0.5)
            {
                var fit = JumpDiffusionFit.Of(series, c);
                var expected = series.Average(x => x * x);
                Assert.Equal(expected, fit.Variance, 1e-13 * expected);
                Assert.True(fit.Diffusion > 0);
            }
        }
    }

    [Fact]
    public void Of_a_single_jump_takes_its_size_and_lowers_the_diffusion()
    {
        var series = Enumerable.Range(0, 100).Select(t => t == 40 ? -7.0 : t % 2 == 0 ? 1 : -1).ToArray();

        var fit = JumpDiffusionFit.Of(series, 4);

        Assert.Equal(new JumpSizes(0.01, -7, 0, 1, JumpCaveats.SingleJump | JumpCaveats.DeviationAtZero), fit.Own);
        Assert.Equal(Math.Sqrt(0.99), fit.Diffusion, 1e-14);
    }

    [Fact]
    public void Of_normal_days_finds_no_jumps_at_five_deviations_and_says_so()
    {
        var series = ReturnSeries.Normals(1000, 6);

        var fit = JumpDiffusionFit.Of(series, 5);

        Assert.Equal(new JumpSizes(0, 0, 0, 0, JumpCaveats.NoJumps), fit.Own);
        Assert.Equal(Math.Sqrt(series.Average(x => x * x)), fit.Diffusion, 1e-14);
    }

    // P(|z| > 3) is 0.0027: 54 of 20,000, standard error 7.3 (4 of them). Without the correction for what is cut off there would be 16 in a hundred more.
    [Fact]
    public void Mark_of_normal_days_has_the_threshold_where_it_belongs()
    {
        var jumps = new bool[20_000];

        var deviation = JumpThreshold.Mark(ReturnSeries.Normals(20_000, 8), 3, jumps);

        Assert.Equal(1, deviation, 4 * Math.Sqrt(0.5 / 20_000));
        Assert.InRange(jumps.Count(j => j), 54 - 30, 54 + 30);
    }

    [Fact]
    public void Mark_days_are_exactly_those_beyond_the_deviation_it_returns()
    {
        for (var seed = 1; seed <= 50; seed++)
        {
            var series = ReturnSeries.Jumping(300, 0.01, 0.03, -0.02, 0.03, seed);
            var jumps = new bool[300];
            var deviation = JumpThreshold.Mark(series, 3, jumps);
            for (var t = 0; t < 300; t++) Assert.Equal(Math.Abs(series[t]) > 3 * deviation, jumps[t]);
        }
    }

    // Barndorff-Nielsen and Shephard (2004): of normals it estimates the deviation, and a few jumps move it little.
    [Fact]
    public void Bipower_is_the_deviation_and_hardly_sees_jumps()
    {
        var series = ReturnSeries.Normals(20_000, 9);
        Assert.Equal(1, JumpThreshold.Bipower(series), 4 * Math.Sqrt(0.65 / 20_000));
        for (var t = 100; t < series.Length; t += 1000) series[t] += 30;
        Assert.InRange(JumpThreshold.Bipower(series), 0.98, 1.06);
        Assert.Equal(Math.Sqrt(Math.PI / 2 * (2 + 6) / 2), JumpThreshold.Bipower([1, -2, 3]), 1e-14);
    }

    [Fact]
    public void Mark_stale_series_starts_from_all_days()
    {
        var series = Enumerable.Range(0, 100).Select(t => t == 50 ? 30.0 : t % 2 == 0 ? 0 : t % 4 == 1 ? 1 : -1).ToArray();
        var jumps = new bool[100];
        JumpThreshold.Mark(series, 4, jumps);
        Assert.Equal(50, Array.IndexOf(jumps, true));
        Assert.Equal(1, jumps.Count(j => j));
        Assert.Equal(0, JumpThreshold.Mark(new double[30], 4, jumps.AsSpan(0, 30)));
        Assert.DoesNotContain(true, jumps[..30]);
    }

    [Fact]
    public void OfSeveral_separates_common_days_from_own_ones()
    {
        const int days = 400;
        double[][] series = [.. Enumerable.Range(1, 4).Select(seed => ReturnSeries.Normals(days, seed))];
        int[] common = [50, 120, 300];
        for (var i = 0; i < 4; i++)
        {
            // The fourth series moves with the others by too little to pass its own threshold.
            for (var k = 0; k < 3; k++) series[i][common[k]] = i == 3 ? 1.5 + (0.5 * k) : (i == 1 ? -1 : 1) * (12 + (3 * k));
        }
        (series[0][77], series[0][78]) = (20, -14);
        series[3][200] = 9;
        double[] rows = [.. series.SelectMany(s => s)];
        var commonDays = new bool[days];

        var fits = JumpDiffusionFit.OfSeveral(rows, 4, 5, 0.75, commonDays);

        Assert.Equal(common, Enumerable.Range(0, days).Where(t => commonDays[t]));
        Assert.All(fits, f => Assert.Equal(3.0 / days, f.Common.Intensity));
        Assert.Equal([15, -15, 15, 2], fits.Select(f => f.Common.Mean));
        Assert.Equal([2, 0, 0, 1], fits.Select(f => f.Own.Days));
        Assert.Equal(3, fits[0].Own.Mean);
        for (var i = 0; i < 4; i++)
        {
            Assert.Equal(series[i].Average(x => x * x), fits[i].Variance, 1e-13);
            var quiet = Enumerable.Range(0, days).Where(t => !commonDays[t] && !(i == 0 && t is 77 or 78) && !(i == 3 && t == 200)).Average(t => series[i][t] * series[i][t]);
            // The variance of 12, 15, 18 is 6 on common days; for the fourth series it is below the diffusion's, and the deviation is 0.
            Assert.Equal(i == 3 ? 0 : Math.Sqrt(6 - quiet), fits[i].Common.Deviation, 1e-12);
            Assert.Equal(i == 3, (fits[i].Common.Caveats & JumpCaveats.DeviationAtZero) != 0);
        }
    }

    [Fact]
    public void OfSeveral_of_one_series_makes_every_jump_common()
    {
        var series = ReturnSeries.Jumping(500, 0.01, 0.02, -0.06, 0.02, 5);
        var commonDays = new bool[500];

        var several = JumpDiffusionFit.OfSeveral(series, 1, 4, 1, commonDays)[0];

        var single = JumpDiffusionFit.Of(series, 4);
        Assert.Equal(single.Own, several.Common);
        Assert.Equal(single.Diffusion, several.Diffusion, 1e-16);
        Assert.Equal(0, several.Own.Days);
    }

    [Fact]
    public void OfSeveral_without_a_jump_has_no_common_day()
    {
        var commonDays = new bool[100];
        var fits = JumpDiffusionFit.OfSeveral(ReturnSeries.Normals(300, 2), 3, 6, 0.01, commonDays);
        Assert.DoesNotContain(true, commonDays);
        Assert.All(fits, f => Assert.Equal((JumpCaveats.NoJumps, JumpCaveats.NoJumps), (f.Own.Caveats, f.Common.Caveats)));
    }

    [Fact]
    public void Of_faulty_arguments_says_what_is_wrong()
    {
        var series = ReturnSeries.Normals(100, 1);
        Assert.Contains("has 19 days; at least 20", Assert.Throws<ArgumentException>(() => JumpDiffusionFit.Of(series.AsSpan(0, 19), 4)).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => JumpDiffusionFit.Of(series, 2));
        Assert.Throws<ArgumentOutOfRangeException>(() => JumpDiffusionFit.Of(series, double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => JumpDiffusionFit.OfSeveral(series, 2, 4, 0, new bool[50]));
        Assert.Contains("commonDays has 49 elements; it must have 50", Assert.Throws<ArgumentException>(() => JumpDiffusionFit.OfSeveral(series, 2, 4, 0.5, new bool[49])).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => JumpThreshold.Mark(series, 4, new bool[99]));
        series[7] = double.NaN;
        Assert.Contains("NaN on day 7", Assert.Throws<ArgumentException>(() => JumpDiffusionFit.Of(series, 4)).Message, StringComparison.Ordinal);
        Assert.Contains("NaN in row 0 on day 7", Assert.Throws<ArgumentException>(() => JumpDiffusionFit.OfSeveral(series, 2, 4, 0.5, new bool[50])).Message, StringComparison.Ordinal);
    }
}
