using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>Plain arithmetic on two spans, element by element; a NaN stays one; allocates nothing.</summary>
public static class Elementwise
{
    /// <summary>A sum.</summary>
    public static double Add(double value, double total) => total + value;

    /// <summary>A difference.</summary>
    public static double Subtract(double value, double total) => total - value;

    /// <summary>A quotient.</summary>
    public static double DivideBy(double divisor, double total) => total / divisor;

    /// <summary>The number of the other sign.</summary>
    public static double Negate(double value) => -value;

    /// <summary>total[s] += values[s].</summary>
    [ScalarTwin(nameof(Add))]
    public static void Add(ReadOnlySpan<double> values, Span<double> total)
    {
        Spans.RequireLength(values.Length, total.Length, nameof(total));
        ref double from = ref MemoryMarshal.GetReference(values);
        ref double to = ref MemoryMarshal.GetReference(total);
        nuint s = 0, length = (nuint)values.Length;
        for (; s + 8 <= length; s += 8)
            (Vector512.LoadUnsafe(ref to, s) + Vector512.LoadUnsafe(ref from, s)).StoreUnsafe(ref to, s);
        for (int i = (int)s; i < values.Length; i++)
            total[i] = Add(values[i], total[i]);
    }

    /// <summary>total[s] -= values[s].</summary>
    [ScalarTwin(nameof(Subtract))]
    public static void Subtract(ReadOnlySpan<double> values, Span<double> total)
    {
        Spans.RequireLength(values.Length, total.Length, nameof(total));
        ref double from = ref MemoryMarshal.GetReference(values);
        ref double to = ref MemoryMarshal.GetReference(total);
        nuint s = 0, length = (nuint)values.Length;
        for (; s + 8 <= length; s += 8)
            (Vector512.LoadUnsafe(ref to, s) - Vector512.LoadUnsafe(ref from, s)).StoreUnsafe(ref to, s);
        for (int i = (int)s; i < values.Length; i++)
            total[i] = Subtract(values[i], total[i]);
    }

    /// <summary>total[s] /= divisors[s].</summary>
    [ScalarTwin(nameof(DivideBy))]
    public static void DivideBy(ReadOnlySpan<double> divisors, Span<double> total)
    {
        Spans.RequireLength(divisors.Length, total.Length, nameof(total));
        ref double from = ref MemoryMarshal.GetReference(divisors);
        ref double to = ref MemoryMarshal.GetReference(total);
        nuint s = 0, length = (nuint)divisors.Length;
        for (; s + 8 <= length; s += 8)
            (Vector512.LoadUnsafe(ref to, s) / Vector512.LoadUnsafe(ref from, s)).StoreUnsafe(ref to, s);
        for (int i = (int)s; i < divisors.Length; i++)
            total[i] = DivideBy(divisors[i], total[i]);
    }

    /// <summary>negated[s] = -values[s].</summary>
    [ScalarTwin(nameof(Negate))]
    public static void Negate(ReadOnlySpan<double> values, Span<double> negated)
    {
        Spans.RequireLength(values.Length, negated.Length, nameof(negated));
        ref double from = ref MemoryMarshal.GetReference(values);
        ref double to = ref MemoryMarshal.GetReference(negated);
        nuint s = 0, length = (nuint)values.Length;
        for (; s + 8 <= length; s += 8)
            (-Vector512.LoadUnsafe(ref from, s)).StoreUnsafe(ref to, s);
        for (int i = (int)s; i < values.Length; i++)
            negated[i] = Negate(values[i]);
    }
}
