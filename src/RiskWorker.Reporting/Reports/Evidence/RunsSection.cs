using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Reports.Limits;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>What the counts rest on: the runs with the hashes of their records, or the hash of what a walk-forward read.</summary>
internal static class RunsSection
{
    public static IReadOnlyList<Block> Blocks(EvidenceReading reading)
    {
        var evidence = reading.Evidence;
        return
        [
            new Heading("What this rests on"),
            new Facts([new("Hash of the inputs", evidence.Inputs), new("Make it again", evidence.Command), new("Version", $"{evidence.Version}, numerics epoch {Numerals.Count(evidence.Epoch)}")]),
            .. evidence.Runs.Count > 0 ? Runs(evidence.Runs) : [new Paragraph(reading.IsWalkForward
                ? "A walk-forward counts no stored run: the hash above is that of all it read, prices, positions and settings."
                : "No run is counted.")],
        ];
    }

    private static Block[] Runs(IReadOnlyList<Domain.Evidence.EvidenceRun> runs) =>
    [
        new Paragraph($"{Phrases.Sentence(Phrases.Plural(runs.Count, "run"))} counted, {Numerals.Count(runs.Count(run => run.Evidence == EvidenceKind.Recorded))} recorded before the profit was known. The hash is that of the run's record in the chain of runs."),
        new Table(
            [new("As of", 1), new("Run", 1.3), new("Evidence", 1), new("Hash of its record", 6.5)],
            [new([.. runs.Select(run => new Row([Numerals.Date(run.AsOf), run.Run, run.Evidence == EvidenceKind.Recorded ? "recorded" : "backfilled", run.Hash]))])], ""),
    ];
}
