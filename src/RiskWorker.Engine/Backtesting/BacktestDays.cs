using RiskWorker.Domain.Market;

namespace RiskWorker.Engine.Backtesting;

/// <summary>The days that profit and VaR are compared on: Mondays to Fridays with at least one observation.</summary>
public static class BacktestDays
{
    /// <summary>All of them, ascending.</summary>
    public static DateOnly[] Of(ObservationHistory history)
    {
        var dates = history.Dates;
        var observed = new bool[dates.Length];
        for (var j = 0; j < history.Factors.Count; j++)
        {
            var column = history.Column(j);
            for (var t = 0; t < observed.Length; t++) observed[t] |= !double.IsNaN(column[t]);
        }
        var days = new List<DateOnly>(dates.Length);
        for (var t = 0; t < observed.Length; t++)
        {
            if (observed[t] && BusinessCalendar.Weekdays.IsOpen(dates[t])) days.Add(dates[t]);
        }
        return [.. days];
    }
}
