namespace RiskWorker.Numerics.Estimation;

/// <summary>
/// A GARCH(1,1) process (Bollerslev 1986): x_t = mean + e_t, e_t = √v_t z_t with z independent of mean 0 and variance 1, and
/// v_t = omega + alpha e²_{t-1} + beta v_{t-1}.
/// </summary>
/// <param name="Mean">The mean of a day.</param>
/// <param name="Omega">Positive.</param>
/// <param name="Alpha">At least 0: what yesterday's square adds.</param>
/// <param name="Beta">At least 0: what is kept of yesterday's variance.</param>
public readonly record struct GarchParameters(double Mean, double Omega, double Alpha, double Beta)
{
    /// <summary>alpha + beta: the part of a variance's distance from its level that is left a day later.</summary>
    public double Persistence => Alpha + Beta;

    /// <summary>omega / (1 - alpha - beta): the variance that forecasts of far days tend to; infinite or negative from a persistence of 1 on.</summary>
    public double LevelVariance => Omega / (1 - Persistence);

    /// <summary>
    /// The variances of a series, the oldest day first. Before the first day both e² and v count as the mean of the series' squared
    /// residuals, as in Fiorentini, Calzolari and Panattoni (1996, Journal of Applied Econometrics 11, 399-417).
    /// </summary>
    /// <exception cref="ArgumentException">There is no value, one is not finite, or the parameters are no GARCH process.</exception>
    public ConditionalVariance Filter(ReadOnlySpan<double> values)
    {
        Require();
        Series.RequireFinite(values, 1, nameof(values));
        var variances = new double[values.Length];
        var square = Series.MeanSquare(values, Mean);
        var variance = square;
        for (var t = 0; t < values.Length; t++)
        {
            variance = Next(square, variance);
            variances[t] = variance;
            var error = values[t] - Mean;
            square = error * error;
        }
        return new(Mean, variances, Next(square, variance));
    }

    /// <summary>The variance of the day after one of squared residual <paramref name="square"/> and variance <paramref name="variance"/>.</summary>
    public double Next(double square, double variance) => Math.FusedMultiplyAdd(Beta, variance, Math.FusedMultiplyAdd(Alpha, square, Omega));

    private void Require()
    {
        if (!(double.IsFinite(Mean) && Omega > 0 && Omega < double.PositiveInfinity && Alpha >= 0 && Beta >= 0 && Persistence < double.PositiveInfinity))
            throw new ArgumentException($"mean {Mean}, omega {Omega}, alpha {Alpha} and beta {Beta} are no GARCH process: the mean must be finite, omega positive, alpha and beta at least 0.");
    }
}
