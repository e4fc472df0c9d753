using System.Globalization;

namespace RiskWorker.Storage.Tests.Feed;

/// <summary>Writes feeds of any size, the same for the same sizes.</summary>
internal static class FeedGenerator
{
    /// <summary>Fills <paramref name="folder"/> with <paramref name="factors"/> × <paramref name="days"/> observations and <paramref name="positions"/> rows on each of the last <paramref name="positionDays"/> days.</summary>
    public static void Write(string folder, int factors, int days, int positions, int positionDays)
    {
        var dates = Weekdays(new(2021, 1, 4)).Take(days).Select(d => d.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture)).ToArray();
        var state = 88172645463325252UL;
        Lines(folder, "books.csv", "book,parent,name,currency", Enumerable.Range(0, 21).Select(b => b == 0 ? "ALL,,All,EUR" : $"B{b:00},ALL,Book {b},EUR"));
        Lines(folder, "factors.csv", "factor,class,shock,currency", Enumerable.Range(0, factors).Select(f => $"F{f:000},equity,lognormal,EUR"));
        Lines(folder, "instruments.csv", "instrument,kind,currency,factor", Enumerable.Range(0, factors).Select(f => $"I{f:000},spot,EUR,F{f:000}"));
        Lines(folder, "observations.csv", "date,factor,value", dates.SelectMany(date => Enumerable.Range(0, factors).Select(f => $"{date},F{f:000},{Number(ref state, 100, 4)}")));
        Lines(folder, "positions.csv", "as_of,book,instrument,quantity,trade,market_value", dates.TakeLast(positionDays).SelectMany(date => Enumerable.Range(0, positions)
            .Select(p => $"{date},B{p % 20 + 1:00},I{p % factors:000},{Number(ref state, 1000, 2)},T{p:0000000},{Number(ref state, 100_000, 2)}")));
    }

    private static string Number(ref ulong state, double scale, int decimals)
    {
        state ^= state << 13; // xorshift64, Marsaglia 2003
        state ^= state >> 7;
        state ^= state << 17;
        return (scale * (1 + (state >> 40) / 16777216.0)).ToString("F" + decimals.ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture);
    }

    private static IEnumerable<DateOnly> Weekdays(DateOnly from)
    {
        for (var date = from; ; date = date.AddDays(1))
        {
            if (date.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday)) yield return date;
        }
    }

    private static void Lines(string folder, string file, string header, IEnumerable<string> rows) => File.WriteAllLines(Path.Combine(folder, file), rows.Prepend(header));
}
