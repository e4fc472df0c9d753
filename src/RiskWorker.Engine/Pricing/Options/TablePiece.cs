using RiskWorker.Numerics.Interpolation;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>A part of a table's range of spots with the polynomial that holds there; the spot is its first variable.</summary>
internal sealed class TablePiece
{
    private readonly double _scale, _offset;

    public TablePiece(PieceShape shape, TensorPolynomial polynomial)
    {
        (Shape, Polynomial) = (shape, polynomial);
        _scale = 2 / (shape.To - shape.From);
        _offset = Math.FusedMultiplyAdd(-shape.From, _scale, -1);
    }

    /// <summary>Where it lies.</summary>
    public PieceShape Shape { get; }

    /// <summary>Its values.</summary>
    public TensorPolynomial Polynomial { get; }

    /// <summary>The value at a coordinate.</summary>
    /// <param name="u">Coordinate of the spot.</param>
    /// <param name="others">The other inputs.</param>
    public double Value(double u, ReadOnlySpan<double> others)
    {
        Span<double> at = stackalloc double[TensorPolynomial.MostVariables];
        at[0] = UnitScale.Of(u, _scale, _offset);
        others.CopyTo(at[1..]);
        return Polynomial.Value(at);
    }

    /// <summary>The values at many: the bits of <see cref="Value"/>.</summary>
    /// <param name="u">Coordinates of the spots.</param>
    /// <param name="others">A row for each other input.</param>
    /// <param name="room">As long as <paramref name="u"/>; overwritten.</param>
    /// <param name="values">The values.</param>
    public void Fill(ReadOnlySpan<double> u, ReadOnlySpan<double> others, Span<double> room, Span<double> values)
    {
        UnitScale.Apply(u, _scale, _offset, room);
        Polynomial.Fill(room, others, values);
    }
}

/// <summary>A part of a table's range of spots.</summary>
/// <param name="From">Its lower end in the table's coordinate.</param>
/// <param name="To">Its upper end.</param>
/// <param name="Degree">Degree of the polynomial in it.</param>
internal readonly record struct PieceShape(double From, double To, int Degree)
{
    /// <summary>The coordinate at <paramref name="z"/> in [-1, 1].</summary>
    public double At(double z) => Math.FusedMultiplyAdd(z, (To - From) / 2, (To + From) / 2);
}
