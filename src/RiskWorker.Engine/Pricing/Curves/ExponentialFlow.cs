using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Curves;

/// <summary>An amount discounted by a linear form in the levels: amount · e^(-exponent).</summary>
/// <param name="Amount">Money at the payment date.</param>
/// <param name="Exponent">Minus the logarithm of what it is multiplied by today.</param>
public readonly record struct ExponentialFlow(double Amount, LinearForm Exponent)
{
    /// <summary>Its value at <paramref name="levels"/>.</summary>
    public double ValueAt(ReadOnlySpan<double> levels) => Amount * Exponential.Of(-Exponent.At(levels));

    /// <summary>
    /// <paramref name="flows"/> with the amounts of equal exponents added and zero amounts dropped, by ascending exponent. Equal
    /// exponents' amounts are added from the smallest on, so the order of <paramref name="flows"/> moves no bit.
    /// </summary>
    public static ExponentialFlow[] Merged(IEnumerable<ExponentialFlow> flows)
    {
        ExponentialFlow[] sorted = [.. flows];
        Array.Sort(sorted, (a, b) => a.Exponent.CompareTo(b.Exponent) is var order and not 0 ? order : a.Amount.CompareTo(b.Amount));
        var merged = new List<ExponentialFlow>(sorted.Length);
        foreach (var flow in sorted)
        {
            if (merged.Count > 0 && merged[^1].Exponent.Equals(flow.Exponent)) merged[^1] = new(merged[^1].Amount + flow.Amount, flow.Exponent);
            else merged.Add(flow);
        }
        merged.RemoveAll(f => f.Amount == 0);
        return [.. merged];
    }

    /// <summary>Their value at <paramref name="levels"/>: fused multiply-adds from 0, in their order.</summary>
    public static double Sum(ReadOnlySpan<ExponentialFlow> flows, ReadOnlySpan<double> levels)
    {
        var sum = 0.0;
        foreach (ref readonly var flow in flows) sum = Math.FusedMultiplyAdd(flow.Amount, Exponential.Of(-flow.Exponent.At(levels)), sum);
        return sum;
    }
}
