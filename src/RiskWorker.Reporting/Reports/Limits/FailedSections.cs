using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>The report of a failed run: why there is no figure, and never an earlier one in its place.</summary>
internal static class FailedSections
{
    public static IReadOnlyList<Section> Of(RunReading run)
    {
        var blocking = run.Results.Findings.Where(finding => finding.Severity == FindingSeverity.Blocking).ToList();
        var warnings = run.Results.Findings.Except(blocking).ToList();
        return
        [
            new([
                new Heading("Daily limit report", 1, Headline.Subject(run)),
                new Callout(
                    StatusMark.Bad,
                    $"This run failed: there are no figures for {Numerals.Date(run.Record.AsOf)}.",
                    [
                        blocking.Count == 0
                            ? "It stopped before its checks were done."
                            : $"{Phrases.Sentence(Phrases.Number(blocking.Count))} finding{(blocking.Count == 1 ? "" : "s")} of the checks stopped it. Mend {(blocking.Count == 1 ? "it" : "them")} and run again.",
                        "No limit was tested. No earlier figure is shown in its place.",
                    ]),
                new Heading("Why", 3),
                FindingsSection.Table(blocking),
                .. warnings.Count == 0 ? (Block[])[] : [new Heading("Also found", 3), FindingsSection.Table(warnings)],
                new Heading("This run", 3),
                Identity.Short(run),
            ]),
        ];
    }
}
