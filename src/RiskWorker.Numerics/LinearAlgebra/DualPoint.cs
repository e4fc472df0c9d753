namespace RiskWorker.Numerics.LinearAlgebra;

/// <summary>
/// The dual of the nearest correlation problem at y: θ(y) = ½‖(A + diag y)₊‖² - Σ y, its gradient diag((A + diag y)₊) - 1,
/// and the Newton direction of its generalised Hessian (Qi and Sun 2006, SIAM J. Matrix Anal. Appl. 28, 360-385).
/// </summary>
internal sealed class DualPoint
{
    private const int MostConjugateSteps = 200;

    private readonly int _n;
    private readonly int _negative;
    private readonly double[] _values;
    private readonly double[] _vectors;
    private readonly double[] _transposed;

    public DualPoint(double[] given, double[] y)
    {
        _n = y.Length;
        Y = y;
        var shifted = (double[])given.Clone();
        for (var i = 0; i < _n; i++) shifted[(i * _n) + i] += y[i];
        var eigen = SymmetricEigen.Of(shifted, _n);
        _values = eigen.Values;
        _vectors = eigen.Vectors;
        _transposed = Transpose(_vectors, _n);
        while (_negative < _n && _values[_negative] <= 0) _negative++;
        PositivePart = Positive();
        Gradient = new double[_n];
        for (var i = 0; i < _n; i++) Gradient[i] = PositivePart[(i * _n) + i] - 1;
        Residual = Math.Sqrt(Dot(Gradient, Gradient));
        Value = Dual();
    }

    /// <summary>y.</summary>
    public double[] Y { get; }

    /// <summary>θ(y).</summary>
    public double Value { get; }

    /// <summary>∇θ(y).</summary>
    public double[] Gradient { get; }

    /// <summary>Euclidean norm of the gradient.</summary>
    public double Residual { get; }

    /// <summary>(A + diag y)₊, row-major.</summary>
    public double[] PositivePart { get; }

    /// <summary>d with V d = -∇θ by conjugate gradients, to a relative residual of min(0.01, ‖∇θ‖): enough for quadratic convergence.</summary>
    public double[] NewtonDirection()
    {
        var direction = new double[_n];
        var rest = Array.ConvertAll(Gradient, g => -g);
        var search = (double[])rest.Clone();
        var square = Dot(rest, rest);
        var enough = square * Math.Min(1e-4, square);
        for (var step = 0; step < MostConjugateSteps && square > enough; step++)
        {
            var image = Hessian(search);
            var curvature = Dot(search, image);
            if (!(curvature > 0)) break;
            var length = square / curvature;
            Axpy.Add(length, search, direction);
            Axpy.Add(-length, image, rest);
            var next = Dot(rest, rest);
            for (var i = 0; i < _n; i++) search[i] = rest[i] + (next / square * search[i]);
            square = next;
        }
        return direction;
    }

    /// <summary>
    /// V h = h - diag(Q'((1 - W) ∘ (Q diag(h) Q'))Q), Q the eigenvectors as rows, where 1 - W is 0 for two positive eigenvalues,
    /// 1 for two others, and |λ_k| / (λ_l - λ_k) for a mixed pair: only the rows k of the others are needed, mixed pairs twice.
    /// </summary>
    private double[] Hessian(double[] h)
    {
        var image = (double[])h.Clone();
        var (row, product) = (new double[_n], new double[_n]);
        for (var k = 0; k < _negative; k++)
        {
            var vector = _vectors.AsSpan(k * _n, _n);
            Array.Clear(row);
            for (var i = 0; i < _n; i++) Axpy.Add(vector[i] * h[i], _transposed.AsSpan(i * _n, _n), row);
            Array.Clear(product);
            for (var l = 0; l < _n; l++)
            {
                var weight = l < _negative ? 1 : -2 * _values[k] / (_values[l] - _values[k]);
                Axpy.Add(weight * row[l], _vectors.AsSpan(l * _n, _n), product);
            }
            for (var i = 0; i < _n; i++) image[i] -= vector[i] * product[i];
        }
        return image;
    }

    private double[] Positive()
    {
        var sum = new double[_n * _n];
        for (var k = _negative; k < _n; k++)
        {
            var vector = _vectors.AsSpan(k * _n, _n);
            for (var i = 0; i < _n; i++) Axpy.Add(_values[k] * vector[i], vector[i..], sum.AsSpan((i * _n) + i, _n - i));
        }
        for (var i = 0; i < _n; i++)
        {
            for (var j = 0; j < i; j++) sum[(i * _n) + j] = sum[(j * _n) + i];
        }
        return sum;
    }

    private double Dual()
    {
        var dual = 0.0;
        for (var k = _negative; k < _n; k++) dual += _values[k] * _values[k] / 2;
        foreach (var y in Y) dual -= y;
        return dual;
    }

    private static double[] Transpose(double[] matrix, int n)
    {
        var transposed = new double[matrix.Length];
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j < n; j++) transposed[(j * n) + i] = matrix[(i * n) + j];
        }
        return transposed;
    }

    private static double Dot(double[] a, double[] b)
    {
        var sum = 0.0;
        for (var i = 0; i < a.Length; i++) sum = Math.FusedMultiplyAdd(a[i], b[i], sum);
        return sum;
    }
}
