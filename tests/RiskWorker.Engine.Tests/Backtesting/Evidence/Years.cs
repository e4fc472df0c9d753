using RiskWorker.Domain.Runs;
using RiskWorker.TestKit;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

/// <summary>Series of exceptions for tests, and seeded years of a right model.</summary>
internal static class Years
{
    public static readonly Confidence C99 = new(0.99m);
    public static readonly Confidence C975 = new(0.975m);

    /// <summary>Exceptions on these days, from 1.</summary>
    public static bool[] On(int days, params IEnumerable<int> exceptions)
    {
        var series = new bool[days];
        foreach (var day in exceptions) series[day - 1] = true;
        return series;
    }

    /// <summary>Exceptions in the first days of as many.</summary>
    public static bool[] Count(int days, int exceptions) => On(days, Enumerable.Range(1, exceptions));

    /// <summary>The day's number in binary: day t an exception where bit t is set.</summary>
    public static bool[] Bits(int days, int number) => [.. Enumerable.Range(0, days).Select(t => ((number >> t) & 1) != 0)];

    /// <summary>Independent uniforms.</summary>
    public static double[] Uniforms(ulong seed, int days)
    {
        var numbers = new SeededNumbers(seed);
        return [.. Enumerable.Range(0, days).Select(_ => numbers.Unit())];
    }
}
