using RiskWorker.Engine.Plans;
using RiskWorker.Numerics.Interpolation;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Surfaces;

/// <summary>Fits one price surface at a time: raises the degree until the error is small enough, or gives up. The buffers of one thread.</summary>
internal sealed class SurfaceFit
{
    private const int FirstDegree = 8;
    private const int Step = 4;

    // A bound is this many times the largest error found on a grid this many times as fine.
    private const int Safety = 4;

    // Coefficients that one option's own revaluation is worth: beyond, a surface would be the slower way.
    private const int WorthOfAnOption = 120;

    private double[] _x = [];
    private double[] _spots = [];
    private double[] _volatilities = [];
    private double[] _z = [];
    private double[] _w = [];
    private double[] _profits = [];

    /// <summary>A surface for <paramref name="items"/> of one batch, or null where none is accurate or none would pay.</summary>
    /// <param name="group">The underlying's group.</param>
    /// <param name="batch">Place of the batch in it.</param>
    /// <param name="items">Options of one cell.</param>
    /// <param name="underlying">Axis of the underlying.</param>
    /// <param name="volatility">Axis of the volatility; unused where that is flat.</param>
    /// <param name="level">Volatility today; unused where that is flat.</param>
    /// <param name="error">Largest error wanted, as a fraction of the gross value.</param>
    public PriceSurface? Of(UnderlyingGroup group, int batch, ItemRange items, AxisScale underlying, AxisScale volatility, double level, double error)
    {
        var options = group.Options[batch];
        var isFlat = options.VolatilityFactor < 0;
        var count = items.To - items.From;
        var gross = double.NaN;
        for (var degree = FirstDegree; degree <= ChebyshevGrid.MostDegree; degree += Step)
        {
            // A price bends less along its volatility than along its underlying.
            var columns = isFlat ? 1 : (degree / 2) + 1;
            if ((degree + 1) * columns > WorthOfAnOption * count) return null;
            if (double.IsNaN(gross)) gross = GrossOf(options, items, group.Spot, underlying, volatility, level);
            var coefficients = Coefficients(degree, columns);
            var worst = LargestError(coefficients, degree, columns);
            if (worst <= error * gross) return new(options.Items[items.From].Cell, items, coefficients, columns, (Safety * worst) + (1e-13 * gross));
        }
        return null;

        double[] Coefficients(int degree, int columns)
        {
            Revalue(ChebyshevGrid.Of(degree).Points, columns == 1 ? [0] : ChebyshevGrid.Of(columns - 1).Points);
            var fitted = _profits.AsSpan(0, (degree + 1) * columns).ToArray();
            for (var m = 0; m < columns; m++) ChebyshevGrid.Of(degree).Interpolate(fitted.AsSpan(m), columns, fitted.AsSpan(m));
            for (var k = 0; k <= degree && columns > 1; k++) ChebyshevGrid.Of(columns - 1).Interpolate(fitted.AsSpan(k * columns), 1, fitted.AsSpan(k * columns));
            return fitted;
        }

        double LargestError(double[] coefficients, int degree, int columns)
        {
            var points = Revalue(ChebyshevGrid.PointsOf(Safety * degree), columns == 1 ? [0] : ChebyshevGrid.PointsOf(Safety * (columns - 1)));
            var profits = _profits.AsSpan(0, points);
            var largest = 0.0;
            Elementwise.Negate(profits, profits);
            if (columns == 1) PolynomialSum.Add(coefficients, _z.AsSpan(0, points), profits);
            else PolynomialSum.Add(coefficients, columns, _z.AsSpan(0, points), _w.AsSpan(0, points), profits);
            foreach (var difference in profits) largest = Math.Max(largest, Math.Abs(difference));
            return largest;
        }

        // Full revaluation on the grid of all pairs, by the kernel that revalues scenarios.
        int Revalue(double[] along, double[] across)
        {
            var points = along.Length * across.Length;
            Reserve(points);
            for (var p = 0; p < points; p++)
            {
                (_z[p], _w[p]) = (along[p / across.Length], across[p % across.Length]);
                _x[p] = underlying.At(_z[p]);
                if (!isFlat) _volatilities[p] = LogNormalMoves.Spot(volatility.At(_w[p]), level);
            }
            ReadOnlySpan<double> x = _x.AsSpan(0, points);
            LogNormalMoves.Spots(x, group.Spot, _spots.AsSpan(0, points));
            var profits = _profits.AsSpan(0, points);
            profits.Clear();
            for (var i = items.From; i < items.To; i++)
            {
                ref readonly var item = ref options.Items[i];
                if (isFlat) EuropeanOption.AccumulateValue(options.Terms[i], x, _spots.AsSpan(0, points), item.Quantity, item.BaseValue, profits);
                else EuropeanOption.AccumulateValue(options.Terms[i], x, _spots.AsSpan(0, points), _volatilities.AsSpan(0, points), item.Quantity, item.BaseValue, profits);
            }
            return points;
        }
    }

    // Quantities times the largest values that the options reach in the corners of the surface.
    private static double GrossOf(OptionBatch batch, ItemRange items, double spot, AxisScale underlying, AxisScale volatility, double level)
    {
        var gross = 0.0;
        var high = batch.VolatilityFactor < 0 ? 0 : LogNormalMoves.Spot(volatility.At(1), level);
        for (var i = items.From; i < items.To; i++) gross += Math.Abs(batch.Items[i].Quantity) * Math.Max(ValueAt(i, underlying.At(-1)), ValueAt(i, underlying.At(1)));
        return gross;

        double ValueAt(int i, double x)
        {
            var terms = batch.Terms[i];
            var moved = LogNormalMoves.Spot(x, spot);
            return batch.VolatilityFactor < 0 ? EuropeanOption.Value(terms, x, moved) : EuropeanOption.Value(terms, x, moved, high);
        }
    }

    private void Reserve(int points)
    {
        if (_x.Length >= points) return;
        (_x, _spots, _volatilities) = (new double[points], new double[points], new double[points]);
        (_z, _w, _profits) = (new double[points], new double[points], new double[points]);
    }
}
