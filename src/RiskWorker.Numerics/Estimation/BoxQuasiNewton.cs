namespace RiskWorker.Numerics.Estimation;

/// <summary>A smooth function of a few numbers.</summary>
internal interface IBoxObjective
{
    /// <summary>The value at <paramref name="x"/>; writes the slope.</summary>
    double Of(ReadOnlySpan<double> x, Span<double> slope);

    /// <summary>An estimate of the second derivatives at <paramref name="x"/>, symmetric and semidefinite, row-major.</summary>
    double[] Curvature(ReadOnlySpan<double> x);
}

/// <summary>Where a minimisation ended.</summary>
/// <param name="X">The point.</param>
/// <param name="Value">The function there.</param>
/// <param name="SlopeNorm">Largest element of x - P(x - slope), P the projection onto the box: 0 at a minimum.</param>
/// <param name="Steps">Steps taken.</param>
internal sealed record BoxMinimum(double[] X, double Value, double SlopeNorm, int Steps);

/// <summary>
/// A minimum over a box by projected quasi-Newton steps: coordinates at or near an end that they are pushed to stand there, the others
/// take the step of the BFGS matrix (Bertsekas 1982, SIAM J. Control Optim. 20, 221-246; Nocedal and Wright 2006, chapters 6 and 18,
/// for the update, damped as by Powell 1978). Pure arithmetic in a fixed order.
/// </summary>
internal sealed class BoxQuasiNewton
{
    private const int MostSteps = 300;
    private const int MostCuts = 40;
    private const double Sufficient = 1e-4;
    private const double Rounding = 1e-14;
    private const double Near = 1e-7;

    private readonly IBoxObjective _function;
    private readonly double[] _low;
    private readonly double[] _high;
    private readonly double[] _reach;
    private readonly int _n;

    /// <summary>The box, and in <paramref name="reach"/> how far a coordinate may go in one step.</summary>
    public BoxQuasiNewton(IBoxObjective function, double[] low, double[] high, double[] reach)
    {
        (_function, _low, _high, _reach, _n) = (function, low, high, reach, low.Length);
    }

    /// <summary>
    /// Descends from <paramref name="start"/>, with the function's own curvature at first and whenever no step goes down, until the slope's norm
    /// is at most <paramref name="tolerance"/> or that curvature shows no step down either.
    /// </summary>
    public BoxMinimum From(ReadOnlySpan<double> start, double tolerance)
    {
        var (x, slope) = (start.ToArray(), new double[_n]);
        Project(x);
        var value = _function.Of(x, slope);
        var matrix = _function.Curvature(x);
        var (steps, isFresh) = (0, true);
        while (steps < MostSteps && Norm(x, slope) > tolerance)
        {
            var direction = Direction(matrix, x, slope);
            if (Descend(x, value, slope, direction) is not var (next, nextValue, nextSlope))
            {
                if (isFresh) break;
                matrix = _function.Curvature(x);
                isFresh = true;
                continue;
            }
            Update(matrix, x, slope, next, nextSlope);
            (x, value, slope, isFresh) = (next, nextValue, nextSlope, false);
            steps++;
        }
        return new(x, value, Norm(x, slope), steps);
    }

    private (double[] X, double Value, double[] Slope)? Descend(double[] x, double value, double[] slope, double[] direction)
    {
        var norm = Norm(x, slope);
        var step = 1.0;
        for (var i = 0; i < _n; i++)
        {
            if (Math.Abs(direction[i]) * step > _reach[i]) step = _reach[i] / Math.Abs(direction[i]);
        }
        for (var cut = 0; cut < MostCuts; cut++)
        {
            var (next, nextSlope) = (new double[_n], new double[_n]);
            var expected = 0.0;
            for (var i = 0; i < _n; i++) next[i] = Math.FusedMultiplyAdd(step, direction[i], x[i]);
            Project(next);
            for (var i = 0; i < _n; i++) expected = Math.FusedMultiplyAdd(slope[i], next[i] - x[i], expected);
            var nextValue = _function.Of(next, nextSlope);
            var change = nextValue - value;
            if (change <= Sufficient * expected && expected < 0) return (next, nextValue, nextSlope);
            // So near the minimum that rounding hides the descent: the slope shows it.
            if (Math.Abs(change) <= Rounding * (1 + Math.Abs(value)) && Norm(next, nextSlope) < 0.5 * norm) return (next, nextValue, nextSlope);
            var shorter = change > expected ? 0.5 * expected / (expected - change) : 0.5;
            step *= Math.Clamp(double.IsNaN(shorter) ? 0.1 : shorter, 0.1, 0.5);
        }
        return null;
    }

    /// <summary>
    /// -B⁻¹ slope over the coordinates that are free to move; a B that is not definite there gains on its diagonal until it is. A coordinate
    /// whose end is near and downhill goes there: left free it would shorten the step of all the others time and again.
    /// </summary>
    private double[] Direction(double[] matrix, double[] x, double[] slope)
    {
        var direction = new double[_n];
        var held = new bool[_n];
        for (var i = 0; i < _n; i++)
        {
            var end = slope[i] > 0 ? _low[i] : _high[i];
            held[i] = slope[i] != 0 && Math.Abs(end - x[i]) <= Near * (_high[i] - _low[i]);
            if (held[i]) direction[i] = end - x[i];
        }
        int[] free = [.. Enumerable.Range(0, _n).Where(i => !held[i])];
        var size = free.Length;
        var lower = new double[size * size];
        for (var ridge = 1e-10; !Factor(matrix, free, ridge, lower); ridge *= 100)
        {
            // Each round adds a hundredfold; a diagonal of zeros ends as the unit matrix.
        }
        var y = new double[size];
        for (var i = 0; i < size; i++)
        {
            var rest = -slope[free[i]];
            for (var k = 0; k < i; k++) rest = Math.FusedMultiplyAdd(-lower[(i * size) + k], y[k], rest);
            y[i] = rest / lower[(i * size) + i];
        }
        for (var i = size - 1; i >= 0; i--)
        {
            var rest = y[i];
            for (var k = i + 1; k < size; k++) rest = Math.FusedMultiplyAdd(-lower[(k * size) + i], y[k], rest);
            y[i] = rest / lower[(i * size) + i];
            direction[free[i]] = y[i];
        }
        return direction;
    }

    private bool Factor(double[] matrix, int[] free, double ridge, double[] lower)
    {
        var size = free.Length;
        for (var i = 0; i < size; i++)
        {
            for (var j = 0; j <= i; j++)
            {
                var given = matrix[(free[i] * _n) + free[j]];
                var rest = i == j ? given + (ridge * (Math.Abs(given) + 1e-4)) : given;
                for (var k = 0; k < j; k++) rest = Math.FusedMultiplyAdd(-lower[(i * size) + k], lower[(j * size) + k], rest);
                if (i != j) lower[(i * size) + j] = rest / lower[(j * size) + j];
                else if (rest > 1e-12 * Math.Abs(given)) lower[(i * size) + i] = Math.Sqrt(rest);
                else return ridge > 1e300 ? throw new ArithmeticException("The curvature is not finite: the function or its slope is not a number at the point reached.") : false;
            }
        }
        return true;
    }

    private void Update(double[] matrix, double[] x, double[] slope, double[] next, double[] nextSlope)
    {
        var (bs, y) = (new double[_n], new double[_n]);
        var (sbs, sy) = (0.0, 0.0);
        for (var i = 0; i < _n; i++)
        {
            for (var j = 0; j < _n; j++) bs[i] = Math.FusedMultiplyAdd(matrix[(i * _n) + j], next[j] - x[j], bs[i]);
            y[i] = nextSlope[i] - slope[i];
            sbs = Math.FusedMultiplyAdd(next[i] - x[i], bs[i], sbs);
            sy = Math.FusedMultiplyAdd(next[i] - x[i], y[i], sy);
        }
        if (!(sbs > 0)) return;
        var kept = sy < 0.2 * sbs ? 0.8 * sbs / (sbs - sy) : 1;
        var curvature = Math.FusedMultiplyAdd(kept, sy, (1 - kept) * sbs);
        for (var i = 0; i < _n; i++) y[i] = Math.FusedMultiplyAdd(kept, y[i], (1 - kept) * bs[i]);
        for (var i = 0; i < _n; i++)
        {
            for (var j = 0; j <= i; j++)
                matrix[(i * _n) + j] = matrix[(j * _n) + i] = Math.FusedMultiplyAdd(y[i] / curvature, y[j], Math.FusedMultiplyAdd(-bs[i] / sbs, bs[j], matrix[(i * _n) + j]));
        }
    }

    private double Norm(double[] x, double[] slope)
    {
        var norm = 0.0;
        for (var i = 0; i < _n; i++) norm = Math.Max(norm, Math.Abs(x[i] - Math.Clamp(x[i] - slope[i], _low[i], _high[i])));
        return norm;
    }

    private void Project(double[] x)
    {
        for (var i = 0; i < _n; i++) x[i] = Math.Clamp(x[i], _low[i], _high[i]);
    }
}
