namespace RiskWorker.Engine.Pricing.Curves;

/// <summary>A flow of a linear rate product with its dates.</summary>
/// <param name="Paid">Payment date.</param>
/// <param name="Fixes">For the growth of a projected coupon, the date on which its rate becomes known; else null.</param>
/// <param name="Flow">Amount and exponent as of the valuation date.</param>
public readonly record struct RateFlow(DateOnly Paid, DateOnly? Fixes, ExponentialFlow Flow) : IComparable<RateFlow>
{
    /// <summary>By payment date, fixing date (none first), exponent, amount.</summary>
    public int CompareTo(RateFlow other)
    {
        var order = Paid.CompareTo(other.Paid);
        if (order == 0) order = Nullable.Compare(Fixes, other.Fixes);
        if (order == 0) order = Flow.Exponent.CompareTo(other.Flow.Exponent);
        return order != 0 ? order : Flow.Amount.CompareTo(other.Flow.Amount);
    }

    /// <summary><paramref name="flows"/> in order, the amounts of equal dates and exponent added, zero amounts dropped.</summary>
    internal static RateFlow[] Merged(IEnumerable<RateFlow> flows)
    {
        var merged = new List<RateFlow>();
        foreach (var flow in flows.Order())
        {
            if (merged.Count > 0 && merged[^1].IsAsDated(flow)) merged[^1] = flow with { Flow = flow.Flow with { Amount = merged[^1].Flow.Amount + flow.Flow.Amount } };
            else merged.Add(flow);
        }
        merged.RemoveAll(f => f.Flow.Amount == 0);
        return [.. merged];
    }

    private bool IsAsDated(in RateFlow other) => Paid == other.Paid && Fixes == other.Fixes && Flow.Exponent.Equals(other.Flow.Exponent);
}
