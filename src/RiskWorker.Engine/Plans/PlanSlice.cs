namespace RiskWorker.Engine.Plans;

/// <summary>Places <paramref name="From"/> up to, not including, <paramref name="To"/> of a list.</summary>
public readonly record struct ItemRange(int From, int To)
{
    /// <summary>Whether there is nothing in it.</summary>
    public bool IsEmpty => From >= To;
}

/// <summary>What a slice holds of one underlying.</summary>
/// <param name="Group">Place of the underlying's group in the plan.</param>
/// <param name="Linear">Its linear holdings.</param>
/// <param name="Options">For each option batch of the group, the options.</param>
/// <param name="Formulas">For each formula batch of the group, the options.</param>
public sealed record GroupSlice(int Group, ItemRange Linear, ItemRange[] Options, ItemRange[] Formulas);

/// <summary>What a slice holds of one flow batch.</summary>
public readonly record struct FlowSlice(int Batch, ItemRange Amounts);

/// <summary>
/// One node with everything below it, as ranges of a plan's lists: valued alone it gives what it gives within the whole,
/// to the last bit, since the same sums run over the same terms in the same order.
/// </summary>
public sealed class PlanSlice
{
    private PlanSlice(RevaluationPlan plan, int node, IReadOnlyList<UnderlyingGroup> groups, IReadOnlyList<FlowBatch> flows)
    {
        (Node, EndNode, HeldGroups, HeldFlows) = (node, EndOf(plan, node), groups, flows);
        Cells = new(FirstCell(plan, Node), FirstCell(plan, EndNode));
        Currencies = [.. Enumerable.Range(Cells.From, Cells.To - Cells.From).Select(c => plan.Cells[c].Currency)
            .Concat(Enumerable.Range(Node, EndNode - Node).Select(n => plan.Nodes[n].Currency)).Where(c => c != 0).Distinct().Order()];
        Groups = [.. Enumerable.Range(0, groups.Count).Select(g => SliceOf(groups[g], g)).OfType<GroupSlice>()];
        Flows = [.. Enumerable.Range(0, flows.Count).Select(b => new FlowSlice(b, RangeOf(flows[b].Amounts.Count, i => flows[b].Amounts[i].Cell))).Where(f => !f.Amounts.IsEmpty)];
        FormFactors = [.. FormFactorsOf().Distinct().Order()];
        ReadFactors = FactorsRead(plan);
        (Factors, RowOf) = MovingFactors(plan);
    }

    /// <summary>The node.</summary>
    public int Node { get; }

    /// <summary>The first node after it that is not below it.</summary>
    public int EndNode { get; }

    /// <summary>Its cells.</summary>
    public ItemRange Cells { get; }

    /// <summary>Places of the currencies that its cells and nodes are in, the reporting currency left out.</summary>
    public int[] Currencies { get; }

    /// <summary>The groups that <see cref="Groups"/> has places in: the plan's own, or those of one close of an aged book.</summary>
    public IReadOnlyList<UnderlyingGroup> HeldGroups { get; }

    /// <summary>The flows that <see cref="Flows"/> has places in.</summary>
    public IReadOnlyList<FlowBatch> HeldFlows { get; }

    /// <summary>Its holdings, by group.</summary>
    public GroupSlice[] Groups { get; }

    /// <summary>Its discounted amounts, by batch.</summary>
    public FlowSlice[] Flows { get; }

    /// <summary>The factors whose levels its flows and formulas read, ascending.</summary>
    public int[] FormFactors { get; private init; }

    /// <summary>The factors whose levels its value depends on, still ones among them, ascending.</summary>
    public int[] ReadFactors { get; }

    /// <summary>The moving ones among them, ascending.</summary>
    public int[] Factors { get; }

    /// <summary>For each factor of the plan its place in <see cref="Factors"/>, or -1.</summary>
    public int[] RowOf { get; }

    /// <summary>The slice of every node of <paramref name="plan"/>, by node number.</summary>
    public static PlanSlice[] OfNodes(RevaluationPlan plan) => [.. Enumerable.Range(0, plan.Nodes.Count).Select(node => new PlanSlice(plan, node, plan.Groups, plan.Flows))];

    /// <summary>The whole of <paramref name="plan"/>.</summary>
    public static PlanSlice Whole(RevaluationPlan plan) => new(plan, 0, plan.Groups, plan.Flows);

    /// <summary>All that one close of an aged book values, with the curves that its fixings and barriers read.</summary>
    public static PlanSlice Whole(RevaluationPlan plan, DatedHoldings close) => new(plan, 0, close.Groups, close.Flows) { FormFactors = close.FormFactors };

    private static int EndOf(RevaluationPlan plan, int node)
    {
        var end = node + 1;
        while (end < plan.Nodes.Count && plan.Nodes[end].Parent >= node) end++;
        return end;
    }

    private static int FirstCell(RevaluationPlan plan, int node) => FirstAtLeast(plan.Cells.Count, cell => plan.Cells[cell].Node, node);

    private GroupSlice? SliceOf(UnderlyingGroup group, int place)
    {
        var linear = RangeOf(group.Linear.Count, i => group.Linear[i].Cell);
        var options = group.Options.Select(batch => RangeOf(batch.Items.Length, i => batch.Items[i].Cell)).ToArray();
        var formulas = group.Formulas.Select(batch => RangeOf(batch.Items.Length, i => batch.Items[i].Cell)).ToArray();
        return linear.IsEmpty && options.All(o => o.IsEmpty) && formulas.All(f => f.IsEmpty) ? null : new(place, linear, options, formulas);
    }

    private ItemRange RangeOf(int count, Func<int, int> cellOf) => new(FirstAtLeast(count, cellOf, Cells.From), FirstAtLeast(count, cellOf, Cells.To));

    private static int FirstAtLeast(int count, Func<int, int> keyOf, int key)
    {
        var (low, high) = (0, count);
        while (low < high)
        {
            var middle = (low + high) >>> 1;
            if (keyOf(middle) < key) low = middle + 1;
            else high = middle;
        }
        return low;
    }

    private IEnumerable<int> FormFactorsOf()
    {
        foreach (var flow in Flows)
        {
            foreach (var factor in HeldFlows[flow.Batch].Exponent.Factors.ToArray()) yield return factor;
        }
        foreach (var slice in Groups)
        {
            for (var b = 0; b < slice.Formulas.Length; b++)
            {
                if (slice.Formulas[b].IsEmpty) continue;
                foreach (var factor in HeldGroups[slice.Group].Formulas[b].Market.Factors()) yield return factor;
            }
        }
    }

    private int[] FactorsRead(RevaluationPlan plan)
    {
        var needed = new SortedSet<int>();
        foreach (var slice in Groups)
        {
            var group = HeldGroups[slice.Group];
            needed.Add(group.Key.Factor);
            needed.Add(group.Key.Quote);
            for (var b = 0; b < slice.Options.Length; b++)
            {
                if (!slice.Options[b].IsEmpty) needed.Add(group.Options[b].VolatilityFactor);
            }
        }
        needed.UnionWith(FormFactors);
        foreach (var currency in Currencies) needed.Add(plan.Currencies[currency].Factor);
        return [.. needed.Where(f => f >= 0)];
    }

    private (int[] Factors, int[] RowOf) MovingFactors(RevaluationPlan plan)
    {
        int[] factors = [.. ReadFactors.Where(f => plan.Moves.RowOf[f] >= 0)];
        var rowOf = new int[plan.Moves.RowOf.Length];
        Array.Fill(rowOf, -1);
        for (var row = 0; row < factors.Length; row++) rowOf[factors[row]] = row;
        return (factors, rowOf);
    }
}
