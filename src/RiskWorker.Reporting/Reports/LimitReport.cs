using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Reports.Limits;

namespace RiskWorker.Reporting.Reports;

/// <summary>The daily limit report: page 1 answers, the pages behind it are the evidence.</summary>
public static class LimitReport
{
    private const string Foot = "Model estimates, not guarantees. No investment advice.";

    /// <summary>Builds the report of a run from its record alone: no clock, no store.</summary>
    /// <param name="run">The record; a failed run gives the report that says why, without a figure.</param>
    /// <param name="chainHead">The hash that the record has in the chain of runs; null where it is not chained.</param>
    /// <returns>The document; a section that has nothing to say is left out.</returns>
    public static ReportDocument Build(RunRecord run, string? chainHead = null)
    {
        ArgumentNullException.ThrowIfNull(run);
        var reading = new RunReading(run, chainHead);
        var title = "Daily limit report" + (reading.FirmName.Length > 0 ? " · " + reading.FirmName : "");
        var running = $"As of {Numerals.Date(run.AsOf)} · run {run.Run}";
        return new ReportDocument(title, running, Foot, run.Status == RunStatus.Failed ? FailedSections.Of(reading) : Sections(reading));
    }

    private static Section[] Sections(RunReading reading) =>
    [
        new([.. Headline.Blocks(reading), .. Overview.Blocks(reading)]),
        new(LimitsSection.Blocks(reading), StartsPage: true),
        new(BooksSection.Blocks(reading)),
        new(DistributionSection.Blocks(reading)),
        new(SensitivitiesSection.Blocks(reading), StartsPage: true),
        new(BacktestSection.Blocks(reading)),
        new(ModelsSection.Blocks(reading), StartsPage: true),
        new(FindingsSection.Blocks(reading)),
        new(HoldingsSection.Blocks(reading)),
        new(MethodSection.Blocks(reading), StartsPage: true),
    ];
}
