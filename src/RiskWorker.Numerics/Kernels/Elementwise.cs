using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>Plain arithmetic on two spans, element by element; a NaN stays one; allocates nothing.</summary>
public static class Elementwise
{
    private interface IOperation
    {
        static abstract double Of(double value, double total);

        static abstract Vector512<double> Of(Vector512<double> value, Vector512<double> total);
    }

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
    public static void Add(ReadOnlySpan<double> values, Span<double> total) => Apply<Sum>(values, total);

    /// <summary>total[s] -= values[s].</summary>
    [ScalarTwin(nameof(Subtract))]
    public static void Subtract(ReadOnlySpan<double> values, Span<double> total) => Apply<Difference>(values, total);

    /// <summary>total[s] /= divisors[s].</summary>
    [ScalarTwin(nameof(DivideBy))]
    public static void DivideBy(ReadOnlySpan<double> divisors, Span<double> total) => Apply<Quotient>(divisors, total);

    /// <summary>negated[s] = -values[s].</summary>
    [ScalarTwin(nameof(Negate))]
    public static void Negate(ReadOnlySpan<double> values, Span<double> negated) => Apply<Negative>(values, negated);

    /// <summary>A square root, correctly rounded everywhere.</summary>
    public static double SquareRoot(double value) => Math.Sqrt(value);

    /// <summary>total + weight·value².</summary>
    public static double AddSquare(double value, double weight, double total) => Math.FusedMultiplyAdd(weight, value * value, total);

    /// <summary>roots[s] = √values[s].</summary>
    [ScalarTwin(nameof(SquareRoot))]
    public static void SquareRoot(ReadOnlySpan<double> values, Span<double> roots) => Apply<Root>(values, roots);

    /// <summary>total[s] += weight·values[s]².</summary>
    [ScalarTwin(nameof(AddSquare))]
    public static void AddSquare(ReadOnlySpan<double> values, double weight, Span<double> total)
    {
        Spans.RequireLength(values.Length, total.Length, nameof(total));
        ref double from = ref MemoryMarshal.GetReference(values);
        ref double to = ref MemoryMarshal.GetReference(total);
        Vector512<double> weights = Vector512.Create(weight);
        nuint s = 0, length = (nuint)values.Length;
        for (; s + 8 <= length; s += 8)
        {
            Vector512<double> value = Vector512.LoadUnsafe(ref from, s);
            Vector512.FusedMultiplyAdd(weights, value * value, Vector512.LoadUnsafe(ref to, s)).StoreUnsafe(ref to, s);
        }

        for (int i = (int)s; i < values.Length; i++)
            total[i] = AddSquare(values[i], weight, total[i]);
    }

    private static void Apply<TOperation>(ReadOnlySpan<double> values, Span<double> total)
        where TOperation : struct, IOperation
    {
        Spans.RequireLength(values.Length, total.Length, nameof(total));
        ref double from = ref MemoryMarshal.GetReference(values);
        ref double to = ref MemoryMarshal.GetReference(total);
        nuint s = 0, length = (nuint)values.Length;
        for (; s + 8 <= length; s += 8)
            TOperation.Of(Vector512.LoadUnsafe(ref from, s), Vector512.LoadUnsafe(ref to, s)).StoreUnsafe(ref to, s);
        for (int i = (int)s; i < values.Length; i++)
            total[i] = TOperation.Of(values[i], total[i]);
    }

    private readonly struct Sum : IOperation
    {
        public static double Of(double value, double total) => Add(value, total);

        public static Vector512<double> Of(Vector512<double> value, Vector512<double> total) => total + value;
    }

    private readonly struct Difference : IOperation
    {
        public static double Of(double value, double total) => Subtract(value, total);

        public static Vector512<double> Of(Vector512<double> value, Vector512<double> total) => total - value;
    }

    private readonly struct Quotient : IOperation
    {
        public static double Of(double value, double total) => DivideBy(value, total);

        public static Vector512<double> Of(Vector512<double> value, Vector512<double> total) => total / value;
    }

    private readonly struct Negative : IOperation
    {
        public static double Of(double value, double total) => Negate(value);

        public static Vector512<double> Of(Vector512<double> value, Vector512<double> total) => -value;
    }

    private readonly struct Root : IOperation
    {
        public static double Of(double value, double total) => SquareRoot(value);

        public static Vector512<double> Of(Vector512<double> value, Vector512<double> total) => Vector512.Sqrt(value);
    }
}
