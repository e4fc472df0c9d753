using RiskWorker.Numerics.Quadrature;

namespace RiskWorker.Numerics.Tests.Quadrature;

public sealed class GaussLegendreTests
{
    // Abramowitz and Stegun (1964), table 25.4, five points on [-1, 1]; from memory, and recomputed with numpy.
    [Fact]
    public void Points_five_are_the_tabulated_ones()
    {
        var rule = new GaussLegendre(5);
        double[] points = [-0.906179845938664, -0.538469310105683, 0, 0.538469310105683, 0.906179845938664];
        double[] weights = [0.236926885056189, 0.478628670499366, 0.568888888888889, 0.478628670499366, 0.236926885056189];
        for (int i = 0; i < 5; i++)
        {
            Assert.Equal(0.5 + (0.5 * points[i]), rule.Points[i], 1e-15);
            Assert.Equal(0.5 * weights[i], rule.Weights[i], 1e-15);
        }
    }

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(40)]
    [InlineData(96)]
    [InlineData(128)]
    public void Points_powers_up_to_twice_their_number_are_integrated_exactly(int count)
    {
        var rule = new GaussLegendre(count);
        for (int power = 0; power < 2 * count; power += power < 4 ? 1 : 97)
        {
            double sum = 0;
            for (int i = 0; i < count; i++)
                sum += rule.Weights[i] * Math.Pow(rule.Points[i], power);
            Assert.Equal(1.0 / (power + 1), sum, 1e-14);
        }

        for (int i = 1; i < count; i++)
            Assert.True(rule.Points[i] > rule.Points[i - 1]);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(129)]
    public void New_count_out_of_range_is_refused(int count) =>
        Assert.Throws<ArgumentOutOfRangeException>(nameof(count), () => new GaussLegendre(count));
}
