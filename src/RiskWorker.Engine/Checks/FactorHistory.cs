using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Checks;

/// <summary>A factor's own history on its business days: adjusted prices, and shocks between consecutive ones.</summary>
internal sealed class FactorHistory
{
    private FactorHistory(Factor factor, CalendarDays days, double[] observed, double[] adjusted, double[] shocks)
    {
        Factor = factor;
        Days = days;
        Observed = observed;
        Adjusted = adjusted;
        Shocks = shocks;
        First = Array.FindIndex(observed, v => !double.IsNaN(v));
        Last = Array.FindLastIndex(observed, v => !double.IsNaN(v));
        ShockCount = shocks.Count(s => !double.IsNaN(s));
    }

    public Factor Factor { get; }

    public CalendarDays Days { get; }

    /// <summary>Value by row as observed; NaN where there is none.</summary>
    public double[] Observed { get; }

    /// <summary>Value by row with splits and rolls applied; NaN where there is none.</summary>
    public double[] Adjusted { get; }

    /// <summary>Shock that ends on the row; NaN where there is none.</summary>
    public double[] Shocks { get; }

    /// <summary>Row of the first observation, or -1.</summary>
    public int First { get; }

    /// <summary>Row of the newest observation, or -1.</summary>
    public int Last { get; }

    public int ShockCount { get; }

    /// <summary>The histories of all factors of <paramref name="snapshot"/>, in their order.</summary>
    public static FactorHistory[] All(Snapshot snapshot)
    {
        var calendars = BusinessCalendar.ByName(snapshot.Holidays);
        var days = new Dictionary<string, CalendarDays>(StringComparer.Ordinal);
        var weekdays = new CalendarDays(BusinessCalendar.Weekdays, snapshot.Observations.Dates);
        var adjustments = snapshot.Adjustments.ToLookup(a => a.Factor, StringComparer.Ordinal);
        return [.. snapshot.Factors.Select(f => Of(f, DaysOf(f), snapshot.Observations, [.. adjustments[f.Name]]))];

        CalendarDays DaysOf(Factor factor)
        {
            if (factor.Calendar is not { } name || !calendars.TryGetValue(name, out var calendar)) return weekdays;
            if (!days.TryGetValue(name, out var known)) days[name] = known = new(calendar, snapshot.Observations.Dates);
            return known;
        }
    }

    private static FactorHistory Of(Factor factor, CalendarDays days, ObservationHistory history, Adjustment[] adjustments)
    {
        var column = history.ColumnOf(factor.Name);
        var observed = new double[history.Count];
        if (column >= 0) history.Column(column).CopyTo(observed);
        else Array.Fill(observed, double.NaN);
        var adjusted = Adjust(observed, history.Dates, adjustments);
        return new(factor, days, observed, adjusted, ShocksOf(factor.Shock, days, adjusted));
    }

    private static double[] Adjust(double[] observed, ReadOnlySpan<DateOnly> dates, Adjustment[] adjustments)
    {
        if (adjustments.Length == 0) return observed;
        var adjusted = (double[])observed.Clone();
        foreach (var adjustment in adjustments)
        {
            for (var i = 0; i < adjusted.Length && dates[i] < adjustment.Date; i++) adjusted[i] *= adjustment.Ratio;
        }
        return adjusted;
    }

    private static double[] ShocksOf(ShockKind kind, CalendarDays days, double[] adjusted)
    {
        var shocks = new double[adjusted.Length];
        for (var i = 0; i < shocks.Length; i++)
        {
            var previous = days.Previous(i);
            shocks[i] = previous < 0 ? double.NaN : Shock(kind, adjusted[previous], adjusted[i]);
        }
        return shocks;
    }

    private static double Shock(ShockKind kind, double from, double to)
    {
        if (kind == ShockKind.Normal) return to - from;
        return from > 0 && to > 0 ? Logarithm.Of(to / from) : double.NaN;
    }
}
