using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>What the choices behind the figures do to the top node; left out where none was tried.</summary>
internal static class EffectsSection
{
    public static IReadOnlyList<Block> Blocks(RunReading run)
    {
        if (run.Results.Effects is not { } effects || run.Root is not { } root)
            return [];

        var scale = run.Scale(root.Currency);
        return
        [
            new Heading("What the choices do"),
            new Paragraph($"Measures of {root.Name} under {run.Record.Settings.Model.Name}, on the same {Numerals.Count(effects.Scenarios)} draws both ways; with so few, a single figure here is rougher than those of the report, and differences say more than levels."),
            .. Choices(effects, scale),
            .. Classes(effects, scale),
            .. Roots(effects, scale),
            .. Fills(effects),
        ];
    }

    private static IEnumerable<Block> Choices(RunEffects effects, MoneyScale scale)
    {
        if (effects.Choices.Count == 0)
            yield break;

        yield return new Heading("One choice made otherwise", 3);
        yield return new Table(
            [new("Instead of", 1.6), new("tried", 1.6), .. effects.Choices[0].Measures.Select(m => new Column(Phrases.Head(m.Spec), 1, Alignment.Right, scale.Unit))],
            [new([.. effects.Choices.Select(choice => new Row([choice.Choice, choice.Instead, .. choice.Measures.Select(m => Changed(m, scale))]))])], "");
    }

    private static IEnumerable<Block> Classes(RunEffects effects, MoneyScale scale)
    {
        if (effects.Classes.Count == 0)
            yield break;

        var measures = effects.Classes[0].Measures;
        double Added(int i) => effects.Classes.Sum(one => one.Measures[i].Otherwise);
        yield return new Heading("Classes of factors, simply added", 3);
        yield return new Table(
            [new("Only this class moves", 2), .. measures.Select(m => new Column(Phrases.Head(m.Spec), 1, Alignment.Right, scale.Unit))],
            [
                new([
                    .. effects.Classes.Select(one => new Row([Name(one.Class), .. one.Measures.Select(m => (Cell)scale.Text(m.Otherwise))])),
                    new(["Added, as if all fell together", .. measures.Select((_, i) => (Cell)scale.Text(Added(i)))], Emphasis.Total),
                    new(["All classes moving as they are correlated", .. measures.Select((m, i) => (Cell)new TextCell(scale.Text(m.Value), Share(m.Value, Added(i))))], Emphasis.Strong),
                ]),
            ], "");
    }

    private static IEnumerable<Block> Roots(RunEffects effects, MoneyScale scale)
    {
        if (effects.RootsOfTime.Count == 0)
            yield break;

        yield return new Heading("Several days, beside one day times the root of them", 3);
        yield return new Table(
            [new("Measure", 2.4), new("simulated", 1, Alignment.Right, scale.Unit), new("1 day × √days", 1, Alignment.Right, scale.Unit), new("ratio", 0.6, Alignment.Right)],
            [new([.. effects.RootsOfTime.Select(root => new Row([root.Spec.ToString(), scale.Text(root.Simulated), scale.Text(root.Scaled), Numerals.Fixed(root.Scaled / root.Simulated, 2)]))])], "");
        yield return new Paragraph("A comparison only: no figure of this report is scaled from another horizon.", Voice.Note);
    }

    private static IEnumerable<Block> Fills(RunEffects effects)
    {
        if (effects.Fills.Count == 0)
            yield break;

        yield return new Heading("Days filled from a proxy", 3);
        yield return new Table(
            [
                new("Factor", 1.2), new("proxy", 1.2), new("days filled", 0.9, Alignment.Right), new("daily volatility", 1, Alignment.Right, "with them"), new("", 1, Alignment.Right, "own days alone"),
                new("correlation", 1, Alignment.Right, "with them"), new("", 1, Alignment.Right, "own days alone"), new("with", 1),
            ],
            [
                new([.. effects.Fills.Select(fill => new Row(
                [
                    fill.Factor, fill.Proxy, new TextCell(Numerals.Count(fill.Days), Numerals.Percent(fill.Share)), Numerals.Percent(fill.Volatility, 2),
                    Numerals.Percent(fill.OwnVolatility ?? double.NaN, 2), Numerals.Fixed(fill.Correlation, 2), Numerals.Fixed(fill.OwnCorrelation, 2), fill.Other ?? Numerals.Missing,
                ]))]),
            ], "");
        yield return new Paragraph("Equal weights over the window, around zero. The correlation is the one that the filled days change most.", Voice.Note);
    }

    private static TextCell Changed(PairedMeasure measure, MoneyScale scale) =>
        new(scale.Text(measure.Otherwise), measure.Value > 0 ? Numerals.Signed((measure.Otherwise / measure.Value * 100) - 100, 1) + "%" : "");

    private static string Share(double together, double added) => added > 0 ? $"{Numerals.Percent(together / added)} of the sum" : "";

    private static string Name(Domain.Market.FactorClass one) => one switch
    {
        Domain.Market.FactorClass.Equity => "Equity prices",
        Domain.Market.FactorClass.Fx => "Exchange rates",
        Domain.Market.FactorClass.Commodity => "Commodity prices",
        Domain.Market.FactorClass.Rate => "Interest rates",
        Domain.Market.FactorClass.Credit => "Credit spreads",
        _ => "Volatilities",
    };
}
