using RiskWorker.Numerics.Interpolation;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>
/// A table over the spot and some of the other inputs, the rest held at a point: at none of them it serves to lay out the pieces, at
/// one to find its degree, at all it is the table.
/// </summary>
internal sealed class TableSection
{
    // The far end keeps this part of the range away from every boundary, so that the coordinate never degenerates.
    private const double LeastRoom = 0.05;

    private readonly TableSampler _sampler;
    private readonly int[] _inputs, _degrees;

    /// <param name="sampler">The prices.</param>
    /// <param name="x">Range of log-returns.</param>
    /// <param name="exercise">What exercise brings; null where there is none.</param>
    /// <param name="held">A point of all other inputs.</param>
    /// <param name="inputs">Those that this section moves.</param>
    /// <param name="degrees">A degree for each of them.</param>
    public TableSection(TableSampler sampler, InputRange x, EarlyExercise? exercise, ReadOnlySpan<double> held, int[] inputs, int[] degrees)
    {
        (_sampler, _inputs, _degrees) = (sampler, inputs, degrees);
        Nodes = NodesOf(held, inputs, degrees);
        Coordinate = exercise is { } brings ? CoordinateOf(x, brings) : SpotCoordinate.Over(x);
    }

    /// <summary>Points of all other inputs under which the table's prices are found.</summary>
    public double[][] Nodes { get; }

    /// <summary>What stands for the spot.</summary>
    public SpotCoordinate Coordinate { get; }

    /// <summary>The pieces, by what <see cref="Fit"/> found.</summary>
    public TablePiece[] Pieces { get; private set; } = [];

    /// <summary>Log-returns at coordinates, with the other inputs at a point.</summary>
    public double[] Returns(ReadOnlySpan<double> u, ReadOnlySpan<double> z)
    {
        var (x, moved) = (new double[u.Length], Moved(z));
        for (var i = 0; i < x.Length; i++) x[i] = Coordinate.Back(u[i], moved);
        return x;
    }

    /// <summary>Finds the polynomials of the pieces.</summary>
    public void Fit(IReadOnlyList<PieceShape> shapes)
    {
        double[] u = [.. shapes.SelectMany(shape => ChebyshevGrid.Of(shape.Degree).Points.Select(shape.At))];
        var (prices, row) = (new double[u.Length * Nodes.Length], new double[u.Length]);
        for (var m = 0; m < Nodes.Length; m++)
        {
            _sampler.Price(Nodes[m], Returns(u, Nodes[m]), row);
            for (var i = 0; i < u.Length; i++) prices[(i * Nodes.Length) + m] = row[i];
        }
        Pieces = new TablePiece[shapes.Count];
        for (int p = 0, first = 0; p < Pieces.Length; p++)
        {
            var count = (shapes[p].Degree + 1) * Nodes.Length;
            Pieces[p] = new(shapes[p], TensorPolynomial.Through([shapes[p].Degree, .. _degrees], prices.AsSpan(first, count)));
            first += count;
        }
    }

    /// <summary>The largest difference from the prices themselves halfway between the points of each piece, with the other inputs at <paramref name="z"/>.</summary>
    public double ErrorAt(ReadOnlySpan<double> z)
    {
        var (worst, moved) = (0.0, Moved(z));
        double[] u = [-1, .. Pieces.SelectMany(piece => Halfway(piece.Shape.Degree).Select(piece.Shape.At))];
        var (x, prices) = (Returns(u, z), new double[u.Length]);
        _sampler.Price(z, x, prices);
        // At the boundary itself it is the value of exercise that must hold.
        if (Coordinate.Exercise is { } exercise) worst = Math.Abs(_sampler.Exercised(exercise, x[0]) - prices[0]);
        var i = 1;
        foreach (var piece in Pieces)
        {
            for (var k = 0; k < piece.Shape.Degree; k++, i++) worst = Math.Max(worst, Math.Abs(piece.Value(u[i], moved) - prices[i]));
        }
        return worst;
    }

    /// <summary>The points of a degree's grid that lie between its own: every second one of twice the degree.</summary>
    public static IEnumerable<double> Halfway(int degree) => ChebyshevGrid.PointsOf(2 * degree).Where((_, j) => j % 2 == 1);

    private double[] Moved(ReadOnlySpan<double> z)
    {
        var moved = new double[_inputs.Length];
        for (var d = 0; d < moved.Length; d++) moved[d] = z[_inputs[d]];
        return moved;
    }

    private static double[][] NodesOf(ReadOnlySpan<double> held, int[] inputs, int[] degrees)
    {
        var nodes = new double[degrees.Aggregate(1, (product, degree) => product * (degree + 1))][];
        for (var m = 0; m < nodes.Length; m++)
        {
            nodes[m] = held.ToArray();
            // The last input's points lie side by side.
            for (int d = degrees.Length - 1, rest = m; d >= 0; rest /= degrees[d] + 1, d--)
                nodes[m][inputs[d]] = ChebyshevGrid.Of(degrees[d]).Points[rest % (degrees[d] + 1)];
        }
        return nodes;
    }

    private SpotCoordinate CoordinateOf(InputRange x, EarlyExercise exercise)
    {
        var boundaries = new double[Nodes.Length];
        for (var m = 0; m < boundaries.Length; m++)
        {
            if (_sampler.Boundary(Nodes[m]) is not { } boundary) return SpotCoordinate.Over(x);
            boundaries[m] = boundary;
        }
        // From the boundary a put lives upwards and a call downwards.
        double sign = -exercise.Sign, end = sign > 0 ? x.High : x.Low, near = sign > 0 ? x.Low : x.High;
        var (closest, farthest) = sign > 0 ? (boundaries.Max(), boundaries.Min()) : (boundaries.Min(), boundaries.Max());
        if (sign * (closest - near) <= 0) return SpotCoordinate.Over(x);
        var room = LeastRoom * 2 * x.HalfWidth;
        if (sign * (end - closest) < room) end = closest + (sign * room);
        return _degrees.Length == 0 ? SpotCoordinate.From(farthest, end, exercise) : SpotCoordinate.From(TensorPolynomial.Through(_degrees, boundaries), end, exercise);
    }
}
