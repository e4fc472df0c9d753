using System.Globalization;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Numerics.Estimation;

namespace RiskWorker.Engine.Models;

/// <summary>Jumps found in a window of shocks, and what is left of it without them.</summary>
internal sealed class JumpEstimation
{
    private const double CommonFraction = 0.5;

    private readonly JumpDiffusionFit[] _fits;

    private JumpEstimation(JumpDiffusionFit[] fits, double[] quiet) => (_fits, Quiet) = (fits, quiet);

    /// <summary>The shocks of the window without those of jump days, which count as 0, each row scaled up so that its mean square is that of its quiet days.</summary>
    public double[] Quiet { get; }

    /// <summary>Finds them.</summary>
    /// <exception cref="CalibrationException">There are too few days, or the covariance is not estimated from those left without jumps.</exception>
    public static JumpEstimation Of(ModelSettings model, ShockWindow window, int factors)
    {
        // Any other covariance would hold the jumps that are found besides.
        if (model.MissingDays == MissingDays.Pairwise) throw new CalibrationException(model.Name, "Jumps are found in complete days; take 'missingDays: complete', or give the jumps.");
        if (model.Covariance == CovarianceEstimator.Given) throw new CalibrationException(model.Name, "A given covariance holds the jumps that would be found in the history; give the jumps, or have the covariance estimated.");
        var (days, threshold) = (window.Days.Count, model.Jumps.Threshold);
        if (days < JumpThreshold.FewestDays)
            throw new CalibrationException("observations", $"The model '{model.Name}' looks for jumps in the shocks of {days} days; it needs {JumpThreshold.FewestDays}.");
        var common = new bool[days];
        // Common takes two at least: what one of two factors does alone is its own.
        var fits = factors == 1 ? [JumpDiffusionFit.Of(window.Shocks, threshold)] : JumpDiffusionFit.OfSeveral(window.Shocks, factors, threshold, Math.Max(CommonFraction, Math.Min(2.0 / factors, 1)), common);
        var (quiet, jumps) = ((double[])window.Shocks.Clone(), new bool[days]);
        for (var j = 0; j < factors; j++)
        {
            JumpThreshold.Mark(window.Row(j), threshold, jumps);
            var row = quiet.AsSpan(j * days, days);
            var left = days;
            for (var t = 0; t < days; t++)
            {
                if (!jumps[t] && !common[t]) continue;
                row[t] = 0;
                left--;
            }
            if (left == 0 || left == days) continue;
            var scale = Math.Sqrt((double)days / left);
            for (var t = 0; t < days; t++) row[t] *= scale;
        }
        return new(fits, quiet);
    }

    /// <summary>The law of what was found.</summary>
    public JumpLaw Law(int[] moving, double[] deviations)
    {
        JumpSize[] common = [.. moving.Select(j => Size(_fits[j].Common))], own = [.. moving.Select(j => Size(_fits[j].Own))];
        return new(_fits.Length == 0 ? 0 : _fits[0].Common.Intensity, common, [.. moving.Select(j => _fits[j].Own.Intensity)], own, IsGiven: false, [.. moving.Select(j => NoteOf(_fits[j].Own.Caveats))])
        {
            FurthestJump = JumpLaw.FurthestOf(common, own, [.. moving.Select(j => deviations[j])]),
        };
    }

    /// <summary>The law of jumps that were given.</summary>
    /// <exception cref="CalibrationException">A factor that is named does not exist, or does not move.</exception>
    public static JumpLaw Given(ModelSettings model, IReadOnlyList<Factor> factors, int[] moving, double[] deviations)
    {
        foreach (var name in model.Jumps.Common.Keys.Concat(model.Jumps.Own.Keys))
        {
            if (!moving.Any(j => factors[j].Name == name))
                throw new CalibrationException(name, $"The model '{model.Name}' gives it jumps, but it is not among the factors that move.");
        }
        JumpSize[] common = [.. moving.Select(j => model.Jumps.Common.GetValueOrDefault(factors[j].Name))];
        OwnJumps[] own = [.. moving.Select(j => model.Jumps.Own.GetValueOrDefault(factors[j].Name))];
        JumpSize[] sizes = [.. own.Select(o => o.Size)];
        return new((model.Jumps.CommonPerYear ?? 0) / DaysPerYear, common, [.. own.Select(o => o.PerYear / DaysPerYear)], sizes, IsGiven: true, new string?[moving.Length])
        {
            FurthestJump = JumpLaw.FurthestOf(common, sizes, [.. moving.Select(j => deviations[j])]),
        };
    }

    /// <summary><paramref name="law"/>, if as many jumps as are expected within the longest horizon can be drawn.</summary>
    /// <exception cref="CalibrationException">They are too many.</exception>
    public static JumpLaw WithinReach(JumpLaw law, ModelSettings model, int longest)
    {
        var expected = law.OwnPerDay.Append(law.CommonPerDay).Max() * longest;
        return expected <= PoissonCounts.HighestMean ? law : throw new CalibrationException(model.Name,
            string.Create(CultureInfo.InvariantCulture, $"It expects {expected:0.#} jumps of one kind within the longest horizon of {longest} days; at most {PoissonCounts.HighestMean:0} can be drawn."));
    }

    private const double DaysPerYear = 252;

    private static JumpSize Size(JumpSizes sizes) => new(sizes.Mean, sizes.Deviation);

    private static string? NoteOf(JumpCaveats caveats)
    {
        if (caveats.HasFlag(JumpCaveats.SingleJump)) return "from a single jump";
        return caveats.HasFlag(JumpCaveats.DeviationAtZero) ? "sizes vary less than the diffusion" : null;
    }
}
