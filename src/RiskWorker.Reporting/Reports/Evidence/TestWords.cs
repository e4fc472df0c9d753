namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>What a test of <c>backtest.json</c> is called on a page, and what it asks.</summary>
/// <param name="Title">A few words.</param>
/// <param name="Question">A sentence without its end.</param>
internal sealed record TestWords(string Title, string Question)
{
    private static readonly Dictionary<string, TestWords> Known = new(StringComparer.Ordinal)
    {
        ["kupiec-failures"] = new("Number of exceptions", "Are exceptions as many as the confidence says"),
        ["kupiec-first-failure"] = new("Day of the first exception", "Did the first exception come when it should"),
        ["christoffersen-independence"] = new("Next-day independence", "Does an exception make one on the next day more or less likely"),
        ["christoffersen-conditional"] = new("Number and independence", "Number and next-day independence together"),
        ["haas-mixed"] = new("Number and times between", "Number of exceptions and the times between them together"),
        ["duration"] = new("Time since the last", "Does the chance of an exception depend on the time since the last"),
        ["acerbi-szekely-z1"] = new("Size beyond VaR (Z1)", "Are losses beyond VaR as large as expected shortfall says"),
        ["acerbi-szekely-z2"] = new("Size and number (Z2)", "Are losses beyond VaR as large and as many as expected shortfall says"),
        ["costanzino-curran"] = new("Depth in the tail", "How far into the tail do exceptions lie"),
        ["kolmogorov-smirnov"] = new("Distribution, largest gap", "Is P&L spread over the whole forecast distribution as it should be"),
        ["anderson-darling"] = new("Distribution, tails weighted", "The same with weight on the tails"),
        ["berkowitz"] = new("Mean, spread, memory", "Have the forecast probabilities, as normals, mean 0, variance 1 and no autocorrelation"),
        ["berkowitz-tail"] = new("Mean and spread of the tail", "The same of the loss tail alone"),
        ["attribution-spearman"] = new("P&L attribution, ranks", "Do theoretical and hypothetical P&L rank days alike"),
        ["attribution-kolmogorov-smirnov"] = new("P&L attribution, distributions", "Are theoretical and hypothetical P&L spread alike"),
    };

    /// <summary>The words for a test; one that is not known is called by its name.</summary>
    public static TestWords Of(string name) => Known.GetValueOrDefault(name) ?? new(name, "");
}
