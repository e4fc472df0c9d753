using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>
/// An option priced by interpolation in a table of numerical prices, made by <see cref="PriceTable"/> for scenarios that move from one
/// level of the underlying. A scenario outside the table's range is priced by the method itself.
/// </summary>
public sealed class TabulatedFormula : OptionFormula
{
    // Scenarios at a time: seven rows of these stay in the first-level cache.
    private const int Width = 256;

    private readonly NumericFormula _formula;
    private readonly MarketRange _range;
    private readonly MovingInputs _inputs;
    private readonly SpotCoordinate _coordinate;
    private readonly TablePiece[] _pieces;
    private readonly double _spot0;

    internal TabulatedFormula(NumericFormula formula, double spot0, MarketRange range, SpotCoordinate coordinate, TablePiece[] pieces, double error, double standardError)
    {
        (_formula, _spot0, _range, _coordinate, _pieces) = (formula, spot0, range, coordinate, pieces);
        (Error, StandardError) = (error, standardError);
        _inputs = new(range);
    }

    /// <summary>The largest difference of table and method found between the points that the table goes through, for one unit.</summary>
    public double Error { get; }

    /// <summary>The largest standard error of the prices that the table goes through, for one unit: 0 for a method without draws.</summary>
    public double StandardError { get; }

    /// <summary>The box that the table covers.</summary>
    public MarketRange Range => _range;

    /// <summary>Degrees in the spot, a number for each piece of its range.</summary>
    public IReadOnlyList<int> Degrees => [.. _pieces.Select(p => p.Shape.Degree)];

    /// <inheritdoc/>
    public override double Value(in MarketPoint market)
    {
        if (!_range.Holds(market)) return Outside(market);
        Span<double> z = stackalloc double[3];
        z = z[.._inputs.Count];
        _inputs.Scale(market, z);
        return Inside(market, z, _coordinate.Of(market.X, z));
    }

    /// <inheritdoc/>
    public override void Accumulate(in MarketSpans market, double quantity, double baseValue, Span<double> profit)
    {
        Span<double> room = stackalloc double[(_inputs.Count + 4) * Width];
        for (var s = 0; s < market.Length; s += Width)
        {
            var length = Math.Min(Width, market.Length - s);
            var tile = market.Slice(s, length);
            var values = Values(tile, room);
            if (!_range.Holds(tile)) Replace(tile, values);
            BookProfit.AddLinear(values, baseValue, quantity, profit.Slice(s, length));
        }
    }

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() =>
    [
        11, _spot0, .. _range.Numbers(), .. _coordinate.Numbers(), _pieces.Length,
        .. _pieces.SelectMany(p => (double[])[p.Shape.From, p.Shape.To, p.Shape.Degree, p.Polynomial.Coefficients.Length, .. p.Polynomial.Coefficients]),
        Error, StandardError, .. _formula.Numbers(),
    ];

    private double Inside(in MarketPoint market, ReadOnlySpan<double> z, double u)
    {
        var value = _pieces[0].Value(u, z);
        for (var p = 1; p < _pieces.Length; p++)
        {
            if (u >= _pieces[p].Shape.From) value = _pieces[p].Value(u, z);
        }
        return _coordinate.Exercise is { } exercise ? Branch.ExerciseBelow(u, -1, market.Spot, exercise.Strike, exercise.Sign, value) : value;
    }

    /// <summary>The bits of <see cref="Inside"/>, scenario by scenario; those outside the range come out as they may.</summary>
    private Span<double> Values(in MarketSpans tile, Span<double> room)
    {
        var length = tile.Length;
        var z = room[..(_inputs.Count * length)];
        room = room[z.Length..];
        Span<double> u = room[..length], scaled = room.Slice(length, length), values = room.Slice(2 * length, length), next = room.Slice(3 * length, length);
        _inputs.Scale(tile, z);
        _coordinate.Fill(tile.X, z, u);
        _pieces[0].Fill(u, z, scaled, values);
        for (var p = 1; p < _pieces.Length; p++)
        {
            _pieces[p].Fill(u, z, scaled, next);
            Branch.From(u, _pieces[p].Shape.From, next, values);
        }
        if (_coordinate.Exercise is { } exercise) Branch.ExerciseBelow(u, -1, tile.Spot, exercise.Strike, exercise.Sign, values);
        return values;
    }

    private void Replace(in MarketSpans tile, Span<double> values)
    {
        for (var s = 0; s < values.Length; s++)
        {
            var market = tile[s];
            if (!_range.Holds(market)) values[s] = Outside(market);
        }
    }

    private double Outside(in MarketPoint market) =>
        double.IsNaN(market.X + market.Spot + market.Discount + market.Carry + market.Deviation) ? double.NaN : _formula.Value(market);
}
