using RiskWorker.Domain.Evidence;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Reports.Limits;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>What makes this evidence this evidence: enough to find it, to trust it and to make it again.</summary>
internal static class EvidenceIdentity
{
    private const int ShortHash = 16;

    public static Block Of(BacktestEvidence evidence) => new Columns(
        [new Facts([.. What(evidence)])],
        [
            new Facts(
            [
                new("Inputs", evidence.Inputs.Length <= ShortHash ? evidence.Inputs : evidence.Inputs[..ShortHash] + "…"),
                new("Made", Phrases.Utc(evidence.Made)),
                new("Version", $"{evidence.Version}, numerics epoch {Numerals.Count(evidence.Epoch)}"),
                new("Make it again", evidence.Command),
            ]),
        ]);

    private static IEnumerable<Fact> What(BacktestEvidence evidence)
    {
        yield return new("Kind", RichText.Strong(EvidenceWords.Kind(evidence)));
        yield return new("Profit of", $"{Numerals.Date(evidence.From)} to {Numerals.Date(evidence.To)}");
        yield return new("Model", ModelWords.Line(evidence.Model));
        if (evidence.Scenarios is { } scenarios)
            yield return new("Scenarios", $"{Numerals.Count(scenarios)} a day");
        if (evidence.Runs.Count > 0)
            yield return new("Runs counted", Numerals.Count(evidence.Runs.Count));
    }
}
