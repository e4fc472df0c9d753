using RiskWorker.Domain.Market;
using RiskWorker.Engine.Pricing.Curves;

namespace RiskWorker.Engine.Tests.Pricing.Curves;

/// <summary>A curve 'C' with a tenor on each of some dates, and levels that give each date the exponent wanted: a textbook's times on a calendar's days.</summary>
internal sealed class DatedCurve
{
    public DatedCurve(DateOnly valuation, IReadOnlyList<(DateOnly Date, double Exponent)> points)
    {
        double[] years = [.. points.Select(p => (p.Date.DayNumber - valuation.DayNumber) / 365.0)];
        Curves = new([.. years.Select((t, i) => new Factor($"C{i}", FactorClass.Rate, ShockKind.Normal, Curve: "C", TenorYears: t))]);
        Levels = [.. points.Select((p, i) => p.Exponent / years[i])];
    }

    public CurveSet Curves { get; }

    public double[] Levels { get; }
}
