namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>Ranks from 1, the smallest, doubled so that the average rank of ties is a whole number.</summary>
internal static class AverageRanks
{
    public static long[] Doubled(IReadOnlyList<double> values)
    {
        int[] order = [.. Enumerable.Range(0, values.Count)];
        Array.Sort([.. values], order);
        var ranks = new long[values.Count];
        for (var (first, next) = (0, 0); first < order.Length; first = next)
        {
            while (next < order.Length && values[order[next]] == values[order[first]]) next++;
            for (var i = first; i < next; i++) ranks[order[i]] = first + 1 + next;
        }
        return ranks;
    }
}
