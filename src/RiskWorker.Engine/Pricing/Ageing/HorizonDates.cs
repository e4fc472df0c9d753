namespace RiskWorker.Engine.Pricing.Ageing;

/// <summary>
/// The dates of a horizon that moves the valuation date: business days are Mondays to Fridays, whatever single markets keep as holidays, since
/// a book has no one calendar and the model's days are those on which prices may move.
/// </summary>
/// <remarks>
/// What falls on a weekend sees the close before it: no later one is known then. So a date right after the as-of date may see today's levels,
/// which is day 0. Whether something is paid inside the horizon goes by its own date.
/// </remarks>
public sealed record HorizonDates
{
    /// <summary>The horizon of <paramref name="days"/> business days after <paramref name="asOf"/>.</summary>
    public HorizonDates(DateOnly asOf, int days)
    {
        (AsOf, Days, End) = (asOf, days, asOf);
        for (var left = days; left > 0;)
        {
            End = End.AddDays(1);
            if (IsWeekday(End)) left--;
        }
    }

    /// <summary>The date of the positions.</summary>
    public DateOnly AsOf { get; }

    /// <summary>Business days.</summary>
    public int Days { get; }

    /// <summary>The date that the book is valued at.</summary>
    public DateOnly End { get; }

    /// <summary>Whether <paramref name="date"/> lies after the as-of date and not after the end.</summary>
    public bool Hold(DateOnly date) => date > AsOf && date <= End;

    /// <summary>The close that <paramref name="date"/> sees, as business days after the as-of date.</summary>
    public int DayOf(DateOnly date)
    {
        var day = 0;
        for (var next = AsOf.AddDays(1); next <= date; next = next.AddDays(1)) day += IsWeekday(next) ? 1 : 0;
        return day;
    }

    /// <summary>The closes inside the horizon from <paramref name="first"/> to <paramref name="last"/>, both included.</summary>
    public IReadOnlyList<int> DaysFrom(DateOnly first, DateOnly last)
    {
        var before = DayOf(first.AddDays(-1));
        return [.. Enumerable.Range(before + 1, Math.Max(0, DayOf(last) - before))];
    }

    private static bool IsWeekday(DateOnly date) => date.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday);
}
