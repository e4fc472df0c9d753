namespace RiskWorker.Numerics.Optimisation;

/// <summary>
/// Maximises a log-likelihood over degrees of freedom from 2.05 to 200 in their reciprocal, in which it is smooth: a grid, then golden section
/// about its best point, always with the same number of steps. The interval is where twice the log-likelihood has fallen by the 95%
/// quantile of χ² with one degree of freedom.
/// </summary>
internal static class DegreesOfFreedomSearch
{
    /// <summary>Lower end of the range.</summary>
    public const double Fewest = 2.05;

    /// <summary>Upper end of the range.</summary>
    public const double Most = 200.0;

    private const double ChiSquareOfOne = 3.841458820694124;
    private const double GoldenSection = 0.6180339887498949;
    private const int Cells = 32;
    private const int Steps = 36;
    private const int Bisections = 40;

    /// <summary>The fit.</summary>
    /// <param name="logLikelihood">Of ν; finite in the range, and of one maximum or nearly so.</param>
    /// <param name="atNormal">Its limit for large ν.</param>
    /// <param name="days">Days that it counts.</param>
    public static DegreesOfFreedomFit Maximise(Func<double, double> logLikelihood, double atNormal, double days)
    {
        double[] grid = new double[Cells + 1], values = new double[Cells + 1];
        int best = 0;
        for (int i = 0; i <= Cells; i++)
        {
            grid[i] = i == 0 ? 1.0 / Most : i == Cells ? 1.0 / Fewest : (1.0 / Most) + (((1.0 / Fewest) - (1.0 / Most)) * i / Cells);
            values[i] = logLikelihood(1.0 / grid[i]);
            if (double.IsNaN(values[i]))
                throw new ArgumentException($"The log-likelihood at {1.0 / grid[i]} degrees of freedom is not a number; the data must be finite.", nameof(logLikelihood));
            best = values[i] > values[best] ? i : best;
        }

        (double at, double value) = GoldenSectionOf(logLikelihood, grid[Math.Max(best - 1, 0)], grid[Math.Min(best + 1, Cells)]);
        if (values[best] >= value)
            (at, value) = (grid[best], values[best]);
        double level = value - (0.5 * ChiSquareOfOne);
        double low = Crossing(logLikelihood, grid, values, at, level, +1), high = Crossing(logLikelihood, grid, values, at, level, -1);
        return new(Degrees(at), value, atNormal, at == grid[Cells], at == grid[0], Degrees(low), Degrees(high), days);
    }

    // The reciprocal of a reciprocal: the ends are said as they are meant.
    private static double Degrees(double reciprocal) => reciprocal == 1.0 / Most ? Most : reciprocal == 1.0 / Fewest ? Fewest : 1.0 / reciprocal;

    private static (double At, double Value) GoldenSectionOf(Func<double, double> logLikelihood, double from, double to)
    {
        double left = to - (GoldenSection * (to - from)), right = from + (GoldenSection * (to - from));
        double atLeft = logLikelihood(1.0 / left), atRight = logLikelihood(1.0 / right);
        for (int step = 0; step < Steps; step++)
        {
            if (atLeft >= atRight)
            {
                (to, right, atRight) = (right, left, atLeft);
                left = to - (GoldenSection * (to - from));
                atLeft = logLikelihood(1.0 / left);
            }
            else
            {
                (from, left, atLeft) = (left, right, atRight);
                right = from + (GoldenSection * (to - from));
                atRight = logLikelihood(1.0 / right);
            }
        }

        return atLeft >= atRight ? (left, atLeft) : (right, atRight);
    }

    /// <summary>The first reciprocal beyond the maximum, upwards or downwards, where the likelihood is down at the level; else the end.</summary>
    private static double Crossing(Func<double, double> logLikelihood, double[] grid, double[] values, double at, double level, int direction)
    {
        double inside = at;
        for (int i = direction > 0 ? 0 : Cells; i >= 0 && i <= Cells; i += direction)
        {
            if (direction * (grid[i] - at) <= 0.0)
                continue;
            if (values[i] >= level)
            {
                inside = grid[i];
                continue;
            }

            double outside = grid[i];
            for (int step = 0; step < Bisections; step++)
            {
                double middle = 0.5 * (inside + outside);
                if (logLikelihood(1.0 / middle) >= level)
                    inside = middle;
                else
                    outside = middle;
            }

            return 0.5 * (inside + outside);
        }

        return direction > 0 ? grid[Cells] : grid[0];
    }
}
