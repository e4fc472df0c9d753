namespace RiskWorker.Numerics.Quadrature;

/// <summary>
/// The rule of Gauss and Legendre on [0, 1]: n points that integrate every polynomial of degree 2n - 1 exactly.
/// </summary>
/// <remarks>
/// Roots of the Legendre polynomial by Newton's method from cos θ ≈ (π² - 4θ²)/(π² + θ²) (Bhaskara) at Tricomi's angles, in
/// arithmetic and square roots alone: the same bits on every machine.
/// </remarks>
public sealed class GaussLegendre
{
    private const int MostPoints = 128;
    private const int Steps = 12;
    private readonly double[] points;
    private readonly double[] weights;

    /// <param name="count">Points, 1 to 128.</param>
    /// <exception cref="ArgumentOutOfRangeException">The count lies outside.</exception>
    public GaussLegendre(int count)
    {
        if (count is < 1 or > MostPoints)
            throw new ArgumentOutOfRangeException(nameof(count), count, $"The rule has {count} points; it must have 1 to {MostPoints}.");
        points = new double[count];
        weights = new double[count];
        for (int i = 0; i < (count + 1) / 2; i++)
        {
            (double root, double derivative) = Root(count, i);
            double weight = 1.0 / ((1.0 - (root * root)) * derivative * derivative);
            (points[i], points[count - 1 - i]) = (0.5 * (1.0 - root), 0.5 * (1.0 + root));
            (weights[i], weights[count - 1 - i]) = (weight, weight);
        }
    }

    /// <summary>The points, ascending in (0, 1).</summary>
    public ReadOnlySpan<double> Points => points;

    /// <summary>The weight of each point; they add up to 1.</summary>
    public ReadOnlySpan<double> Weights => weights;

    /// <summary>The i-th root from 1 downwards, and the polynomial's derivative there.</summary>
    private static (double Root, double Derivative) Root(int count, int i)
    {
        if (2 * i == count - 1)
            return (0.0, Polynomial(count, 0.0).Derivative);
        double angle = Math.PI * ((4 * i) + 3) / ((4 * count) + 2), square = Math.PI * Math.PI;
        double x = (square - (4.0 * angle * angle)) / (square + (angle * angle));
        double derivative = 0.0;
        for (int step = 0; step < Steps; step++)
        {
            (double value, derivative) = Polynomial(count, x);
            x -= value / derivative;
        }

        return (x, Polynomial(count, x).Derivative);
    }

    private static (double Value, double Derivative) Polynomial(int count, double x)
    {
        double before = 1.0, value = x;
        for (int k = 1; k < count; k++)
            (before, value) = (value, ((((2 * k) + 1) * x * value) - (k * before)) / (k + 1));
        return (value, count * (before - (x * value)) / (1.0 - (x * x)));
    }
}
