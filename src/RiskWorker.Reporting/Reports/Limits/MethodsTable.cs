using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>What is priced how, for the kinds held, and where that should not be trusted; left out where the record does not say.</summary>
internal static class MethodsTable
{
    public static Block[] Blocks(RunReading run) => run.Results.Methods.Count == 0
        ? []
        : [new Heading("How positions are valued", 3), Table(run.Results.Methods), .. Errors(run)];

    private static IEnumerable<Block> Errors(RunReading run)
    {
        if (run.Results.Nodes is not [{ PriceError: { } error } root, ..]) yield break;
        var simulated = error.Standard > 0 ? $" Those that are simulated have a standard error of {Numerals.Fixed(error.Standard, 2)} {root.Currency}." : "";
        yield return new Paragraph($"Numerical prices: in scenarios they are read from tables, which lie at most {Numerals.Fixed(error.Table, 2)} {root.Currency} from the pricers themselves, "
            + $"over all positions of {root.Book} added without regard to sign.{simulated} No interval of a measure holds this.", Voice.Note);
    }

    private static Table Table(IReadOnlyList<ValuationMethod> methods)
    {
        var rows = methods.Select(method => new Row(
        [
            new TextCell(method.Kind, Phrases.Plural(method.Lines, "line")),
            new TextCell($"{Phrases.Sentence(method.Model)}: {method.Method}.", method.Source),
            new TextCell(Phrases.Sentence(method.Caution) + "."),
        ]));
        return new Table([new("Kind", 1.2), new("Model and method, below it the source", 3), new("Not to be trusted: what it leaves out", 4)], [new RowGroup([.. rows])], "");
    }
}
