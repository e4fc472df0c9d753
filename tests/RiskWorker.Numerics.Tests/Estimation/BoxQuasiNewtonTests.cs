using RiskWorker.Numerics.Estimation;

namespace RiskWorker.Numerics.Tests.Estimation;

public sealed class BoxQuasiNewtonTests
{
    private static readonly double[] s_far = [100, 100];

    // Rosenbrock (1960): (1 - x)² + 100 (y - x²)², the curved valley, minimum 0 at (1, 1).
    [Fact]
    public void From_the_far_end_of_a_curved_valley_finds_its_minimum()
    {
        var end = Search(Valley, [-5, -5], [5, 5]).From([-1.2, 1], 1e-10);
        Assert.Equal([1, 1], end.X.Select(x => Math.Round(x, 9)));
        Assert.InRange(end.SlopeNorm, 0, 1e-10);
        Assert.InRange(end.Steps, 5, 100);
    }

    // With x at most 1/2 the minimum is on that side: y = 1/4, value 1/4.
    [Fact]
    public void From_inside_ends_on_the_side_that_stops_it()
    {
        var end = Search(Valley, [-5, -5], [0.5, 5]).From([-1.2, 1], 1e-10);
        Assert.Equal(0.5, end.X[0]);
        Assert.Equal(0.25, end.X[1], 1e-10);
        Assert.Equal(0.25, end.Value, 1e-12);
        Assert.InRange(end.SlopeNorm, 0, 1e-10);
    }

    [Fact]
    public void From_a_corner_leaves_the_sides_that_do_not_hold_it()
    {
        var end = Search(Bowl, [0, 0], [1, 10]).From([0, 0], 1e-12);
        Assert.Equal(1, end.X[0]);
        Assert.Equal(3.5, end.X[1], 1e-11);
    }

    [Fact]
    public void From_a_start_outside_begins_at_the_nearest_point_of_the_box() =>
        Assert.Equal([1, 3], Search(Bowl, [0, 0], [1, 3]).From([-7, 90], 1e-12).X);

    [Fact]
    public void From_a_function_that_is_no_number_says_so_or_stops()
    {
        static double Broken(ReadOnlySpan<double> x, Span<double> slope)
        {
            (slope[0], slope[1]) = (1, 1);
            return x[0] < 0.5 ? double.NaN : x[0] + x[1];
        }
        var end = Search(Broken, [0, 0], [1, 1]).From([0.9, 0.9], 1e-12);
        Assert.True(end.SlopeNorm > 0);
        Assert.True(end.X[0] >= 0.5);
    }

    private static double Valley(ReadOnlySpan<double> x, Span<double> slope)
    {
        var rest = x[1] - (x[0] * x[0]);
        slope[0] = (-2 * (1 - x[0])) - (400 * x[0] * rest);
        slope[1] = 200 * rest;
        return ((1 - x[0]) * (1 - x[0])) + (100 * rest * rest);
    }

    // (x - 2)² + (y - 3)² + (x - 2)(y - 3): along x = 1 the lowest y is 3 - (1 - 2)/2 = 3.5.
    private static double Bowl(ReadOnlySpan<double> x, Span<double> slope)
    {
        var (a, b) = (x[0] - 2, x[1] - 3);
        (slope[0], slope[1]) = ((2 * a) + b, (2 * b) + a);
        return (a * a) + (b * b) + (a * b);
    }

    private static BoxQuasiNewton Search(Function function, double[] low, double[] high) => new(new Objective(function), low, high, s_far);

    private delegate double Function(ReadOnlySpan<double> x, Span<double> slope);

    private sealed class Objective(Function function) : IBoxObjective
    {
        public double Of(ReadOnlySpan<double> x, Span<double> slope) => function(x, slope);

        public double[] Curvature(ReadOnlySpan<double> x) => x[0] > 0.9 ? [0, 0, 0, 0] : [1, 0, 0, 1];
    }
}
