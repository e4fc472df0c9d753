using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Calibration;

/// <summary>What filling missing days from proxies does to volatility and correlation.</summary>
internal static class FillEffects
{
    /// <summary>An effect for each factor of which <paramref name="window"/> holds filled days.</summary>
    public static IReadOnlyList<FillEffect> Of(ShockTable table, ShockWindow window) =>
        [.. Enumerable.Range(0, table.Factors.Count).Where(j => window.Filled[j] > 0).Select(j => Of(table, window, j))];

    private static FillEffect Of(ShockTable table, ShockWindow window, int factor)
    {
        // Filled days are the oldest.
        var (days, filled) = (window.Days.Count, window.Filled[factor]);
        var own = days - filled;
        var (other, with, alone) = (-1, 0.0, 0.0);
        for (var j = 0; j < table.Factors.Count && own > 1; j++)
        {
            if (j == factor) continue;
            var (all, some) = (Correlation(window.Row(factor), window.Row(j)), Correlation(window.Row(factor)[filled..], window.Row(j)[filled..]));
            if (double.IsFinite(all - some) && (other < 0 || Math.Abs(all - some) > Math.Abs(with - alone))) (other, with, alone) = (j, all, some);
        }
        return new(table.Factors[factor].Name, table.Factors[factor].Proxy!, filled, (double)filled / days, Deviation(window.Row(factor)),
            own > 1 ? Deviation(window.Row(factor)[filled..]) : null,
            other < 0 ? null : table.Factors[other].Name, other < 0 ? null : with, other < 0 ? null : alone);
    }

    private static double Deviation(ReadOnlySpan<double> shocks) => Math.Sqrt(Product(shocks, shocks) / shocks.Length);

    private static double Correlation(ReadOnlySpan<double> one, ReadOnlySpan<double> other) => Product(one, other) / Math.Sqrt(Product(one, one) * Product(other, other));

    private static double Product(ReadOnlySpan<double> one, ReadOnlySpan<double> other)
    {
        var sum = 0.0;
        for (var t = 0; t < one.Length; t++) sum = Math.FusedMultiplyAdd(one[t], other[t], sum);
        return sum;
    }
}
