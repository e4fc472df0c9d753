using System.Globalization;
using RiskWorker.Numerics.Statistics;

namespace RiskWorker.Numerics.Tests.Statistics;

public sealed class MomentsTests
{
    // NIST StRD certified values; for NumAcc3 and NumAcc4 the exact moments of the data as doubles (Data/nist/README.md).
    [Theory]
    [InlineData("lew", 200, -177.435, 277.33216804431614, -0.30730480060567945)]
    [InlineData("lottery", 218, 518.958715596330, 291.69972747096908, -0.12094862296739287)]
    [InlineData("mavro", 50, 2.001856, 0.00042912345400308541, 0.9379891834382589)]
    [InlineData("michelson", 100, 299.8524, 0.079010547819050667, 0.53519966862126359)]
    [InlineData("pidigits", 5000, 4.5348, 2.8673390602887081, -0.0035509928723797215)]
    [InlineData("NumAcc1", 3, 10000002, 1, -0.5)]
    [InlineData("NumAcc2", 1001, 1.2, 0.099999999999999978, -0.999)]
    [InlineData("NumAcc3", 1001, 1000000.2, 0.1000000000349246, -0.9989999999994185)]
    [InlineData("NumAcc4", 1001, 10000000.2, 0.10000000055879354, -0.99899999999069608)]
    public void Of_reference_set_gives_its_certified_moments(string set, int count, double mean, double deviation, double lagOne)
    {
        var moments = Moments.Of(Read(set));

        Assert.Equal(count, moments.Count);
        Close(mean, moments.Mean, 1e-13);
        Close(deviation, moments.SampleDeviation, 1e-13);
        Close(lagOne, moments.LagOneAutocorrelation, 1e-12);
        Close(deviation * Math.Sqrt((count - 1.0) / count), moments.PopulationDeviation, 1e-13);
    }

    [Fact]
    public void Of_small_series_gives_moments_worked_by_hand()
    {
        var moments = Moments.Of([2, 4, 4, 4, 5, 5, 7, 9]); // mean 5, squared deviations 32, lag-1 products 3+1+1+0+0+0+8

        Assert.Equal(5, moments.Mean);
        Assert.Equal(2, moments.PopulationDeviation);
        Assert.Equal(Math.Sqrt(32.0 / 7), moments.SampleDeviation);
        Assert.Equal(13.0 / 32, moments.LagOneAutocorrelation);
    }

    [Fact]
    public void Of_one_value_has_a_mean_and_no_sample_deviation()
    {
        var moments = Moments.Of([3]);

        Assert.Equal(3, moments.Mean);
        Assert.Equal(0, moments.PopulationDeviation);
        Assert.Equal(double.NaN, moments.SampleDeviation);
    }

    [Fact]
    public void Of_nothing_or_of_NaN_gives_NaN()
    {
        Assert.Equal(double.NaN, Moments.Of([]).Mean);
        Assert.Equal(double.NaN, Moments.Of([]).PopulationDeviation);
        Assert.Equal(double.NaN, Moments.Of([1, double.NaN, 2]).SampleDeviation);
    }

    private static double[] Read(string set) =>
        [.. File.ReadLines(Path.Combine(AppContext.BaseDirectory, "Data", "nist", "univariate.csv"))
            .Select(line => line.Split(','))
            .Where(fields => fields[0] == set)
            .Select(fields => double.Parse(fields[2], CultureInfo.InvariantCulture))];

    private static void Close(double expected, double actual, double relative) =>
        Assert.InRange(actual, expected - (Math.Abs(expected) * relative), expected + (Math.Abs(expected) * relative));
}
