using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// Independent exceptions in many series of days at once, by the waits between them: 1 + ⌊ln u / ln(1 - p)⌋ days, a geometric number. Each
/// exception comes with another uniform, its place in the tail.
/// </summary>
internal static class GeometricWaits
{
    /// <summary>Calls <paramref name="seen"/> with (series, day of the exception from 1, wait, place) for every exception of every series, each series in order of days.</summary>
    public static void ForEach(int series, int days, double exception, uint subIndex, Action<int, int, int, double> seen)
    {
        var stream = new DrawStream(NullLaws.Seed, DrawPurpose.NullSeries, subIndex);
        var (waits, places, day) = (new double[series], new double[series], new int[series]);
        var perNoException = 1 / Logarithm.Of(1 - exception);
        var alive = series;
        for (uint pair = 0; alive > 0; pair++)
        {
            UniformDraws.FillPair(stream, 0, pair, waits, places);
            Logarithm.Of(waits, waits);
            for (var i = 0; i < series; i++)
            {
                if (day[i] > days) continue;
                var wait = (int)Math.Min(days + 1.0, 1 + Math.Floor(waits[i] * perNoException));
                day[i] += wait;
                if (day[i] > days) alive--; else seen(i, day[i], wait, places[i]);
            }
        }
    }
}
