using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>The largest likelihood of a stationary normal autoregression z - m = ρ (z' - m) + e with e of variance s², first day included.</summary>
/// <remarks>Given ρ, m and s² have closed forms in sums over the days, so that one number is searched: on a grid, then by golden sections.</remarks>
internal sealed class BerkowitzLikelihood
{
    private const int Grid = 40;
    private const int Sections = 60;
    private const double Widest = 0.9999;
    private const double Golden = 0.6180339887498949;

    private readonly int _days;
    private readonly double _first;
    private readonly double _later, _earlier, _laterSquares, _earlierSquares, _products;

    /// <summary>Takes the sums of a series of at least two.</summary>
    public BerkowitzLikelihood(ReadOnlySpan<double> z)
    {
        (_days, _first) = (z.Length, z[0]);
        Squares = z[0] * z[0];
        for (var t = 1; t < z.Length; t++)
        {
            _later += z[t];
            _earlier += z[t - 1];
            _laterSquares += z[t] * z[t];
            _earlierSquares += z[t - 1] * z[t - 1];
            _products += z[t] * z[t - 1];
            Squares += z[t] * z[t];
        }
    }

    /// <summary>Sum of squares of the whole series.</summary>
    public double Squares { get; }

    /// <summary>Twice the logarithm of the largest likelihood over that of independent standard normals; ρ, mean and deviation s.</summary>
    public (double Ratio, double Correlation, double Mean, double Deviation) Fit()
    {
        var best = 0.0;
        for (var i = -Grid; i <= Grid; i++)
        {
            var at = Widest * i / Grid;
            if (Profile(at) > Profile(best)) best = at;
        }
        var (low, high) = (Math.Max(best - (Widest / Grid), -Widest), Math.Min(best + (Widest / Grid), Widest));
        for (var i = 0; i < Sections; i++)
        {
            var (left, right) = (high - (Golden * (high - low)), low + (Golden * (high - low)));
            if (Profile(left) > Profile(right)) high = right; else low = left;
        }
        var rho = (low + high) / 2;
        var (mean, variance) = Given(rho);
        return (Math.Max((2 * Profile(rho)) + Squares - _days, 0), rho, mean, Math.Sqrt(variance));
    }

    // Without -n/2 (ln 2π + 1).
    private double Profile(double rho) => 0.5 * (Logarithm.Of(1 - (rho * rho)) - (_days * Logarithm.Of(Given(rho).Variance)));

    private (double Mean, double Variance) Given(double rho)
    {
        var steps = _later - (rho * _earlier);
        var mean = (((1 + rho) * _first) + steps) / (1 + rho + ((_days - 1) * (1 - rho)));
        var constant = (1 - rho) * mean;
        var squares = _laterSquares - (2 * rho * _products) + (rho * rho * _earlierSquares) - (2 * constant * steps) + ((_days - 1) * constant * constant);
        return (mean, (squares + ((1 - (rho * rho)) * (_first - mean) * (_first - mean))) / _days);
    }
}
