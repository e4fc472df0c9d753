using Xunit;

namespace RiskWorker.TestKit;

/// <summary>Equality of doubles to the last bit: +0 is not -0, and every NaN equals every other (its payload means nothing).</summary>
public static class BitAssert
{
    public static void Equal(double expected, double actual, string context = "")
    {
        if (!Same(expected, actual))
            Assert.Fail($"{context} expected {Show(expected)}, found {Show(actual)}.");
    }

    public static void Equal(ReadOnlySpan<double> expected, ReadOnlySpan<double> actual, string context = "")
    {
        Assert.Equal(expected.Length, actual.Length);
        for (int i = 0; i < expected.Length; i++)
        {
            if (!Same(expected[i], actual[i]))
                Assert.Fail($"{context} element {i} of {expected.Length}: expected {Show(expected[i])}, found {Show(actual[i])}.");
        }
    }

    private static bool Same(double a, double b) =>
        BitConverter.DoubleToUInt64Bits(a) == BitConverter.DoubleToUInt64Bits(b) || (double.IsNaN(a) && double.IsNaN(b));

    private static string Show(double value) => $"{value:R} ({BitConverter.DoubleToUInt64Bits(value):X16})";
}
