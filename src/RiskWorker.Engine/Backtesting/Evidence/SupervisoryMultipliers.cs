using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>What a count of exceptions in 250 days at 99% adds to a capital multiplier, and how many a desk may have. Printed tables: no formula gives them.</summary>
public static class SupervisoryMultipliers
{
    /// <summary>Days of the tables.</summary>
    public const int Days = 250;

    private static readonly decimal[] s_plus = [0.40m, 0.50m, 0.65m, 0.75m, 0.85m];
    private static readonly decimal[] s_addOn = [0.20m, 0.26m, 0.33m, 0.38m, 0.42m];

    /// <summary>The plus on 3: Basel Committee, Supervisory framework for the use of backtesting (January 1996), table 2.</summary>
    public static decimal Plus1996(int exceptions) => Of(exceptions, s_plus, 1.00m);

    /// <summary>The add-on to 1.5: MAR32.9, table 1; MAR33.44.</summary>
    public static decimal AddOn(int exceptions) => Of(exceptions, s_addOn, 0.50m);

    /// <summary>The multiplier with its add-on: 1.5 to 2.</summary>
    public static decimal Multiplier(int exceptions) => 1.5m + AddOn(exceptions);

    /// <summary>Most exceptions of a desk in 250 days that leave it in the internal models approach, 12 at 99% and 30 at 97.5% (MAR32.19); null at another confidence.</summary>
    public static int? DeskLimit(Confidence confidence) => confidence.Level switch
    {
        0.99m => 12,
        0.975m => 30,
        _ => null,
    };

    private static decimal Of(int exceptions, decimal[] yellow, decimal red)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(exceptions);
        return exceptions < 5 ? 0 : exceptions < 10 ? yellow[exceptions - 5] : red;
    }
}
