using RiskWorker.Numerics.Interpolation;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>
/// The variable that stands for the spot in a table: its log-return carried to [-1, 1], from one end of the range to the other or, for
/// an option that is exercised early, from the exercise boundary (-1) to the far end (1). Below -1 the value is that of exercise.
/// </summary>
/// <remarks>On the one side of the boundary the value is analytic, on the other it is a line: a polynomial through both would lose six digits.</remarks>
internal sealed class SpotCoordinate
{
    private readonly TensorPolynomial? _boundary;
    private readonly double _start, _end, _scale, _offset;

    private SpotCoordinate(double start, double end, TensorPolynomial? boundary, EarlyExercise? exercise)
    {
        (_start, _end, _boundary, Exercise) = (start, end, boundary, exercise);
        _scale = 2 / (end - start);
        _offset = Math.FusedMultiplyAdd(-start, _scale, -1);
    }

    /// <summary>What lies below -1; null where nothing does.</summary>
    public EarlyExercise? Exercise { get; }

    /// <summary>From one end of a range to the other.</summary>
    public static SpotCoordinate Over(InputRange x) => new(x.Low, x.High, null, null);

    /// <summary>From a boundary that does not move.</summary>
    public static SpotCoordinate From(double boundary, double end, EarlyExercise exercise) => new(boundary, end, null, exercise);

    /// <summary>From a boundary that the other inputs move.</summary>
    public static SpotCoordinate From(TensorPolynomial boundary, double end, EarlyExercise exercise) => new(end - 1, end, boundary, exercise);

    /// <summary>The coordinate of a log-return.</summary>
    public double Of(double x, ReadOnlySpan<double> others) =>
        _boundary is null ? UnitScale.Of(x, _scale, _offset) : BoundaryScale.Of(x, _boundary.Value(others), _end);

    /// <summary>The coordinates of many: the bits of <see cref="Of"/>.</summary>
    /// <param name="x">Log-returns.</param>
    /// <param name="others">A row for each other input.</param>
    /// <param name="u">The coordinates.</param>
    public void Fill(ReadOnlySpan<double> x, ReadOnlySpan<double> others, Span<double> u)
    {
        if (_boundary is null)
        {
            UnitScale.Apply(x, _scale, _offset, u);
            return;
        }
        _boundary.Fill(others[..x.Length], others[x.Length..], u);
        BoundaryScale.Apply(x, u, _end, u);
    }

    /// <summary>The log-return at a coordinate.</summary>
    public double Back(double u, ReadOnlySpan<double> others)
    {
        var start = _boundary?.Value(others) ?? _start;
        return Math.FusedMultiplyAdd((u + 1) / 2, _end - start, start);
    }

    /// <summary>Every number that a coordinate depends on.</summary>
    public IEnumerable<double> Numbers() =>
        [_start, _end, Exercise?.Strike ?? 0, Exercise?.Sign ?? 0, _boundary?.Coefficients.Length ?? 0, .. _boundary is null ? [] : _boundary.Coefficients.ToArray()];
}
