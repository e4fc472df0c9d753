namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// All transition counts of a given number of exceptions in a number of days, when every order of the days is equally likely, by runs:
/// x exceptions fall into r runs in C(x - 1, r - 1) ways, the y other days around them in C(y - 1, r), C(y - 1, r - 1) or C(y - 1, r - 2)
/// ways as no, one given, or both ends of the series are exceptions (W. Feller, An Introduction to Probability Theory, volume 1, 1968, section II.5).
/// </summary>
internal static class TransitionLaw
{
    private const double Large = 1e200;

    /// <summary>Counts with their probabilities.</summary>
    public static List<(TransitionCounts Counts, double Probability)> Of(int days, int exceptions)
    {
        var (x, y) = (exceptions, days - exceptions);
        if (x == 0) return [(new(days - 1, 0, 0, 0), 1)];
        if (y == 0) return [(new(0, 0, 0, days - 1), 1)];
        var runs = Math.Min(x, y + 1);
        var (inside, around) = (new double[runs + 1], new double[runs + 1]); // with C(y - 1, r - 1), with C(y - 1, r - 2)
        (inside[1], around[1]) = (1, 0);
        for (var r = 1; r < runs; r++)
        {
            var ways = (double)(x - r) / r;
            inside[r + 1] = inside[r] * ways * (y - r) / r;
            around[r + 1] = r == 1 ? inside[1] * ways : around[r] * ways * (y - r + 1) / (r - 1);
            if (Math.Max(inside[r + 1], around[r + 1]) > Large) Shrink(inside, around, r + 1);
        }
        return Outcomes(days, x, y, inside, around);
    }

    private static List<(TransitionCounts, double)> Outcomes(int days, int x, int y, double[] inside, double[] around)
    {
        var outcomes = new List<(TransitionCounts Counts, double Weight)>(3 * inside.Length);
        for (var r = 1; r < inside.Length; r++)
        {
            Add(r, r, r, inside[r] * (y - r) / r);
            Add(r, r - 1, r, inside[r]);
            Add(r, r, r - 1, inside[r]);
            Add(r, r - 1, r - 1, around[r]);
        }
        var total = outcomes.Select(o => o.Weight).Order().Sum();
        return [.. outcomes.Select(o => (o.Counts, o.Weight / total))];

        void Add(int r, int fell, int rose, double weight)
        {
            if (weight > 0) outcomes.Add((new(days - 1 - fell - rose - (x - r), fell, rose, x - r), weight));
        }
    }

    private static void Shrink(double[] inside, double[] around, int upTo)
    {
        for (var i = 1; i <= upTo; i++) (inside[i], around[i]) = (inside[i] / Large, around[i] / Large);
    }
}
