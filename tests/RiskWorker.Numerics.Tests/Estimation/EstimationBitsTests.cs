using System.Runtime.InteropServices;
using System.Security.Cryptography;
using RiskWorker.Numerics.Estimation;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Estimation;

/// <summary>The first half of SHA-256 over the bits of estimates: the same on every hardware and in every setting.</summary>
public sealed class EstimationBitsTests
{
    private static readonly Dictionary<string, Func<IEnumerable<double>>> Outputs = new()
    {
        [nameof(GarchFit)] = () => Windows().SelectMany(w => Numbers(GarchFit.Of(w, w.Length % 2 == 0 ? 0 : null))),
        [nameof(EwmaVariance)] = () => Windows().SelectMany(w => Numbers(EwmaVariance.Of(w, 0.94))),
        [nameof(VarianceStep)] = Steps,
        [nameof(StandardizedResiduals)] = () => Windows().SelectMany(w => Residuals(w)),
        [nameof(LedoitWolf)] = () => new[] { true, false }.SelectMany(removeMean => new[]
        {
            LedoitWolf.ScaledIdentity(Rows(), 9, removeMean), LedoitWolf.ConstantCorrelation(Rows(), 9, removeMean), LedoitWolf.Correlation(Rows(), 9, removeMean),
        }).SelectMany(s => s.Matrix.Append(s.Intensity).Append(s.Level).Concat(s.Deviations)),
        [nameof(PairwiseCovariance)] = () => PairwiseCovariance.Of(Rows(gaps: true), 9, DayWeights.Exponential(111, 0.97), 10).Matrix,
        [nameof(JumpDiffusionFit)] = Jumps,
        [nameof(PoissonCounts)] = () => new[] { 0.02, 1.5, 20 }.SelectMany(m => new PoissonCounts(m).AtMost.ToArray()),
        [nameof(MertonReturn)] = () => new[] { 0.0, 0.03, 4 }.Select(intensity => new MertonReturn(0.001, 0.01, intensity, -0.04, 0.03, 10))
            .SelectMany(x => new[] { 0.001, 0.01, 0.2, 0.7 }.SelectMany(p => new[] { x.Quantile(p), x.LongLoss(p).Shortfall, x.ShortLoss(p).Shortfall, x.ReturnLoss(p).Shortfall })),
    };

    [Theory]
    [InlineData("GarchFit", "98daf11e398c0eadfab20fc591b181e8")]
    [InlineData("EwmaVariance", "4191ac84fbfd3214df1f05ccdf26a3da")]
    [InlineData("VarianceStep", "ec8b00412faff3d9987b99d2333f8e24")]
    [InlineData("StandardizedResiduals", "36e1ea1966e0e2ad76952bbb328c54e8")]
    [InlineData("LedoitWolf", "c3a6d16039aaffbc6a7e810b1075239f")]
    [InlineData("PairwiseCovariance", "63996f3de6e2e0534f6a6b57b5808346")]
    [InlineData("JumpDiffusionFit", "603bdcfe6c9310068f4021c4506e392c")]
    [InlineData("PoissonCounts", "778a777f9124c9f79af058e21cb6d2bd")]
    [InlineData("MertonReturn", "8212d591dd672a8636b7261dd21b1db9")]
    public void Estimates_bits_are_the_pinned_ones(string name, string expected)
    {
        double[] outputs = [.. Outputs[name]()];
        Assert.DoesNotContain(outputs, double.IsNaN);
        Assert.Equal(expected, Convert.ToHexStringLower(SHA256.HashData(MemoryMarshal.AsBytes<double>(outputs)))[..32]);
    }

    private static IEnumerable<double[]> Windows()
    {
        var marks = ReturnSeries.MarkPound();
        for (var first = 0; first + 407 < marks.Length; first += 311) yield return marks[first..(first + 250 + (first % 157))];
        for (var seed = 1; seed <= 6; seed++) yield return new SeededNumbers((ulong)seed).Between(-1, 1, 200 + seed);
    }

    private static IEnumerable<double> Numbers(GarchFit fit) =>
        [fit.Parameters.Mean, fit.Parameters.Omega, fit.Parameters.Alpha, fit.Parameters.Beta, fit.LogLikelihood, fit.SlopeNorm, fit.Iterations, .. Numbers(fit.Variance)];

    private static IEnumerable<double> Numbers(ConditionalVariance variance) => [.. variance.Variances, variance.Forecast];

    private static double[] Residuals(double[] series)
    {
        var residuals = new double[series.Length];
        StandardizedResiduals.Write(series, EwmaVariance.Of(series, 0.97), residuals);
        return residuals;
    }

    private static double[] Rows(bool gaps = false)
    {
        var numbers = new SeededNumbers(31);
        var rows = numbers.Between(-1, 1, 9 * 111);
        for (var k = 0; k < rows.Length; k++)
        {
            rows[k] += 0.3 * rows[k % 111];
            if (gaps && k % 7 == 3) rows[k] = double.NaN;
        }
        return rows;
    }

    private static double[] Steps()
    {
        var numbers = new SeededNumbers(33);
        double[] variance = numbers.Between(0.1, 2, 1003), move = new double[1003];
        for (var day = 0; day < 20; day++) VarianceStep.Advance(new(0.01, 0.03, 0.1, 0.87), numbers.Between(-3, 3, 1003), variance, move);
        return [.. variance, .. move];
    }

    private static IEnumerable<double> Jumps()
    {
        var numbers = new SeededNumbers(32);
        var rows = numbers.Between(-1, 1, 5 * 250);
        for (var k = 0; k < rows.Length; k++)
        {
            if (k % 83 == 7 || k % 250 % 90 == 11) rows[k] *= 9;
        }
        var fits = JumpDiffusionFit.OfSeveral(rows, 5, 3.5, 0.6, new bool[250]);
        return fits.Append(JumpDiffusionFit.Of(rows.AsSpan(0, 250), 3)).SelectMany(f => new[]
        {
            f.Diffusion, f.Own.Intensity, f.Own.Mean, f.Own.Deviation, f.Common.Intensity, f.Common.Mean, f.Common.Deviation,
        });
    }
}
