using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// The largest likelihood of a normal law of which only what lies below a cut is seen: with θ = 1/s and δ = m/s it is concave (R. J. Olsen,
/// Note on the uniqueness of the maximum likelihood estimator for the Tobit model, Econometrica, 1978), so Newton's steps, halved where they overshoot, find it.
/// </summary>
internal static class CensoredNormalFit
{
    private const int MostSteps = 200;
    private const double Converged = 1e-13;

    /// <summary>Twice the logarithm of the largest likelihood over that of the standard normal law.</summary>
    /// <param name="count">How many of the days are seen.</param>
    /// <param name="sum">Sum of what is seen.</param>
    /// <param name="squares">Sum of its squares.</param>
    /// <param name="days">All days.</param>
    /// <param name="cut">The cut.</param>
    public static double Ratio(int count, double sum, double squares, int days, double cut)
    {
        var sample = new Sample(count, sum, squares, days - count, cut);
        var standard = sample.Likelihood(1, 0);
        // With nothing seen the likelihood tends to 1 as the mean grows.
        if (count == 0) return Math.Max(-2 * standard, 0);
        var (theta, delta, value) = (1.0, 0.0, standard);
        for (var step = 0; step < MostSteps; step++)
        {
            var (moveTheta, moveDelta, gain) = sample.NewtonStep(theta, delta);
            if (!(gain > Converged)) break;
            var scale = 1.0;
            while (scale > 1e-12 && !(theta + (scale * moveTheta) > 0 && sample.Likelihood(theta + (scale * moveTheta), delta + (scale * moveDelta)) > value)) scale /= 2;
            if (scale <= 1e-12) break;
            (theta, delta) = (theta + (scale * moveTheta), delta + (scale * moveDelta));
            value = sample.Likelihood(theta, delta);
        }
        return Math.Max(2 * (value - standard), 0);
    }

    private readonly record struct Sample(int Count, double Sum, double Squares, int Beyond, double Cut)
    {
        // Without -n/2 ln 2π.
        public double Likelihood(double theta, double delta) =>
            (Count * Logarithm.Of(theta)) - (0.5 * ((theta * theta * Squares) - (2 * theta * delta * Sum) + (Count * delta * delta)))
            + (Beyond == 0 ? 0 : Beyond * LogCdf(delta - (theta * Cut)));

        public (double Theta, double Delta, double Gain) NewtonStep(double theta, double delta)
        {
            var w = delta - (theta * Cut);
            var mills = Mills(w);
            var slope = -mills * (w + mills);
            var byTheta = (Count / theta) - (theta * Squares) + (delta * Sum) - (Beyond * Cut * mills);
            var byDelta = (theta * Sum) - (Count * delta) + (Beyond * mills);
            var twiceTheta = (-Count / (theta * theta)) - Squares + (Beyond * Cut * Cut * slope);
            var mixed = Sum - (Beyond * Cut * slope);
            var twiceDelta = -Count + (Beyond * slope);
            var determinant = (twiceTheta * twiceDelta) - (mixed * mixed);
            var moveTheta = ((mixed * byDelta) - (twiceDelta * byTheta)) / determinant;
            var moveDelta = ((mixed * byTheta) - (twiceTheta * byDelta)) / determinant;
            return (moveTheta, moveDelta, (byTheta * moveTheta) + (byDelta * moveDelta));
        }

        // Far below 0: ln Φ(w) = -w²/2 - ln(-w √2π) - 1/w² + ..., φ/Φ = -w - 1/w + ...
        private static double LogCdf(double w) =>
            w > -30 ? Logarithm.Of(NormalCdf.Of(w)) : (-0.5 * w * w) - Logarithm.Of(-w) - 0.9189385332046728 - (1 / (w * w));

        private static double Mills(double w) => w > -30 ? NormalDensity.Of(w) / NormalCdf.Of(w) : -w - (1 / w) + (2 / (w * w * w));
    }
}
