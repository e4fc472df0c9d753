using System.Globalization;
using System.Text;
using RiskWorker.TestKit;

namespace RiskWorker.Host.Tests.FiveSettings;

/// <summary>
/// A small feed that takes every road a figure can take: two currencies, spots, a forward, options at a flat volatility and at that of a
/// factor, a cross, a curve with normal shocks under a bond and an option, an American and an average priced from tables, a barrier, enough
/// scenarios for price surfaces; and a given covariance that belongs to no correlation matrix. Invented.
/// </summary>
internal static class MixedFeed
{
    public const string AsOf = "2026-11-27";

    /// <summary>The model estimated from the observations, and the one given in covariance.csv.</summary>
    public static IReadOnlyList<string> Models { get; } = ["estimated", "given"];

    private static readonly (string Name, string Terms, double Start, double Move)[] s_factors =
    [
        ("ALM", "equity,lognormal,EUR,,", 84, 0.012),
        ("BIRK", "equity,lognormal,USD,,", 231, 0.017),
        ("CEDR", "equity,lognormal,EUR,,", 12, 0.021),
        ("DOLLAR", "fx,lognormal,USD,,", 0.91, 0.005),
        ("RATE", "rate,normal,EUR,ZERO,1", 0.031, 0.0004),
        ("VOL", "vol,lognormal,,,", 0.24, 0.05),
    ];

    public static void Write(TemporaryFolder folder)
    {
        folder.Write("riskworker.json", """
            { "models": { "estimated": { "kind": "lognormal", "covariance": "ewma", "lambda": 0.97, "window": 200 },
                          "given": { "kind": "lognormal", "covariance": "given" } },
              "record": "estimated",
              "measures": [ { "measure": "var", "confidence": 0.99, "horizonDays": 1 }, { "measure": "es", "confidence": 0.975, "horizonDays": 10 } ],
              "simulation": { "scenarios": 40000, "seed": 7, "looks": 1, "cap": 40000 } }
            """);
        folder.Write("feed/books.csv", "book,parent,name,currency\nFIRM,,The firm,EUR\nHOME,FIRM,At home,EUR\nAWAY,FIRM,Abroad,USD\n");
        folder.Write("feed/factors.csv", "factor,class,shock,currency,curve,tenor_years\n" + string.Concat(s_factors.Select(f => $"{f.Name},{f.Terms}\n")));
        folder.Write("feed/observations.csv", Observations());
        folder.Write("feed/covariance.csv", Covariance());
        folder.Write("feed/limits.csv", "limit,book,measure,confidence,horizon_days,amount\nfirm,FIRM,var,0.99,1,100000\n");
        folder.Write("feed/instruments.csv", """
            instrument,kind,currency,factor,base_currency,strike,expiry,right,style,vol,vol_factor,curve,carry,coupon,frequency,day_count,issue,maturity,barrier,barrier_kind,monitoring,average,fixings
            ALM share,spot,EUR,ALM,,,,,,,,,,,,,,,,,,,
            BIRK share,spot,USD,BIRK,,,,,,,,,,,,,,,,,,,
            CEDR forward,forward,EUR,CEDR,,12.5,2027-03-19,,,,,0.02,0.01,,,,,,,,,,
            ALM call,option,EUR,ALM,,85,2027-02-19,call,european,0.21,,0.02,0,,,,,,,,,,
            ALM put,option,EUR,ALM,,80,2026-12-18,put,european,,VOL,0.02,0.015,,,,,,,,,,
            BIRK put,option,USD,BIRK,,240,2027-06-18,put,european,0.3,,0.04,0,,,,,,,,,,
            Dollar call,option,EUR,,USD,0.92,2027-01-15,call,european,0.08,,0.02,0.04,,,,,,,,,,
            Cash,fx,USD,,,,,,,,,,,,,,,,,,,,
            Bond,bond,EUR,,,,,,,,,ZERO,,0.03,2,ACT/ACT,2025-03-14,2031-03-14,,,,,
            Curved put,option,EUR,CEDR,,12,2027-06-18,put,european,,VOL,ZERO,0.01,,,,,,,,,,
            American put,option,EUR,ALM,,88,2027-09-17,put,american,0.22,,0.02,0.01,,,,,,,,,,
            Barrier call,barrier,EUR,ALM,,84,2027-05-21,call,,0.22,,0.02,0,,,,2026-11-27,,40,down-out,daily,,
            Average call,asian,EUR,CEDR,,12,2027-03-19,call,,0.33,,0.02,0,,,,,,,,,arithmetic,2026-12-31;2027-01-29;2027-02-26
            """);
        folder.Write("feed/positions.csv", "as_of,book,instrument,quantity\n" + string.Concat(s_positions.Select(p => $"{AsOf},{p}\n")));
    }

    private static readonly string[] s_positions =
    [
        "HOME,ALM share,300", "HOME,ALM call,-900", "HOME,ALM put,1200", "HOME,CEDR forward,-2500", "HOME,Dollar call,40000",
        "HOME,Bond,50", "HOME,Curved put,4000", "HOME,American put,500", "HOME,Barrier call,-300", "AWAY,Average call,3000",
        "AWAY,BIRK share,150", "AWAY,BIRK put,400", "AWAY,ALM put,-350", "AWAY,Cash,25000",
    ];

    // Uniform daily moves, written with few digits: the file is the same wherever it is made.
    private static string Observations()
    {
        var (numbers, rows) = (new SeededNumbers(271), new StringBuilder("date,factor,value\n"));
        var last = DateOnly.ParseExact(AsOf, "yyyy-MM-dd", CultureInfo.InvariantCulture);
        var levels = s_factors.Select(f => f.Start).ToArray();
        for (var date = last.AddDays(-320); date <= last; date = date.AddDays(1))
        {
            if (date.DayOfWeek is DayOfWeek.Saturday or DayOfWeek.Sunday) continue;
            var common = numbers.Between(-1, 1);
            for (var j = 0; j < s_factors.Length; j++)
            {
                var shock = s_factors[j].Move * (common + numbers.Between(-1, 1));
                levels[j] = s_factors[j].Name == "RATE" ? levels[j] + shock : levels[j] * (1 + shock);
                rows.Append(CultureInfo.InvariantCulture, $"{date:yyyy-MM-dd},{s_factors[j].Name},{levels[j]:0.000000}\n");
            }
        }
        return rows.ToString();
    }

    // Correlations of 0.9 all round but one of -0.9: no three variables can have them.
    private static string Covariance()
    {
        var rows = new StringBuilder("factor,other,value\n");
        for (var i = 0; i < s_factors.Length; i++)
        {
            for (var j = i; j < s_factors.Length; j++)
            {
                var correlation = i == j ? 1m : (i, j) == (0, 1) ? -0.9m : 0.9m;
                rows.Append(CultureInfo.InvariantCulture, $"{s_factors[i].Name},{s_factors[j].Name},{correlation * (decimal)s_factors[i].Move * (decimal)s_factors[j].Move}\n");
            }
        }
        return rows.ToString();
    }
}
