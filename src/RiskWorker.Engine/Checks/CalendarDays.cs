using RiskWorker.Domain.Market;

namespace RiskWorker.Engine.Checks;

/// <summary>A calendar laid over the dates of a history.</summary>
internal sealed class CalendarDays
{
    private readonly bool[] _isOpen;
    private readonly int[] _previous;

    public CalendarDays(BusinessCalendar calendar, ReadOnlySpan<DateOnly> dates)
    {
        Calendar = calendar;
        _isOpen = new bool[dates.Length];
        _previous = new int[dates.Length];
        var last = -1;
        for (var i = 0; i < dates.Length; i++)
        {
            _isOpen[i] = calendar.IsOpen(dates[i]);
            _previous[i] = -1;
            if (!_isOpen[i]) continue;
            if (last >= 0 && dates[last] == calendar.Previous(dates[i])) _previous[i] = last;
            last = i;
        }
    }

    public BusinessCalendar Calendar { get; }

    public bool IsOpen(int row) => _isOpen[row];

    /// <summary>Row of the open day just before an open <paramref name="row"/>; -1 where the history lacks that day.</summary>
    public int Previous(int row) => _previous[row];
}
