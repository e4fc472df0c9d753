namespace RiskWorker.Reporting.Pdf;

/// <summary>Shares a table's width by the columns' weights, once each column has what its widest word needs.</summary>
internal static class ColumnWidths
{
    /// <param name="weights">Positive weights.</param>
    /// <param name="needs">What each column needs; where their sum exceeds the width, all shrink alike.</param>
    /// <param name="width">The width to share.</param>
    public static float[] Share(IReadOnlyList<double> weights, IReadOnlyList<float> needs, float width)
    {
        var total = needs.Sum();
        if (total >= width)
            return [.. needs.Select(need => need * width / total)];

        var held = new bool[weights.Count];
        while (true)
        {
            var free = width - needs.Where((_, i) => held[i]).Sum();
            var weight = weights.Where((_, i) => !held[i]).Sum();
            var next = Enumerable.Range(0, held.Length)
                .FirstOrDefault(i => !held[i] && needs[i] > free * weights[i] / weight, -1);
            if (next < 0)
                return [.. weights.Select((one, i) => held[i] ? needs[i] : (float)(free * one / weight))];

            held[next] = true;
        }
    }
}
