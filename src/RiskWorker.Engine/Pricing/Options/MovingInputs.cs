using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>What moves a table beside the spot: deviation, discount and carry, in this order, as far as a range has them move; each is carried to [-1, 1].</summary>
internal sealed class MovingInputs
{
    private const int Deviation = 0, Discount = 1, Carry = 2;

    private readonly MarketRange _range;
    private readonly int[] _inputs;
    private readonly (double Scale, double Offset)[] _scales;

    public MovingInputs(MarketRange range)
    {
        _range = range;
        _inputs = [.. new[] { Deviation, Discount, Carry }.Where(input => Of(range, input).Moves)];
        _scales = [.. _inputs.Select(input => (1 / Of(range, input).HalfWidth, -Of(range, input).Centre / Of(range, input).HalfWidth))];
    }

    /// <summary>How many move: 0 to 3.</summary>
    public int Count => _inputs.Length;

    /// <summary>Whether input number <paramref name="d"/> is the deviation, which asks for a higher degree than a rate.</summary>
    public bool IsDeviation(int d) => _inputs[d] == Deviation;

    /// <summary>The rates and the deviation at a point of [-1, 1]^Count.</summary>
    public (double Discount, double Carry, double Deviation) At(ReadOnlySpan<double> z)
    {
        Span<double> values = [_range.Deviation.Centre, _range.Discount.Centre, _range.Carry.Centre];
        for (var d = 0; d < z.Length; d++) values[_inputs[d]] = Of(_range, _inputs[d]).At(z[d]);
        return (values[Discount], values[Carry], values[Deviation]);
    }

    /// <summary>The point of one scenario.</summary>
    public void Scale(in MarketPoint market, Span<double> z)
    {
        for (var d = 0; d < _inputs.Length; d++)
        {
            var value = _inputs[d] switch { Deviation => market.Deviation, Discount => market.Discount, _ => market.Carry };
            z[d] = UnitScale.Of(value, _scales[d].Scale, _scales[d].Offset);
        }
    }

    /// <summary>The points of many scenarios, a row for each input: the bits of <see cref="Scale(in MarketPoint, Span{double})"/>.</summary>
    public void Scale(in MarketSpans market, Span<double> rows)
    {
        for (var d = 0; d < _inputs.Length; d++)
        {
            var values = _inputs[d] switch { Deviation => market.Deviation, Discount => market.Discount, _ => market.Carry };
            UnitScale.Apply(values, _scales[d].Scale, _scales[d].Offset, rows.Slice(d * market.Length, market.Length));
        }
    }

    private static InputRange Of(in MarketRange range, int input) => input switch { Deviation => range.Deviation, Discount => range.Discount, _ => range.Carry };
}
