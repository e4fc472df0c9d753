using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Statistics;

namespace RiskWorker.Engine.Tests.Measures;

/// <summary>The plain way to VaR, ES and their intervals: all losses of a series, sorted, read by the definitions.</summary>
internal sealed class SortedLosses(IEnumerable<double> losses)
{
    private readonly double[] _ascending = [.. losses.Order()];

    public double Largest(int rank) => _ascending[^rank];

    public double Var(decimal alpha) => _ascending[(int)decimal.Ceiling(_ascending.Length * alpha) - 1];

    public (double? Low, double? High) VarInterval(decimal alpha, decimal level)
    {
        var ranks = BinomialRanks.Interval(_ascending.Length, alpha, level);
        return (ranks.Low is { } low ? _ascending[low - 1] : null, ranks.High is { } high ? _ascending[high - 1] : null);
    }

    public double Shortfall(decimal alpha) => Average(alpha, loss => loss);

    public (double Low, double High) ShortfallInterval(decimal alpha, decimal level)
    {
        var (es, var) = (Shortfall(alpha), Var(alpha));
        var variance = Average(alpha, loss => (loss - es) * (loss - es)) + ((double)alpha * (es - var) * (es - var));
        var half = InverseNormal.Of((double)((1 + level) / 2)) * Math.Sqrt(variance / (double)(_ascending.Length * (1 - alpha)));
        return (es - half, es + half);
    }

    private double Average(decimal alpha, Func<double, double> of)
    {
        var weight = _ascending.Length * (1 - alpha);
        var whole = (int)decimal.Floor(weight);
        var fraction = (double)(weight - whole);
        return (_ascending[^whole..].Sum(of) + (fraction > 0 ? fraction * of(_ascending[^(whole + 1)]) : 0)) / (double)weight;
    }
}
