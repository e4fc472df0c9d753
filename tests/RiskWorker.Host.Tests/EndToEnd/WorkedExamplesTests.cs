using System.Globalization;
using System.Text;
using System.Text.Json;
using RiskWorker.Host.Options;
using RiskWorker.Host.Tests.UseCases;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>Published values from the CSV files to <c>nodes[].value</c> of <c>results.json</c>: an example a book, at expiries of whole days.</summary>
public sealed class WorkedExamplesTests
{
    private static readonly DateOnly s_asOf = new(2026, 11, 27);

    // Id, level of its own factor, kind, terms by column, value, tolerance. T in days of which 365 are a year; q = r - b.
    private static readonly (string Id, double Level, string Kind, string Terms, double Value, double Tolerance)[] s_examples =
    [
        // A common textbook case of the Black-Scholes formula; recomputed.
        ("VAN-10", 100, "option", "strike=100 days=365 right=put style=european vol=0.2 curve=0.05", 5.573526022256971, 1e-10),
        // Longstaff and Schwartz (2001), table 1, closed form column.
        ("LSM-E07", 38, "option", "strike=40 days=365 right=put style=european vol=0.4 curve=0.06", 5.834320866481415, 1e-9),
        ("LSM-E10", 40, "option", "strike=40 days=730 right=put style=european vol=0.2 curve=0.06", 2.3558662816645324, 1e-9),
        // American exercise: Richardson limit of Bermudan values with up to 400 dates a year; a tree agrees to 1e-4.
        ("AME-36-0.2-1", 36, "option", "strike=40 days=365 right=put style=american vol=0.2 curve=0.06", 4.48667, 2e-5),
        ("AME-40-0.4-2", 40, "option", "strike=40 days=730 right=put style=american vol=0.4 curve=0.06", 6.923459, 2e-5),
        // Broadie, Glasserman and Kou (1997), table 2.1, continuous column.
        ("DBAR-C85", 100, "barrier", "strike=100 days=73 right=call vol=0.3 curve=0.1 barrier=85 barrier_kind=down-out monitoring=continuous issue=0", 6.30757493247192, 1e-9),
        ("DBAR-C97", 100, "barrier", "strike=100 days=73 right=call vol=0.3 curve=0.1 barrier=97 barrier_kind=down-out monitoring=continuous issue=0", 3.059563304594519, 1e-9),
        // Kemna and Vorst (1990), closed form.
        ("GEO-02", 100, "asian", "strike=100 days=365 right=call vol=0.2 curve=0.05 average=geometric fixings=continuous issue=0", 5.546818633789201, 1e-10),
        // Zhang (2001), recomputed by Geman-Yor inversion; 16,384 pairs of paths leave a standard error of about 6e-4.
        ("ASI-Z9", 100, "asian", "strike=105 days=365 right=call vol=0.3 curve=0.09 average=arithmetic fixings=continuous issue=0", 6.517790457233402, 2.5e-3),
        // Hull: the forward price of USD/AUD; a forward struck there is worth nothing.
        ("FXF-1", 0.75, "forward", "strike=0.7205920793642424 days=730 curve=0.01 carry=0.03", 0, 1e-12),
    ];

    [Fact]
    public async Task Values_of_books_are_the_published_ones()
    {
        using var folder = new TemporaryFolder();
        Write(folder);
        var workspace = MeasuredRuns.WorkspaceIn(folder);
        var configuration = await ConfigurationReader.ReadAsync(workspace.ConfigFolder, TestContext.Current.CancellationToken);
        var report = await Composition.UseCases(TimeProvider.System).Measure(
            new() { Workspace = workspace, Configuration = configuration, Command = ["riskworker", "measure"] }, new Progress<WorkProgress>(), TestContext.Current.CancellationToken);
        using var results = JsonDocument.Parse(report.Json);
        var values = results.RootElement.GetProperty("nodes").EnumerateArray().ToDictionary(n => n.GetProperty("book").GetString()!, n => n.GetProperty("value").GetDouble());
        Assert.All(s_examples, e => Assert.Equal(e.Value, values[e.Id], e.Tolerance));
        Assert.DoesNotContain(results.RootElement.GetProperty("findings").EnumerateArray(), f => f.GetProperty("code").GetString() is "not-modelled" or "factor-unknown");
    }

    private static void Write(TemporaryFolder folder)
    {
        const string Columns = "factor,strike,expiry,right,style,vol,curve,carry,barrier,barrier_kind,monitoring,issue,average,fixings";
        StringBuilder books = new("book,parent,name,currency\nALL,,All examples,EUR\n"), factors = new("factor,class,shock,currency\n"), instruments = new($"instrument,kind,currency,{Columns}\n");
        StringBuilder positions = new("as_of,book,instrument,quantity\n"), observations = new("date,factor,value\n");
        foreach (var example in s_examples)
        {
            books.Append(CultureInfo.InvariantCulture, $"{example.Id},ALL,{example.Id},EUR\n");
            factors.Append(CultureInfo.InvariantCulture, $"F-{example.Id},equity,lognormal,EUR\n");
            positions.Append(CultureInfo.InvariantCulture, $"{s_asOf:yyyy-MM-dd},{example.Id},I-{example.Id},1\n");
            instruments.Append(CultureInfo.InvariantCulture, $"I-{example.Id},{example.Kind},EUR,{string.Join(',', Columns.Split(',').Select(c => Cell(c, example.Id, example.Terms)))}\n");
            // Up and down by half a per cent, and at the example's level on the last day.
            for (var back = 120; back >= 0; back--)
            {
                if (s_asOf.AddDays(-back) is { DayOfWeek: not (DayOfWeek.Saturday or DayOfWeek.Sunday) } date)
                    observations.Append(CultureInfo.InvariantCulture, $"{date:yyyy-MM-dd},F-{example.Id},{example.Level * (1 + (back == 0 ? 0 : 0.005 * ((back * 7 % 5) - 2))):R}\n");
            }
        }
        folder.Write("feed/books.csv", books.ToString());
        folder.Write("feed/factors.csv", factors.ToString());
        folder.Write("feed/instruments.csv", instruments.ToString());
        folder.Write("feed/positions.csv", positions.ToString());
        folder.Write("feed/observations.csv", observations.ToString());
        folder.Write("riskworker.json", """{ "simulation": { "scenarios": 2000, "looks": 1 } }""");
    }

    private static string Cell(string column, string id, string terms)
    {
        var byName = terms.Split(' ').Select(t => t.Split('=')).ToDictionary(t => t[0], t => t[1]);
        return column switch
        {
            "factor" => $"F-{id}",
            "expiry" => $"{s_asOf.AddDays(int.Parse(byName["days"], CultureInfo.InvariantCulture)):yyyy-MM-dd}",
            "issue" => byName.ContainsKey("issue") ? $"{s_asOf:yyyy-MM-dd}" : "",
            _ => byName.GetValueOrDefault(column, ""),
        };
    }
}
