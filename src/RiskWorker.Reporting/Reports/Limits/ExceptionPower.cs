using RiskWorker.Domain.Runs;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>How little a count of exceptions proves: from how many on it is remarkable, and how often a wrong model shows so many.</summary>
/// <remarks>Sums and products of the binomial law's own recursion: the same on every machine.</remarks>
internal static class ExceptionPower
{
    private const double Remarkable = 0.05;

    /// <summary>The smallest count that a right model reaches with a probability below 5%, and the probability that one whose VaR is passed twice as often reaches it.</summary>
    public static (int Count, double Found) Of(int days, Confidence confidence)
    {
        var rate = (double)(1 - confidence.Level);
        var count = 0;
        while (count <= days && AtLeast(count, days, rate) >= Remarkable)
            count++;
        return (count, AtLeast(count, days, Math.Min(2 * rate, 1)));
    }

    /// <summary>The probability of <paramref name="count"/> exceptions or more in so many independent days.</summary>
    public static double AtLeast(int count, int days, double rate)
    {
        if (rate >= 1)
            return count <= days ? 1 : 0;

        var term = 1.0;
        for (var day = 0; day < days; day++)
            term *= 1 - rate;
        var below = 0.0;
        for (var k = 0; k < count && k <= days; k++)
        {
            below += term;
            term *= (days - k) * rate / ((k + 1) * (1 - rate));
        }

        return Math.Clamp(1 - below, 0, 1);
    }
}
