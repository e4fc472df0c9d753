using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// e^x. Error below 0.65 ulp (measured at 200,000 points); 0 below -745.14, infinity above 709.79, subnormal results with one rounding more.
/// </summary>
/// <remarks>
/// x = n ln 2 + r with |r| at most ln(2)/2; e^r = 1 + r + r² q(r); 2^n is applied in two halves so that neither overflows
/// nor loses a subnormal. ln 2 is carried in two pieces of which the first has 42 bits, so that n times it is exact; what the
/// sum of 1 and the head of r loses is added back, so that nearly all of the error is the last rounding.
/// q: minimax fit by Remez in 50 digits on |r| below 1.0005 ln(2)/2, with q(0) = 1/2 held; relative error of e^r 8e-20.
/// </remarks>
public readonly struct Exponential : IUnaryKernel
{
    // Beyond these the result is 0 or infinite, and half the exponent still fits a double's.
    private const double Lowest = -746.0;
    private const double Highest = 710.0;

    private const double Log2E = 1.4426950408889634;
    private const double Ln2Head = 0.6931471805598903;
    private const double Ln2Tail = 5.497923018708371e-14;

    // Adding 1.5·2^52 rounds to an integer and leaves it in the low bits; with the exponent's bias added, a shift by 52
    // turns those bits into a power of two.
    private const double Integer = 6755399441055744.0;
    private const double Exponent = 6755399441055744.0 + 1023.0;

    private const double Q1 = 0.16666666666666688;
    private const double Q2 = 0.041666666666666845;
    private const double Q3 = 0.008333333333312902;
    private const double Q4 = 0.0013888888888756673;
    private const double Q5 = 0.00019841269906387485;
    private const double Q6 = 2.480158763072678e-05;
    private const double Q7 = 2.755722511786408e-06;
    private const double Q8 = 2.7556978231913785e-07;
    private const double Q9 = 2.511534305408399e-08;
    private const double Q10 = 2.1014405094584057e-09;

    /// <inheritdoc/>
    public static double Of(double x)
    {
        double value = OfSum(x, 0.0);
        return double.IsNaN(x) ? x : value;
    }

    /// <inheritdoc/>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Of(Vector512<double> x) =>
        Vector512.ConditionalSelect(Vector512.Equals(x, x), OfSum(x, Vector512<double>.Zero), x);

    /// <summary>e^x for each element; see <see cref="UnaryKernel.Apply"/>.</summary>
    [ScalarTwin(nameof(Of))]
    public static void Of(ReadOnlySpan<double> source, Span<double> destination) =>
        UnaryKernel.Apply<Exponential>(source, destination);

    /// <summary>e^(head + tail) where the tail is below an ulp of the head; a NaN gives no defined value.</summary>
    internal static double OfSum(double head, double tail)
    {
        double x = head < Lowest ? Lowest : head;
        x = x > Highest ? Highest : x;
        double n = Math.FusedMultiplyAdd(x, Log2E, Integer) - Integer;
        double half = Math.FusedMultiplyAdd(n, 0.5, Exponent);
        double rest = n - (half - Exponent) + Exponent;
        return Reduced(x, tail, n) * PowerOfTwo(half) * PowerOfTwo(rest);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    internal static Vector512<double> OfSum(Vector512<double> head, Vector512<double> tail)
    {
        Vector512<double> lowest = Vector512.Create(Lowest), highest = Vector512.Create(Highest);
        Vector512<double> integer = Vector512.Create(Integer), exponent = Vector512.Create(Exponent);
        Vector512<double> x = Vector512.ConditionalSelect(Vector512.LessThan(head, lowest), lowest, head);
        x = Vector512.ConditionalSelect(Vector512.GreaterThan(x, highest), highest, x);
        Vector512<double> n = Vector512.FusedMultiplyAdd(x, Vector512.Create(Log2E), integer) - integer;
        Vector512<double> half = Vector512.FusedMultiplyAdd(n, Vector512.Create(0.5), exponent);
        Vector512<double> rest = n - (half - exponent) + exponent;
        return Reduced(x, tail, n) * PowerOfTwo(half) * PowerOfTwo(rest);
    }

    /// <summary>e^x for -708 ≤ x ≤ 709, where 2^n is one normal number; outside it gives no defined value.</summary>
    internal static double OfNormal(double x)
    {
        double shifted = Math.FusedMultiplyAdd(x, Log2E, Exponent);
        return Reduced(x, 0.0, shifted - Exponent) * PowerOfTwo(shifted);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    internal static Vector512<double> OfNormal(Vector512<double> x)
    {
        Vector512<double> exponent = Vector512.Create(Exponent);
        Vector512<double> shifted = Vector512.FusedMultiplyAdd(x, Vector512.Create(Log2E), exponent);
        return Reduced(x, Vector512<double>.Zero, shifted - exponent) * PowerOfTwo(shifted);
    }

    private static double Reduced(double x, double tail, double n)
    {
        double head = Math.FusedMultiplyAdd(n, -Ln2Head, x);
        double rest = Math.FusedMultiplyAdd(n, -Ln2Tail, tail);
        double r = head + rest;
        double q = Math.FusedMultiplyAdd(Q10, r, Q9);
        q = Math.FusedMultiplyAdd(q, r, Q8);
        q = Math.FusedMultiplyAdd(q, r, Q7);
        q = Math.FusedMultiplyAdd(q, r, Q6);
        q = Math.FusedMultiplyAdd(q, r, Q5);
        q = Math.FusedMultiplyAdd(q, r, Q4);
        q = Math.FusedMultiplyAdd(q, r, Q3);
        q = Math.FusedMultiplyAdd(q, r, Q2);
        q = Math.FusedMultiplyAdd(q, r, Q1);
        q = Math.FusedMultiplyAdd(q, r, 0.5);
        rest = Math.FusedMultiplyAdd(r * r, q, rest);
        double sum = 1.0 + head;
        return sum + (1.0 - sum + head + rest);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector512<double> Reduced(Vector512<double> x, Vector512<double> tail, Vector512<double> n)
    {
        Vector512<double> one = Vector512.Create(1.0);
        Vector512<double> head = Vector512.FusedMultiplyAdd(n, Vector512.Create(-Ln2Head), x);
        Vector512<double> rest = Vector512.FusedMultiplyAdd(n, Vector512.Create(-Ln2Tail), tail);
        Vector512<double> r = head + rest;
        Vector512<double> q = Vector512.FusedMultiplyAdd(Vector512.Create(Q10), r, Vector512.Create(Q9));
        q = Vector512.FusedMultiplyAdd(q, r, Vector512.Create(Q8));
        q = Vector512.FusedMultiplyAdd(q, r, Vector512.Create(Q7));
        q = Vector512.FusedMultiplyAdd(q, r, Vector512.Create(Q6));
        q = Vector512.FusedMultiplyAdd(q, r, Vector512.Create(Q5));
        q = Vector512.FusedMultiplyAdd(q, r, Vector512.Create(Q4));
        q = Vector512.FusedMultiplyAdd(q, r, Vector512.Create(Q3));
        q = Vector512.FusedMultiplyAdd(q, r, Vector512.Create(Q2));
        q = Vector512.FusedMultiplyAdd(q, r, Vector512.Create(Q1));
        q = Vector512.FusedMultiplyAdd(q, r, Vector512.Create(0.5));
        rest = Vector512.FusedMultiplyAdd(r * r, q, rest);
        Vector512<double> sum = one + head;
        return sum + (one - sum + head + rest);
    }

    private static double PowerOfTwo(double shifted) =>
        BitConverter.UInt64BitsToDouble(BitConverter.DoubleToUInt64Bits(shifted) << 52);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector512<double> PowerOfTwo(Vector512<double> shifted) => (shifted.AsUInt64() << 52).AsDouble();
}
