using System.Globalization;
using RiskWorker.Domain.Evidence;
using RiskWorker.Host.UseCases;
using Spectre.Console;

namespace RiskWorker.Host.Verbs;

/// <summary>Evidence on a terminal: a line a book, and where the documents are.</summary>
public static class BacktestListing
{
    /// <summary>Prints it.</summary>
    public static void Write(BacktestReport report, IAnsiConsole console)
    {
        var evidence = report.Evidence;
        console.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{KindOf(evidence)}, profit of {evidence.From:yyyy-MM-dd} to {evidence.To:yyyy-MM-dd}, model {evidence.Model.Name}"));
        console.WriteLine();
        var table = new PlainTable().Words("Book").Labels("VaR").Labels("P&L").Numbers("Days").Numbers("Exceptions").Numbers("Expected").Labels("Zone").Numbers("Rejected");
        foreach (var series in evidence.Series)
        {
            table.Row(new string(' ', 2 * series.Depth) + series.Name, series.Confidence.ToString(), Word(series.Profit), Figures.Count(series.Days.Count), Figures.Count(series.Count),
                series.Expected.ToString("0.0", CultureInfo.InvariantCulture), series.Zone is { } zone ? Word(zone) : "-", $"{series.Tests.Count(t => t.Reject == true)} of {series.Tests.Count(t => t.Reject is not null)}");
        }
        table.Write(console);
        console.WriteLine("Rejected: how many of the tests that could be assessed reject the model at 5%.");
        var open = evidence.Exceptions.Count(e => e.Explanation is null);
        console.WriteLine(evidence.Exceptions.Count == 0 ? "No exception." : $"{Figures.Count(evidence.Exceptions.Count)} exceptions over books, confidences and kinds of profit; {Figures.Count(open)} unexplained.");
        DocumentLines.Write(report.Documents, console);
    }

    private static string KindOf(BacktestEvidence evidence) => evidence.Kind switch
    {
        BacktestKind.Recorded => "Recorded",
        BacktestKind.Backfilled => "Backfilled",
        _ => evidence.Positions == BacktestPositions.Today ? "Walk-forward on today's positions held fixed" : "Walk-forward on each day's positions",
    };

    private static string Word<T>(T value) where T : struct, Enum => value.ToString().ToLowerInvariant();
}
