using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Host.Options;
using RiskWorker.Host.UseCases;
using Spectre.Console;

namespace RiskWorker.Host.Verbs;

/// <summary>A run on the terminal: what was found, each book's measures with their intervals, and the limits, worst first.</summary>
public static class MeasureListing
{
    private const int DeepestIndent = 8;

    /// <summary>Prints a run that was just done.</summary>
    public static void Write(MeasureReport report, IAnsiConsole console)
    {
        if (report.Backfilled > 0) Line(console, $"{Figures.Count(report.Backfilled)} past {(report.Backfilled == 1 ? "date" : "dates")} filled, marked as backfilled.");
        Write(report.Record, report.Documents, console);
    }

    /// <summary>Prints a stored run.</summary>
    public static void Write(RunRecord record, IReadOnlyList<string> documents, IAnsiConsole console)
    {
        WriteHead(record, console);
        WriteFindings(record.Results.Findings, console);
        if (record.Results.Nodes.Count > 0)
        {
            WriteNodes(record.Results, console);
            ModelListing.Write(record, console);
        }
        if (record.Status != RunStatus.Failed) WriteLimits(record.Results.Limits, console);
        DocumentLines.Write(documents, console);
    }

    private static void WriteHead(RunRecord record, IAnsiConsole console)
    {
        var simulation = record.Results.Simulation;
        Line(console, $"{record.Results.Firm?.Name ?? "Limit report"}, {Figures.Date(record.AsOf)}: {Word(record.Status)}");
        Line(console, $"run {record.Run}, model {record.Settings.Model.Name}, seed {record.Settings.Simulation.Seed}, " +
            (simulation is null ? "no figures" : $"{Figures.Count(simulation.Scenarios)} scenarios, look {simulation.Looks} of {simulation.LooksPlanned}"));
        console.WriteLine();
    }

    private static void WriteFindings(IReadOnlyList<Finding> findings, IAnsiConsole console)
    {
        if (findings.Count == 0) return;
        var table = new PlainTable().Labels("Finding").Words("Subject").Words("What");
        foreach (var finding in findings.OrderByDescending(f => f.Severity))
        {
            var isBlocking = finding.Severity == FindingSeverity.Blocking;
            table.Row((isBlocking ? "BLOCKING" : "warning", isBlocking ? Color.Red : Color.Yellow), ($"{finding.Code} {finding.Subject}", null), (finding.Message, null));
        }
        table.Write(console);
    }

    private static void WriteNodes(RunResults results, IAnsiConsole console)
    {
        var level = results.Simulation?.Level ?? 0.95;
        var table = new PlainTable().Words("Book").Labels("").Labels("Measure").Numbers("Loss").Numbers($"{Figures.Share(level)} interval");
        foreach (var node in results.Nodes)
        {
            var (book, currency) = (new string(' ', 2 * Math.Min(node.Depth, DeepestIndent)) + node.Book, node.Currency);
            foreach (var measure in node.Measures)
            {
                table.Row(book, currency, Figures.Measure(measure.Spec), Figures.Money(measure.Value), Figures.Interval(measure));
                (book, currency) = ("", "");
            }
        }
        table.Write(console);
        Line(console, results.Nodes[0].Measures.Any(m => m.Sample is not null)
            ? "Past days are no draws: intervals are those of the days as a sample."
            : "Intervals hold simulation noise only, not the error of model or estimates.");
        console.WriteLine();
    }

    private static void WriteLimits(IReadOnlyList<LimitResult> limits, IAnsiConsole console)
    {
        if (limits.Count == 0)
        {
            Line(console, "No limit is valid on this date.");
            return;
        }
        var table = new PlainTable().Words("Limit").Words("Book").Labels("Measure").Numbers("Amount").Numbers("Measured").Numbers("Used").Labels("Status");
        foreach (var limit in limits.OrderBy(l => Rank(l.Status)).ThenBy(l => l.Limit.Name, StringComparer.Ordinal))
        {
            table.Row((limit.Limit.Name, null), (limit.Limit.Book, null), (Figures.Measure(limit.Limit.Measure), null), (Amount(limit.Limit), null),
                (Figures.Money(limit.Value), null), (Figures.Share(limit.Used), null), Status(limit.Status));
        }
        table.Write(console);
        Line(console, Verdict(limits));
    }

    private static string Verdict(IReadOnlyList<LimitResult> limits)
    {
        var (breached, open) = (limits.Count(l => l.Status == LimitStatus.Breached), limits.Count(l => l.Status == LimitStatus.Inconclusive));
        var verdict = breached == 0 ? $"None of {limits.Count} limits is breached" : $"{breached} of {limits.Count} limits {(breached == 1 ? "is" : "are")} breached";
        return open == 0 ? verdict + "." : $"{verdict}; {open} {(open == 1 ? "lies" : "lie")} within simulation error and {(open == 1 ? "is" : "are")} undecided.";
    }

    private static string Amount(Limit limit) => limit.Basis switch
    {
        LimitBasis.Nav => Figures.Share(limit.Amount) + " of value",
        LimitBasis.Book => $"{limit.Amount:0.###} x {limit.ReferenceBook}",
        _ => Figures.Money(limit.Amount),
    };

    private static int Rank(LimitStatus status) => status switch
    {
        LimitStatus.Breached => 0,
        LimitStatus.Inconclusive => 1,
        LimitStatus.Warning => 2,
        _ => 3,
    };

    private static (string Text, Style? Style) Status(LimitStatus status) => status switch
    {
        LimitStatus.Breached => ("BREACHED", Color.Red),
        LimitStatus.Inconclusive => ("undecided", Color.Yellow),
        LimitStatus.Warning => ("warning", Color.Yellow),
        _ => ("within", null),
    };

    private static string Word(RunStatus status) => status switch
    {
        RunStatus.Complete => "complete",
        RunStatus.Degraded => "degraded, with warnings",
        _ => "FAILED, there are no figures",
    };

    private static void Line(IAnsiConsole console, string text) => console.WriteLine(Printable.Of(text));
}
