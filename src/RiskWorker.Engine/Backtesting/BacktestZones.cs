using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Statistics;

namespace RiskWorker.Engine.Backtesting;

/// <summary>
/// Zones of an exception count for any number of days and confidence: yellow from the first count whose cumulative binomial probability
/// reaches 95%, red from the first that reaches 99.99%, were the model's coverage true. For 250 days at 99% that is 5 and 10
/// (Basel Committee, Supervisory framework for the use of backtesting, January 1996, section III and table 2; MAR32.8 and MAR32.9).
/// </summary>
public static class BacktestZones
{
    /// <summary>Days below which a count says too little for a zone: a house rule, half the supervisory year.</summary>
    public const int FewestDays = 125;

    private const decimal Yellow = 0.95m;
    private const decimal Red = 0.9999m;

    /// <summary>The zone of <paramref name="exceptions"/> in <paramref name="days"/>; null below <see cref="FewestDays"/>.</summary>
    public static BacktestZone? Of(int exceptions, int days, Confidence confidence)
    {
        if (days < FewestDays) return null;
        var (yellow, red) = Boundaries(days, confidence);
        return exceptions >= red ? BacktestZone.Red : exceptions >= yellow ? BacktestZone.Yellow : BacktestZone.Green;
    }

    /// <summary>The first yellow and the first red count.</summary>
    public static (int Yellow, int Red) Boundaries(int days, Confidence confidence)
    {
        var count = new BinomialTail(days, 1 - confidence.Level);
        return (count.FirstReaching(Yellow), count.FirstReaching(Red));
    }
}
