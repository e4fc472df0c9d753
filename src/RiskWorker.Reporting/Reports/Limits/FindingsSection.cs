using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>What the checks found, blocking first.</summary>
internal static class FindingsSection
{
    public static IReadOnlyList<Block> Blocks(RunReading run) =>
    [
        new Heading("Findings"),
        Table(run.Results.Findings),
        .. run.Results.Adjustments.Count == 0 ? [] : Adjustments(run.Results.Adjustments),
    ];

    /// <summary>Findings as a table, or the sentence that there are none.</summary>
    public static Table Table(IReadOnlyList<Finding> findings)
    {
        var rows = findings.OrderByDescending(finding => finding.Severity).Select(finding => new Row(
        [
            finding.Severity == FindingSeverity.Blocking ? new StatusCell(StatusMark.Bad, "blocking") : new StatusCell(StatusMark.Warning, "warning"),
            new TextCell(finding.Subject, finding.Code),
            new TextCell(finding.Message),
        ]));
        return new Table([new("Severity", 0.9), new("Subject", 1.6), new("What was found", 5)], [new RowGroup([.. rows])], "No check found anything.");
    }

    private static Block[] Adjustments(IReadOnlyList<AppliedAdjustment> adjustments)
    {
        var rows = adjustments.Select(one => new Row([one.Factor, Numerals.Date(one.Date), Numerals.Fixed(one.Ratio, 6), one.Reason ?? ""]));
        return
        [
            new Heading("Splits and rolls applied to the history", 3),
            new Table([new("Factor", 2), new("Date", 1), new("Ratio", 1, Alignment.Right), new("Reason", 3)], [new RowGroup([.. rows])], ""),
        ];
    }
}
