using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Reports.Limits;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>What 250 days can prove of a 99% VaR: how often a rule that rejects from a count on is wrong about a right model, and about wrong ones.</summary>
internal static class PowerTable
{
    private const int Days = 250;
    private const int Last = 13;
    private static readonly Confidence Right = new(0.99m);
    private static readonly decimal[] Wrong = [0.98m, 0.97m, 0.96m, 0.95m];

    public static IEnumerable<Block> Blocks()
    {
        yield return new Heading("What 250 days can prove", 3);
        yield return new Paragraph(
            $"Of 100 years of 250 days, a model whose VaR 99% is right has five exceptions or more in {Percent(Rejected(5))}: an alarm from five on is wrong so often. A model that in truth covers 98% has fewer than five in {Percent(Accepted(5, 0.98m))} and passes; "
            + $"one that covers 97% has fewer than ten, and stays out of the red zone, in {Percent(Accepted(10, 0.97m))}. A year can show that a model fails; it cannot show that it is right.");
        yield return new Table(
            [
                new("Rejecting from", 1.3, Alignment.Right, "exceptions"), new("Right model", 1.2, Alignment.Right, "rejected, %"),
                .. Wrong.Select(coverage => new Column($"Covers {Numerals.Confidence(coverage)}", 1.1, Alignment.Right, "accepted, %")),
            ],
            [new([.. Enumerable.Range(1, Last).Select(Row)])], "");
        yield return new Paragraph("Binomial, 250 independent days. In bold: where the yellow and the red zone begin. After table 1 of Basel Committee, Supervisory framework for the use of backtesting (January 1996).", Voice.Note);
    }

    private static Row Row(int count) => new(
        [Numerals.Count(count), Percent(Rejected(count)), .. Wrong.Select(coverage => (Cell)Percent(Accepted(count, coverage)))], count is 5 or 10 ? Emphasis.Strong : Emphasis.None);

    private static double Rejected(int count) => ExceptionPower.AtLeast(count, Days, (double)(1 - Right.Level));

    private static double Accepted(int count, decimal coverage) => 1 - ExceptionPower.AtLeast(count, Days, (double)(1 - coverage));

    private static string Percent(double probability) => probability is > 0 and < 5e-5 ? "<\u00A00.01" : Numerals.Fixed(probability * 100, 2);
}
