using RiskWorker.Numerics.Paths;

namespace RiskWorker.Numerics.Tests.Paths;

/// <summary>Schedules and single prices of the tests.</summary>
internal static class Dates
{
    /// <summary>years·i/count, i = 1 to count.</summary>
    public static double[] Equal(int count, double years) => [.. Enumerable.Range(1, count).Select(i => years * i / count)];

    public static PathSchedule Flat(int count, double years, double rate, double yield) =>
        PathSchedule.Flat(Equal(count, years), rate, yield, years);

    public static (double Value, double Error) Price(PathPayoff payoff, double volatility, double spot, ulong seed = 1, int pairs = PathPricer.DefaultPairs)
    {
        double[] value = new double[1], error = new double[1];
        new PathPricer(seed, pairs).Price(payoff, [volatility], [spot], value, error);
        return (value[0], error[0]);
    }
}
