using RiskWorker.Numerics.Quadrature;

namespace RiskWorker.Numerics.Options;

/// <summary>
/// What every exercise boundary shares, since it does not depend on the option: the fractions of the life at which the
/// boundary is known, the points of the integrals over time, and the weights that carry the one to the other.
/// </summary>
/// <remarks>
/// The boundary is a polynomial in the root of time through Chebyshev's extrema, so that node i lies at √τ = √T·(1 + c_i)/2,
/// c_i = cos(iπ/20). An integral over u in [0, τ] is taken in t of [0, 1] with √(τ - u) = √τ·2t/(1 + t²) and
/// √u = √τ·(1 - t²)/(1 + t²): both roots are then smooth. Weights and points depend on i and t alone.
/// </remarks>
internal sealed class ExerciseGrid
{
    /// <summary>Degree of the polynomial: its last node is the start, where the boundary is known.</summary>
    public const int Nodes = 20;

    private readonly double[] nodes = new double[Nodes + 1];

    /// <param name="points">Points of each integral.</param>
    /// <param name="rows">The integrals end at the first so many nodes, the whole life first.</param>
    private ExerciseGrid(int points, int rows)
    {
        Points = points;
        FillNodes();
        var rule = new GaussLegendre(points);
        (Back, Weight) = (new double[rows * points], new double[rows * points]);
        Interpolation = new double[Nodes * rows * points];
        for (int i = 0; i < rows; i++)
        {
            double root = 0.5 * (1.0 + nodes[i]);
            for (int j = 0; j < points; j++)
                FillPoint((i * points) + j, root, rule.Points[j], rule.Weights[j]);
        }

        RootTime = [.. nodes.Take(Nodes).Select(c => 0.5 * (1.0 + c))];
    }

    /// <summary>Integrals that end at every node: what the equation for the boundary needs.</summary>
    public static ExerciseGrid OfEquation { get; } = new(40, Nodes);

    /// <summary>The integral over the whole life: what a value needs.</summary>
    public static ExerciseGrid OfValue { get; } = new(96, 1);

    /// <summary>Points of each integral.</summary>
    public int Points { get; }

    /// <summary>√(τ/T) of the nodes, from 1 downwards; the one at 0 is left out.</summary>
    public double[] RootTime { get; }

    /// <summary>√((τ - u)/T) of every point, row after row.</summary>
    public double[] Back { get; }

    /// <summary>Weight of every point, in units of T.</summary>
    public double[] Weight { get; }

    /// <summary>Share of each node in the polynomial at every point, node after node.</summary>
    private double[] Interpolation { get; }

    /// <summary>The polynomial with the given values at the nodes, and 0 at the start, at every point.</summary>
    public void Interpolate(ReadOnlySpan<double> values, Span<double> at)
    {
        at.Clear();
        for (int k = 0; k < Nodes; k++)
            LinearAlgebra.Axpy.Add(values[k], Interpolation.AsSpan(k * at.Length, at.Length), at);
    }

    // cos(π/5) = (1 + √5)/4, halved twice; then the recurrence of the cosines.
    private void FillNodes()
    {
        double tenth = Math.Sqrt(0.5 * (1.0 + (0.25 * (1.0 + Math.Sqrt(5.0)))));
        (nodes[0], nodes[1]) = (1.0, Math.Sqrt(0.5 * (1.0 + tenth)));
        for (int i = 2; i < Nodes / 2; i++)
            nodes[i] = Math.FusedMultiplyAdd(2.0 * nodes[1], nodes[i - 1], -nodes[i - 2]);
        for (int i = (Nodes / 2) + 1; i <= Nodes; i++)
            nodes[i] = -nodes[Nodes - i];
    }

    private void FillPoint(int at, double root, double t, double weight)
    {
        double sum = 1.0 + (t * t), back = 2.0 * t / sum, forth = (1.0 - (t * t)) / sum;
        Back[at] = root * back;
        Weight[at] = root * root * weight * (4.0 * back * forth / sum);
        FillShares(at, Math.FusedMultiplyAdd(2.0 * root, forth, -1.0));
    }

    /// <summary>The barycentric formula (Berrut and Trefethen 2004).</summary>
    private void FillShares(int at, double x)
    {
        int stride = Back.Length, hit = Array.IndexOf(nodes, x);
        double total = 0.0;
        Span<double> shares = stackalloc double[Nodes + 1];
        for (int k = 0; k <= Nodes; k++)
        {
            double end = k is 0 or Nodes ? 0.5 : 1.0, sign = (k & 1) == 0 ? end : -end;
            shares[k] = hit < 0 ? sign / (x - nodes[k]) : k == hit ? 1.0 : 0.0;
            total += shares[k];
        }

        for (int k = 0; k < Nodes; k++)
            Interpolation[(k * stride) + at] = shares[k] / total;
    }
}
