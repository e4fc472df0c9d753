using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Estimation;

/// <summary>
/// Minus the normal log-likelihood a day of a GARCH(1,1) process, with its analytic slope, over the coordinates
/// (omega, alpha + beta, alpha/(alpha + beta), mean), in which every constraint is an end of an interval, and the ridge of constant level,
/// along which the likelihood hardly changes, is nearly straight. Without the last coordinate the mean is 0. It owns its buffers: one
/// thread at a time.
/// </summary>
/// <remarks>The start of the recursion is that of <see cref="GarchParameters.Filter"/>, and its dependence on the mean is in the slope.</remarks>
internal sealed class GarchLikelihood : IBoxObjective
{
    private const double HalfLogTwoPi = 0.9189385332046727;

    private readonly double[] _values;
    private readonly double[] _rows;
    private readonly int _width;

    public GarchLikelihood(double[] values)
    {
        _values = values;
        _width = (values.Length + 7) / 8 * 8;
        _rows = new double[GarchSums.Rows * _width];
        _rows.AsSpan(_width + values.Length, _width - values.Length).Fill(1);
    }

    /// <summary>The process at a point of the coordinates.</summary>
    public static GarchParameters At(ReadOnlySpan<double> x) =>
        new(x.Length > 3 ? x[3] : 0, x[0], x[1] * x[2], x[1] * (1 - x[2]));

    public double Of(ReadOnlySpan<double> x, Span<double> slope)
    {
        var process = At(x);
        Recur(process);
        var sums = GarchSums.Of(_rows, _width);
        var scale = -0.5 / _values.Length;
        var (alpha, beta) = (scale * sums.Alpha, scale * sums.Beta);
        slope[0] = scale * sums.Omega;
        slope[1] = Math.FusedMultiplyAdd(x[2], alpha, (1 - x[2]) * beta);
        slope[2] = x[1] * (alpha - beta);
        if (x.Length > 3) slope[3] = scale * Math.FusedMultiplyAdd(2, sums.Errors, sums.Mean);
        return HalfLogTwoPi - (scale * (sums.Logarithms + sums.Ratios));
    }

    /// <summary>
    /// Fisher's information a day, Σ (½ v⁻² ∇v ∇v' + v⁻¹ ∇m ∇m')/n, in the coordinates: positive semidefinite everywhere, and near
    /// the maximum close to the curvature.
    /// </summary>
    public double[] Curvature(ReadOnlySpan<double> x)
    {
        var process = At(x);
        Recur(process);
        var n = x.Length;
        var curvature = new double[n * n];
        Span<double> d = stackalloc double[4];
        for (var t = 0; t < _values.Length; t++)
        {
            var r = 1 / _rows[_width + t];
            var (alpha, beta) = (Row(3)[t], Row(4)[t]);
            d[0] = r * Row(2)[t];
            d[1] = r * Math.FusedMultiplyAdd(x[2], alpha, (1 - x[2]) * beta);
            d[2] = r * x[1] * (alpha - beta);
            d[3] = r * Row(5)[t];
            for (var i = 0; i < n; i++)
            {
                for (var j = 0; j <= i; j++) curvature[(i * n) + j] = Math.FusedMultiplyAdd(d[i], d[j], curvature[(i * n) + j]);
            }
            if (n > 3) curvature[15] = Math.FusedMultiplyAdd(2, r, curvature[15]);
        }
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j <= i; j++) curvature[(i * n) + j] = curvature[(j * n) + i] = curvature[(i * n) + j] * 0.5 / _values.Length;
        }
        return curvature;
    }

    private Span<double> Row(int row) => _rows.AsSpan(row * _width, _values.Length);

    private void Recur(GarchParameters process)
    {
        var e = _rows.AsSpan(0, _width);
        for (var t = 0; t < _values.Length; t++) e[t] = _values[t] - process.Mean;
        var square = LaneSum.OfSquares(e) / _values.Length;
        var squareSlope = -2 * LaneSum.Of(e) / _values.Length;
        var (variance, byOmega, byAlpha, byBeta, byMean) = (square, 0.0, 0.0, 0.0, squareSlope);
        Span<double> variances = Row(1), omegas = Row(2), alphas = Row(3), betas = Row(4), means = Row(5);
        for (var t = 0; t < variances.Length; t++)
        {
            byOmega = Math.FusedMultiplyAdd(process.Beta, byOmega, 1);
            byAlpha = Math.FusedMultiplyAdd(process.Beta, byAlpha, square);
            byBeta = Math.FusedMultiplyAdd(process.Beta, byBeta, variance);
            byMean = Math.FusedMultiplyAdd(process.Beta, byMean, process.Alpha * squareSlope);
            variance = process.Next(square, variance);
            (variances[t], omegas[t], alphas[t], betas[t], means[t]) = (variance, byOmega, byAlpha, byBeta, byMean);
            square = e[t] * e[t];
            squareSlope = -2 * e[t];
        }
    }
}
