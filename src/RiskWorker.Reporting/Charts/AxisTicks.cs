using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Charts;

/// <summary>Ticks at 1, 2 or 5 times a power of ten, labelled by <see cref="Numerals"/>: the culture has no say.</summary>
internal static class AxisTicks
{
    /// <param name="low">The lower end of the axis.</param>
    /// <param name="high">Its upper end, above <paramref name="low"/>.</param>
    /// <param name="most">The largest number of steps.</param>
    /// <param name="unit">What one printed unit stands for; labels are the position divided by it.</param>
    public static (double[] Positions, string[] Labels) Between(double low, double high, int most, double unit)
    {
        var (step, decimals) = Step((high - low) / unit / most);
        var first = (long)Math.Ceiling((low / unit / step) - 1e-9);
        var last = (long)Math.Floor((high / unit / step) + 1e-9);
        var positions = new List<double>();
        var labels = new List<string>();
        for (var i = first; i <= last; i++)
        {
            positions.Add(i * step * unit);
            labels.Add(Numerals.Fixed(i * step, decimals));
        }

        return ([.. positions], [.. labels]);
    }

    private static (double Step, int Decimals) Step(double least)
    {
        var (power, decimals) = (1.0, 0);
        while (power * 10 <= least)
            power *= 10;
        while (power > least && decimals < 9)
            (power, decimals) = (power / 10, decimals + 1);

        // Here power <= least < 10 power, and a step of 10 power has a decimal less.
        foreach (var times in (double[])[1, 2, 5])
        {
            if (times * power >= least)
                return (times * power, decimals);
        }

        return (10 * power, Math.Max(decimals - 1, 0));
    }
}
