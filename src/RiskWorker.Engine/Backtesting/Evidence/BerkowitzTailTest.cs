using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// Whether the loss tail of the forecast is right in mass and shape: inverse normals of the forecast probabilities, cut off at the
/// quantile of 1 - confidence, against a normal law of any mean and deviation. J. Berkowitz, Testing density forecasts, with applications
/// to risk management (Journal of Business and Economic Statistics, 2001), section 3.2.
/// </summary>
/// <remarks>
/// A year holds few days of the tail: at 99% the chi-square law with 2 degrees of freedom rejects 3.6% of right years where it should 5%
/// (measured on 5,000). The p-value is simulated for that number of days and confidence. Too few losses reject as well as too many.
/// </remarks>
public static class BerkowitzTailTest
{
    /// <summary>Series of a simulated law.</summary>
    public const int Series = 20_000;

    private const double ManyExceptions = 1000;
    private static readonly Judgement s_judgement = new(StatisticalTestNames.BerkowitzTail, "Berkowitz (2001), censored likelihood");

    /// <summary>The test of forecast probabilities of each day's profit, each in (0, 1).</summary>
    public static StatisticalTest Of(IReadOnlyList<double> transforms, Confidence confidence, NullLaws laws)
    {
        ForecastProbabilities.Require(transforms);
        if (transforms.Count == 0) return s_judgement.NotAssessed("No day with profit and forecast.");
        var p = (double)(1 - confidence.Level);
        var (count, sum, squares) = (0, 0.0, 0.0);
        foreach (var u in transforms)
        {
            if (u >= p) continue;
            var z = InverseNormal.Of(u);
            (count, sum, squares) = (count + 1, sum + z, squares + (z * z));
        }
        var ratio = CensoredNormalFit.Ratio(count, sum, squares, transforms.Count, InverseNormal.Of(p));
        var asymptotic = Judgement.ChiSquareTail(ratio, 2);
        if (transforms.Count * p > ManyExceptions) return s_judgement.Of(ratio, asymptotic, PValueMethod.Asymptotic);
        return s_judgement.Of(ratio, ratio, Law(transforms.Count, confidence, laws),
            $"{count} days in the tail. {Series} simulated series; the chi-square law would give {Judgement.Text(asymptotic)}.");
    }

    internal static NullLaw Law(int days, Confidence confidence, NullLaws laws) => laws.Of(StatisticalTestNames.BerkowitzTail, days, confidence.Level, 0, () =>
    {
        var p = (double)(1 - confidence.Level);
        var (counts, sums, squares) = (new int[Series], new double[Series], new double[Series]);
        GeometricWaits.ForEach(Series, days, p, 3, (series, _, _, place) =>
        {
            var z = InverseNormal.Of(p * place);
            counts[series]++;
            sums[series] += z;
            squares[series] += z * z;
        });
        var cut = InverseNormal.Of(p);
        for (var i = 0; i < Series; i++) sums[i] = CensoredNormalFit.Ratio(counts[i], sums[i], squares[i], days, cut);
        return NullLaw.Simulated(sums);
    });
}
