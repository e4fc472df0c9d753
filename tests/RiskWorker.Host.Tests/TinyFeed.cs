using System.Globalization;
using System.Text;

namespace RiskWorker.Host.Tests;

/// <summary>The smallest feed that a run takes: one book, one price over a hundred days, one position. Invented.</summary>
internal static class TinyFeed
{
    public static DateOnly AsOf { get; } = new(2026, 11, 27);

    public static void Write(TemporaryFolder folder)
    {
        folder.Write("feed/books.csv", "book,parent,name,currency\nFIRM,,The firm,EUR\n");
        folder.Write("feed/factors.csv", "factor,class,shock,currency\nAAA,equity,lognormal,EUR\n");
        folder.Write("feed/instruments.csv", "instrument,kind,currency,factor\nAAA share,spot,EUR,AAA\n");
        folder.Write("feed/positions.csv", "as_of,book,instrument,quantity\n2026-11-27,FIRM,AAA share,1000\n");
        folder.Write("feed/observations.csv", Observations(100));
    }

    /// <summary>Prices that rise and fall in turn by one to three per cent, on the weekdays up to the as-of date.</summary>
    private static string Observations(int days)
    {
        var rows = new StringBuilder("date,factor,value\n");
        var dates = Enumerable.Range(0, 2 * days).Select(back => AsOf.AddDays(-back)).Where(d => d.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday)).Take(days).Reverse();
        var (price, day) = (100.0, 0);
        foreach (var date in dates)
        {
            price *= 1 + (day % 2 == 0 ? 0.01 : -0.01) * (1 + day++ % 3);
            rows.Append(CultureInfo.InvariantCulture, $"{date:yyyy-MM-dd},AAA,{price:0.0000}\n");
        }
        return rows.ToString();
    }
}
