using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Reductions;

namespace RiskWorker.Engine.Measures;

/// <summary>What is recorded of a series beyond its measures: moments, histogram and quantiles, as profit.</summary>
public static class DistributionSummary
{
    // Probabilities of profit: dense where losses are, a hundredth apart in the middle, a few in the gain tail.
    private static readonly decimal[] s_probabilities =
    [
        0.0001m, 0.0002m, 0.0003m, 0.0005m, 0.0007m,
        .. Enumerable.Range(2, 99).Select(i => i * 0.0005m),
        .. Enumerable.Range(6, 90).Select(i => i * 0.01m),
        0.96m, 0.97m, 0.975m, 0.98m, 0.985m, 0.99m, 0.995m, 0.999m, 0.9999m,
    ];

    /// <summary>Summarises a series.</summary>
    /// <param name="horizon">Its horizon.</param>
    /// <param name="sum">Sum of its losses.</param>
    /// <param name="squares">Sum of their squares.</param>
    /// <param name="histogram">Counts of losses: below, the bins, above.</param>
    /// <param name="edges">Edges of the histogram.</param>
    /// <param name="sample">Its tail.</param>
    public static ProfitDistribution Of(Horizon horizon, double sum, double squares, IReadOnlyList<long> histogram, HistogramEdges edges, LossSeries sample)
    {
        var (mean, deviation) = sample.Moments(sum, squares);
        return new ProfitDistribution
        {
            Horizon = horizon,
            Mean = 0 - mean, // not -mean: nothing at risk gains 0, not -0
            Deviation = deviation,
            Low = 0 - edges.High,
            High = 0 - edges.Low,
            Counts = [.. histogram.Reverse()],
            Quantiles = Quantiles(histogram, edges, sample),
        };
    }

    private static List<Quantile> Quantiles(IReadOnlyList<long> histogram, HistogramEdges edges, LossSeries sample)
    {
        var quantiles = new List<Quantile>(s_probabilities.Length);
        var (bin, passed) = (histogram.Count - 1, 0L);
        foreach (var probability in s_probabilities)
        {
            var rank = sample.RankOf(probability);
            while (rank > passed + histogram[bin]) passed += histogram[bin--];
            var known = rank <= sample.Known;
            quantiles.Add(new((double)probability, 0 - (known ? sample.AtRank(rank) : LossIn(bin, rank - passed, histogram[bin], edges)), known));
        }
        return quantiles;
    }

    // The rank-th worst of the losses of a bin, which are taken to lie evenly in it.
    private static double LossIn(int bin, long rank, long count, HistogramEdges edges)
    {
        if (bin == 0) return edges.Low;
        return bin > HistogramEdges.Bins ? edges.High : edges.Low + (edges.Width * (bin - ((rank - 0.5) / count)));
    }
}
