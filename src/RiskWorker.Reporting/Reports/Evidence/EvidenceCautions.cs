using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Reports.Limits;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>What a reader must not take this for.</summary>
internal static class EvidenceCautions
{
    public static IReadOnlyList<Block> Blocks(EvidenceReading reading) =>
    [
        new Heading("Cautions"),
        new Paragraph("Model estimates, not guarantees; no investment advice. A test that finds nothing does not show that a model is right, and past days do not bind the next one. " + ModelCautions.Sentences(reading.Evidence.Model)),
        new Paragraph("Simulation noise: a VaR close to a day's loss may lie on either side of it by chance of the draws; that error is not in the counts."),
        new Paragraph(
            "Local regulation, the firm's own policy and its qualified staff come first. This report is designed with reference to MAR32 and MAR99 of the Basel framework; no conformity with them, or with any law, is claimed. "
            + "Zone, add-on and desk limit are computed after the published tables and decide nothing by themselves."),
    ];
}
