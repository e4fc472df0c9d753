using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Plans;

namespace RiskWorker.Engine.Sensitivities;

/// <summary>
/// The sensitivities of every node to every factor that its value depends on, in the node's currency: delta and gamma, vega, DV01 and CS01
/// as central differences of full revaluations (two a factor), by the very code and the same positions that the scenarios are valued with.
/// </summary>
/// <remarks>
/// What rounding leaves of two equal values is no sensitivity: a difference below 2^-40 of the sums it comes from counts as zero, and a
/// sensitivity of zero (with a gamma of zero) is left out. The moves are instantaneous. A pure function of the plan; threads play no part.
/// </remarks>
public static class BookSensitivities
{
    private const double Dust = 1.0 / (1L << 40);

    /// <summary>Computes them.</summary>
    /// <param name="plan">The plan.</param>
    /// <param name="factors">The factors that its places stand for.</param>
    /// <returns>Nodes in the plan's order, then by measure, curve, tenor and factor.</returns>
    public static IReadOnlyList<Sensitivity> Of(RevaluationPlan plan, IReadOnlyList<Factor> factors)
    {
        var whole = PlanSlice.Whole(plan);
        var bumps = whole.ReadFactors.Select(f => FactorBump.Of(factors[f], plan.Moves.Factors[f])).ToArray();
        var profits = new BumpedProfits(plan, whole);
        var (rows, sizes) = (OwnRows(plan), SizesOf(plan));
        var found = new List<(int Node, Sensitivity Sensitivity)>();
        for (var from = 0; from < bumps.Length; from += BumpedProfits.Capacity)
        {
            var count = Math.Min(BumpedProfits.Capacity, bumps.Length - from);
            profits.Move(whole.ReadFactors.AsSpan(from, count), bumps.AsSpan(from, count));
            for (var node = 0; node < rows.Length; node++)
            {
                var lanes = profits.Of(rows[node]);
                for (var i = 0; i < count; i++)
                {
                    if (Between(lanes, i, bumps[from + i], sizes[node]) is var (value, gamma)) found.Add((node, Record(plan.Nodes[node].Book, factors[whole.ReadFactors[from + i]], bumps[from + i].Measure, value, gamma)));
                }
            }
        }
        return [.. found.OrderBy(f => f.Node).ThenBy(f => f.Sensitivity.Measure).ThenBy(f => f.Sensitivity.Curve, StringComparer.Ordinal)
            .ThenBy(f => f.Sensitivity.TenorYears).ThenBy(f => f.Sensitivity.Factor, StringComparer.Ordinal).Select(f => f.Sensitivity)];
    }

    private static Sensitivity Record(string book, Factor factor, SensitivityMeasure measure, double value, double? gamma) =>
        new(book, factor.Name, factor.Class, factor.Curve, factor.TenorYears, measure, value, gamma);

    // Null where the factor moves nothing in the node.
    private static (double Value, double? Gamma)? Between(ReadOnlySpan<double> lanes, int place, in FactorBump bump, double size)
    {
        var (down, still, up) = (lanes[BumpedProfits.DownOf(place)], lanes[BumpedProfits.Still], lanes[BumpedProfits.UpOf(place)]);
        var dust = Dust * (size + Math.Abs(down) + Math.Abs(up));
        double Swept(double difference) => Math.Abs(difference) <= dust ? 0 : difference;
        var (value, gamma) = (bump.Scale * Swept(bump.Half(down, up)), bump.Gamma(down, still, up) is { } found ? Swept(found) : (double?)null);
        return value == 0 && gamma is null or 0 ? null : (value, gamma);
    }

    // A node's series in its own currency at the first horizon.
    private static PlanRow[] OwnRows(RevaluationPlan plan) => [.. plan.Nodes.Select((node, place) => new PlanRow(place, 0, node.Currency != 0))];

    // The absolute values of a node's cells, children included, in its own currency: what its profits are rounded against.
    private static double[] SizesOf(RevaluationPlan plan)
    {
        var sizes = new double[plan.Nodes.Count];
        foreach (var cell in plan.Cells) sizes[cell.Node] = Math.FusedMultiplyAdd(Math.Abs(cell.Value), plan.Currencies[cell.Currency].Rate, sizes[cell.Node]);
        for (var node = sizes.Length - 1; node > 0; node--) sizes[plan.Nodes[node].Parent] += sizes[node];
        for (var node = 0; node < sizes.Length; node++) sizes[node] /= plan.Currencies[plan.Nodes[node].Currency].Rate;
        return sizes;
    }
}
