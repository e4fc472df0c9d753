using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Reports.Limits;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>How the figures were found, what each test asks, and how little they can prove.</summary>
internal static class EvidenceMethod
{
    public static IReadOnlyList<Block> Blocks(EvidenceReading reading) =>
    [
        new Heading("Method and its limits"),
        new Facts(
        [
            new("Model", ModelWords.Line(reading.Evidence.Model)),
            new("VaR and day", "One-day VaR and expected shortfall of a close are held against the profit to the next close."),
            new("Actual P&L", "As the firm booked it."),
            new("Hypothetical P&L", "The positions of the close, unchanged, at the prices of the next close."),
            new("Greater count", "Exceptions by actual and by hypothetical P&L are counted apart; the greater count decides, not the sum (MAR32.5)."),
            new("Zone", "By the cumulative binomial probability of the count for so many days: yellow from the first count that reaches 95% on, red from 99.99% on (MAR99); none below 125 days, a house rule."),
            new("Desk limit", "More than 12 exceptions at 99% or more than 30 at 97.5% in 250 days exceed it (MAR32.19)."),
            new("Probability of a P&L", "The share of scenarios at or below it, (number + 1/2) / (scenarios + 1): level between 0 and 1 where the model is right."),
            new("p-values", "Exact: by the law of the statistic for so many days. Asymptotic: by its limit for many days, too optimistic for few exceptions. Simulated: by series drawn under the model. Rejected means below 5%."),
        ]),
        .. Tests(reading),
        .. PowerTable.Blocks(),
    ];

    private static Block[] Tests(EvidenceReading reading)
    {
        var tests = reading.Evidence.Series.SelectMany(one => one.Tests).DistinctBy(test => test.Name).ToList();
        return tests.Count == 0 ? [] :
        [
            new Heading("What each test asks", 3),
            new Table(
                [new("Test", 1.8), new("Question", 3), new("Source", 2.4), new("In backtest.json", 1.8)],
                [new([.. tests.Select(Row)])], ""),
        ];
    }

    private static Row Row(StatisticalTest test)
    {
        var words = TestWords.Of(test.Name);
        return new([words.Title, words.Question.Length > 0 ? words.Question + "." : Numerals.Missing, test.Source, test.Name]);
    }
}
