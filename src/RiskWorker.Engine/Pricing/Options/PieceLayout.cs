using RiskWorker.Numerics.Interpolation;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>Cuts a range of spots into pieces and gives each the lowest degree that holds the error: degrees 4, 8 and 16 are tried, then halves.</summary>
/// <remarks>33 points serve all three degrees and show the error of each between its own points: what is dear about a price is found once for all spots.</remarks>
internal sealed class PieceLayout
{
    /// <summary>Most pieces of a range.</summary>
    public const int MostPieces = 8;

    /// <summary>The degree above which a piece is halved.</summary>
    public const int MostDegree = 16;

    private const double LeastGain = 0.7;
    private const int Finest = 32;

    private static readonly int[] s_degrees = [4, 8, MostDegree];
    private static readonly double[] s_points = ChebyshevGrid.PointsOf(Finest);

    private readonly TableSampler _sampler;
    private readonly TableSection _section;
    private readonly List<(TablePiece Piece, double Error)> _found = [];

    /// <param name="sampler">The prices.</param>
    /// <param name="section">The coordinate; none of the other inputs moves.</param>
    /// <param name="kink">A coordinate at which to cut; null where there is none inside.</param>
    public PieceLayout(TableSampler sampler, TableSection section, double? kink)
    {
        (_sampler, _section) = (sampler, section);
        Add(kink is { } cut ? [new(-1, cut, 0), new(cut, 1, 0)] : [new(-1, 1, 0)]);
        while (_found.Count < MostPieces && _found.MaxBy(f => f.Error) is var worst && worst.Error > _sampler.Tolerance)
        {
            var (from, to, middle, count) = (worst.Piece.Shape.From, worst.Piece.Shape.To, worst.Piece.Shape.At(0), _found.Count);
            Add([new(from, middle, 0), new(middle, to, 0)]);
            // What is below a standard error and halves do not mend is noise: the piece stays whole, and the layout ends.
            if (worst.Error <= _sampler.StandardError && _found.Skip(count).Max(f => f.Error) > LeastGain * worst.Error)
            {
                _found.RemoveRange(count, 2);
                break;
            }
            _found.Remove(worst);
        }
        _found.Sort((a, b) => a.Piece.Shape.From.CompareTo(b.Piece.Shape.From));
    }

    /// <summary>The pieces in order.</summary>
    public TablePiece[] Pieces => [.. _found.Select(f => f.Piece)];

    /// <summary>The largest error found.</summary>
    public double Error => _found.Max(f => f.Error);

    private void Add(PieceShape[] shapes)
    {
        double[] u = [.. shapes.SelectMany(shape => s_points.Select(shape.At))];
        var (z, values) = (_section.Nodes[0], new double[u.Length]);
        _sampler.Price(z, _section.Returns(u, z), values);
        for (var p = 0; p < shapes.Length; p++) _found.Add(BestOf(shapes[p], u.AsSpan(p * s_points.Length, s_points.Length), values.AsSpan(p * s_points.Length, s_points.Length)));
    }

    private (TablePiece Piece, double Error) BestOf(PieceShape shape, ReadOnlySpan<double> u, ReadOnlySpan<double> values)
    {
        foreach (var degree in s_degrees)
        {
            var nodes = new double[degree + 1];
            for (var j = 0; j <= degree; j++) nodes[j] = values[j * (Finest / degree)];
            var (piece, error) = (new TablePiece(shape with { Degree = degree }, TensorPolynomial.Through([degree], nodes)), 0.0);
            for (var i = 0; i < u.Length; i++) error = Math.Max(error, Math.Abs(piece.Value(u[i], []) - values[i]));
            if (error <= _sampler.Tolerance || degree == MostDegree) return (piece, error);
        }
        throw new InvalidOperationException("The last degree is always taken.");
    }
}
