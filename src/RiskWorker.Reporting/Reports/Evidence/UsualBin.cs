using RiskWorker.Reporting.Reports.Limits;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>How many of so many days one of several equally likely bins usually holds.</summary>
internal static class UsualBin
{
    private const double Tail = 0.025;

    // Beyond, the probability of an empty bin is no longer a normal number.
    private const int MostDays = 5_000;

    /// <summary>The ends of a span that a bin lies in with a probability of at least 95%; null where that cannot be computed.</summary>
    public static (int Low, int High)? Of(int days, int bins)
    {
        if (days is < 1 or > MostDays || bins < 2)
            return null;

        var rate = 1.0 / bins;
        var low = 0;
        while (1 - ExceptionPower.AtLeast(low + 1, days, rate) < Tail)
            low++;
        var high = low;
        while (ExceptionPower.AtLeast(high + 1, days, rate) > Tail)
            high++;
        return (low, high);
    }
}
