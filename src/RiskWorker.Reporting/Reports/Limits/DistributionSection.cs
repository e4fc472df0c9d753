using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Charts;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>The simulated distribution of the root's P&amp;L, VaR and expected shortfall marked.</summary>
internal static class DistributionSection
{
    private const int MostBins = 120;

    public static IReadOnlyList<Block> Blocks(RunReading run)
    {
        if (run.Root?.Distributions is not [var distribution, ..] || distribution.Counts.Count < 3 || distribution.High <= distribution.Low)
            return [];

        var scale = run.Scale();
        var marks = run.Root.Measures.Where(measure => measure.Spec.Horizon == distribution.Horizon && run.HeadlineSpecs.Contains(measure.Spec))
            .Select(measure => new LossMark(Phrases.Short(measure.Spec), measure.Value)).ToList();
        return
        [
            new Heading(run.IsHistory ? "Distribution of P&L over past days' moves" : "Distribution of simulated P&L"),
            new Figure(Title(run, distribution, scale), Chart(distribution, marks, run.Currency), 190,
                $"Mean {scale.Text(distribution.Mean)}, standard deviation {scale.Text(distribution.Deviation)} {scale.Unit}. Losses lie at the left; the darker bars lie beyond the nearer line. "
                + "Outlined bars at the ends hold all that lies further out." + (run.IsWeighted ? " Bars count days; the figures weigh them by age." : "")),
        ];
    }

    private static string Title(RunReading run, ProfitDistribution distribution, MoneyScale scale)
    {
        var var = run.Root!.Measures.FirstOrDefault(measure => measure.Spec.Kind == MeasureKind.Var && measure.Spec.Horizon == distribution.Horizon);
        return var is null
            ? $"{(run.IsHistory ? "P&L of the scenarios" : "Simulated P&L")} over {distribution.Horizon}"
            : $"Over {distribution.Horizon}, {Numerals.Confidence(1 - var.Spec.Confidence.Level)} of the {(run.IsWeighted ? "scenarios by weight" : "scenarios")} lose {scale.Text(var.Value)} {scale.Unit} or more";
    }

    private static DistributionChart Chart(ProfitDistribution distribution, IReadOnlyList<LossMark> marks, string currency)
    {
        var counts = distribution.Counts;
        var inner = counts.Skip(1).Take(counts.Count - 2).ToList();
        var joined = Divisor(inner.Count);
        var width = (distribution.High - distribution.Low) / inner.Count * joined;
        return new DistributionChart(distribution.Low, width, [.. inner.Chunk(joined).Select(chunk => chunk.Sum())], counts[0], counts[^1], marks, currency);
    }

    // Neighbouring bins are joined in equal numbers, so that no bar differs in width.
    private static int Divisor(int bins)
    {
        for (var joined = (bins + MostBins - 1) / MostBins; joined <= bins / 20; joined++)
        {
            if (bins % joined == 0)
                return joined;
        }

        return 1;
    }
}
