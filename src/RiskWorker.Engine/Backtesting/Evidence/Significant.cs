using System.Globalization;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>End products that libraries compute are recorded to 12 significant digits: what lies beyond may depend on the hardware.</summary>
internal static class Significant
{
    private const int Digits = 12;

    /// <summary><paramref name="value"/> to that many digits.</summary>
    public static double Of(double value) => double.Parse(value.ToString($"E{Digits - 1}", CultureInfo.InvariantCulture), CultureInfo.InvariantCulture);
}
