using RiskWorker.Domain.Limits;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>The published rules whose measures, history and limits the settings fill in; left out where there are none.</summary>
internal static class RulesSection
{
    public static IEnumerable<Block> Blocks(RunReading run)
    {
        var chosen = run.Record.Settings.Rules.Select(choice => (Choice: choice, Rule: RuleSets.Find(choice.Set))).Where(one => one.Rule is not null).ToList();
        if (chosen.Count == 0)
            yield break;

        yield return new Heading("Rule sets", 3);
        yield return new Table(
            [new("Rule", 1.2), new("book", 0.8), new("figures", 2), new("published in", 1.4)],
            [new([.. chosen.Select(one => new Row([one.Rule!.Title, Books(run, one.Choice), one.Rule.Figures, one.Rule.Source]))])], "");
        yield return new Paragraph("An aid to calculation, designed with reference to these rules; no legal opinion, and no conformity is claimed.", Voice.Note);
    }

    private static string Books(RunReading run, RuleChoice choice)
    {
        if (choice.Book is not { } book)
            return "all";

        return choice.ReferenceBook is { } reference ? $"{run.NameOf(book)}, against {run.NameOf(reference)}" : run.NameOf(book);
    }
}
