using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Estimation;

/// <summary>
/// GARCH(1,1) (Bollerslev 1986) by maximum likelihood of normal innovations: a consistent estimate also where they are not normal
/// (Bollerslev and Wooldridge 1992). The slope is analytic, the search a projected quasi-Newton from the best of a grid of starts in
/// each of three regions of persistence; the highest likelihood found stands.
/// </summary>
/// <remarks>
/// The series is centred and scaled before the search and the result taken back, so that neither its unit nor its level matters.
/// The recursion starts as <see cref="GarchParameters.Filter"/> says. Bits depend on the values alone. Where alpha is 0, beta says only how the
/// start is forgotten, and its likeliest value would be a trend drawn through the squares: of processes with alpha = 0 the one of
/// constant variance, beta = 0, stands for all.
/// </remarks>
public sealed class GarchFit
{
    /// <summary>The highest alpha + beta that is let pass.</summary>
    public const double HighestPersistence = 1 - 1e-6;

    /// <summary>The lowest omega that is let pass, in units of the series' mean squared residual.</summary>
    public const double LowestOmega = 1e-8;

    /// <summary>Days below which nothing is estimated unless the caller asks for it.</summary>
    public const int FewestDays = 100;

    private const double HalfLogTwoPi = 0.9189385332046727;
    private const double Tolerance = 1e-9;
    private const double Acceptable = 1e-6;

    // (alpha + beta, alpha/(alpha + beta)): three regions, of which each sends its best.
    private static readonly (double Persistence, double Share)[][] s_starts =
    [
        [(0.99, 0.02), (0.99, 0.06), (0.985, 0.15), (0.96, 0.05), (0.96, 0.15)],
        [(0.9, 0.05), (0.9, 0.2), (0.8, 0.12), (0.75, 0.4)],
        [(0.5, 0.15), (0.5, 0.6), (0.25, 0.9), (0.1, 0.5)],
    ];

    private GarchFit(GarchParameters parameters, ConditionalVariance variance, double logLikelihood, BoxMinimum minimum, int iterations)
    {
        Parameters = parameters;
        Variance = variance;
        LogLikelihood = logLikelihood;
        SlopeNorm = minimum.SlopeNorm;
        Iterations = iterations;
        Bounds = BoundsOf(minimum.X);
    }

    /// <summary>The estimate, in the unit of the series.</summary>
    public GarchParameters Parameters { get; }

    /// <summary>Filtered variances v₁ to v_n and the forecast v_{n+1}: those of <see cref="GarchParameters.Filter"/>.</summary>
    public ConditionalVariance Variance { get; }

    /// <summary>-½ Σ (ln 2π + ln v_t + e_t²/v_t).</summary>
    public double LogLikelihood { get; }

    /// <summary>
    /// Largest element of the likelihood's slope a day at the estimate, of the scaled series in the coordinates (omega, alpha + beta,
    /// alpha/(alpha + beta), mean), what a bound stops left out.
    /// </summary>
    public double SlopeNorm { get; }

    /// <summary>Whether <see cref="SlopeNorm"/> is at most 1e-6; 1e-9 is sought, and rounding may stop a flat likelihood before it.</summary>
    public bool IsConverged => SlopeNorm <= Acceptable;

    /// <summary>Steps of all searches together.</summary>
    public int Iterations { get; }

    /// <summary>The bounds that the estimate lies on.</summary>
    public GarchBounds Bounds { get; }

    /// <summary>Estimates the process of a series, the oldest day first.</summary>
    /// <param name="values">Finite numbers.</param>
    /// <param name="mean">The mean, where it is not to be estimated.</param>
    /// <param name="fewestDays">Days below which the series is refused; at least 10.</param>
    /// <exception cref="ArgumentException">The series is too short, does not vary, or holds a value that is not finite.</exception>
    public static GarchFit Of(ReadOnlySpan<double> values, double? mean = null, int fewestDays = FewestDays)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(fewestDays, 10);
        Series.RequireFinite(values, fewestDays, nameof(values));
        if (mean is { } given) Series.RequireFinite(given, nameof(mean));
        var centre = mean ?? Series.Mean(values);
        var scale = Math.Sqrt(Series.MeanSquare(values, centre));
        RequireVariance(values, centre, scale);
        var scaled = new double[values.Length];
        for (var t = 0; t < scaled.Length; t++) scaled[t] = (values[t] - centre) / scale;
        var (best, iterations) = Search(new GarchLikelihood(scaled), mean is null ? 4 : 3);
        var found = GarchLikelihood.At(best.X);
        var parameters = found with { Mean = Math.FusedMultiplyAdd(scale, found.Mean, centre), Omega = found.Omega * (scale * scale) };
        var variance = parameters.Filter(values);
        return new(parameters, variance, LogLikelihoodOf(values, variance), best, iterations);
    }

    /// <summary>The normal log-likelihood of a series under given variances: -½ Σ (ln 2π + ln v_t + e_t²/v_t).</summary>
    /// <exception cref="ArgumentException">There are not as many variances as values.</exception>
    public static double LogLikelihoodOf(ReadOnlySpan<double> values, ConditionalVariance variance)
    {
        ArgumentNullException.ThrowIfNull(variance);
        Spans.RequireLength(values.Length, variance.Variances.Length, nameof(variance));
        var terms = new double[values.Length];
        Logarithm.Of(variance.Variances, terms);
        for (var t = 0; t < terms.Length; t++)
        {
            var error = values[t] - variance.Mean;
            terms[t] += error * error / variance.Variances[t];
        }
        return -Math.FusedMultiplyAdd(values.Length, HalfLogTwoPi, 0.5 * LaneSum.Of(terms));
    }

    private static (BoxMinimum Best, int Iterations) Search(GarchLikelihood likelihood, int coordinates)
    {
        double[] low = [LowestOmega, 0, 0, -10], high = [4, HighestPersistence, 1, 10];
        var search = new BoxQuasiNewton(likelihood, low[..coordinates], high[..coordinates], [0.3, 0.3, 0.3, 1]);
        double[] constant = [1, 0, 0, 0];
        constant = constant[..coordinates];
        // The scaled series' own mean and variance: the most likely of all that do not react, where the search stays.
        var best = search.From(constant, Tolerance);
        var iterations = best.Steps;
        foreach (var region in s_starts)
        {
            var end = search.From(BestOf(region, likelihood, coordinates), Tolerance);
            iterations += end.Steps;
            if (Reacts(end.X) && end.Value < best.Value) best = end;
        }
        return (best, iterations);
    }

    private static double[] BestOf((double Persistence, double Share)[] region, GarchLikelihood likelihood, int coordinates)
    {
        Span<double> slope = stackalloc double[coordinates];
        var (best, lowest) = (Array.Empty<double>(), double.PositiveInfinity);
        foreach (var (persistence, share) in region)
        {
            double[] x = [1 - persistence, persistence, share, 0];
            x = x[..coordinates];
            var value = likelihood.Of(x, slope);
            if (best.Length > 0 && !(value < lowest)) continue;
            (best, lowest) = (x, value);
        }
        return best;
    }

    // A series of equal numbers may differ from its own mean by what the mean's last bit is worth.
    private static void RequireVariance(ReadOnlySpan<double> values, double centre, double scale)
    {
        if (!(scale > 4e-16 * Math.Abs(centre)) || 1 / (scale * scale) is 0 or double.PositiveInfinity)
            throw new ArgumentException($"values has a standard deviation of {scale} about {centre} over {values.Length} days; a GARCH process needs a series that varies.", nameof(values));
    }

    private static bool Reacts(double[] x) => x[1] > 0 && x[2] > 0;

    private static GarchBounds BoundsOf(double[] x)
    {
        var bounds = GarchBounds.None;
        if (!Reacts(x)) bounds |= GarchBounds.NoReaction;
        if (!Reacts(x) || x[2] >= 1) bounds |= GarchBounds.NoMemory;
        if (x[1] >= HighestPersistence) bounds |= GarchBounds.NoReversion;
        if (x[0] <= LowestOmega) bounds |= GarchBounds.NoFloor;
        return bounds;
    }
}
