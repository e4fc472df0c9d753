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

    /// <summary>value·other.</summary>
    public static double Product(double value, double other) => value * other;

    /// <summary>value·factor.</summary>
    public static double Scale(double value, double factor) => value * factor;

    /// <summary>product[s] = values[s]·others[s].</summary>
    /// <param name="values">Numbers.</param>
    /// <param name="others">As many.</param>
    /// <param name="product">As many; may be the memory of either.</param>
    [ScalarTwin(nameof(Product))]
    public static void Product(ReadOnlySpan<double> values, ReadOnlySpan<double> others, Span<double> product)
    {
        Spans.RequireLength(values.Length, others.Length, nameof(others));
        Spans.RequireLength(values.Length, product.Length, nameof(product));
        Spans.RequireSameOrApart(values, product, nameof(product));
        Spans.RequireSameOrApart(others, product, nameof(product));
        ref double one = ref MemoryMarshal.GetReference(values);
        ref double other = ref MemoryMarshal.GetReference(others);
        ref double to = ref MemoryMarshal.GetReference(product);
        nuint s = 0, length = (nuint)values.Length;
        for (; s + 8 <= length; s += 8)
            (Vector512.LoadUnsafe(ref one, s) * Vector512.LoadUnsafe(ref other, s)).StoreUnsafe(ref to, s);
        for (int i = (int)s; i < values.Length; i++)
            product[i] = Product(values[i], others[i]);
    }

    /// <summary>scaled[s] = values[s]·factor.</summary>
    /// <param name="values">Numbers.</param>
    /// <param name="factor">What they are multiplied by.</param>
    /// <param name="scaled">As many; may be the same memory.</param>
    [ScalarTwin(nameof(Scale))]
    public static void Scale(ReadOnlySpan<double> values, double factor, Span<double> scaled)
    {
        Spans.RequireLength(values.Length, scaled.Length, nameof(scaled));
        Spans.RequireSameOrApart(values, scaled, nameof(scaled));
        ref double from = ref MemoryMarshal.GetReference(values);
        ref double to = ref MemoryMarshal.GetReference(scaled);
        Vector512<double> factors = Vector512.Create(factor);
        nuint s = 0, length = (nuint)values.Length;
        for (; s + 8 <= length; s += 8)
            (Vector512.LoadUnsafe(ref from, s) * factors).StoreUnsafe(ref to, s);
        for (int i = (int)s; i < values.Length; i++)
            scaled[i] = Scale(values[i], factor);
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
