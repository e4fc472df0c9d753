namespace RiskWorker.Engine.Pricing.Curves;

/// <summary>Time along a curve: calendar days over 365, the same as the time of options. A day count says what is paid, never when it is discounted.</summary>
public static class CurveTime
{
    /// <summary>Days of a year.</summary>
    public const double DaysPerYear = 365;

    /// <summary>Years from the close of <paramref name="valuation"/> to the close of <paramref name="date"/>.</summary>
    public static double Between(DateOnly valuation, DateOnly date) => (date.DayNumber - valuation.DayNumber) / DaysPerYear;
}
