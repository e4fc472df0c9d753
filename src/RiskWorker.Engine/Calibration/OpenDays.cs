using RiskWorker.Domain.Market;

namespace RiskWorker.Engine.Calibration;

/// <summary>A calendar laid over a table of dates: which are open, and where the business day before each stands.</summary>
internal sealed class OpenDays
{
    private readonly bool[] _open;
    private readonly int[] _previous;

    public OpenDays(BusinessCalendar calendar, ReadOnlySpan<DateOnly> dates)
    {
        _open = new bool[dates.Length];
        _previous = new int[dates.Length];
        var lastOpen = -1;
        for (var t = 0; t < dates.Length; t++)
        {
            _open[t] = calendar.IsOpen(dates[t]);
            _previous[t] = _open[t] && lastOpen >= 0 && calendar.Previous(dates[t]) == dates[lastOpen] ? lastOpen : -1;
            if (_open[t]) lastOpen = t;
        }
    }

    /// <summary>Whether the market is open on the date at <paramref name="t"/>.</summary>
    public bool IsOpen(int t) => _open[t];

    /// <summary>Index of the business day before an open date, or -1 where the table does not hold it.</summary>
    public int Previous(int t) => _previous[t];
}
