using System.Runtime.Intrinsics;
using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

/// <summary>What every unary kernel must do: one class a kernel derives from this.</summary>
public abstract class UnaryKernelTests<TKernel>
    where TKernel : struct, IUnaryKernel
{
    private const double Guard = 12345.678;

    /// <summary>Ranges in which the kernel takes each of its branches.</summary>
    protected abstract (double Low, double High)[] Ranges { get; }

    /// <summary>Exact values at special points.</summary>
    protected abstract (double X, double Expected)[] SpecialValues { get; }

    [Fact]
    public void Apply_every_length_and_alignment_equals_the_scalar_form()
    {
        var numbers = new SeededNumbers(11);
        for (int length = 0; length <= 257; length++)
        {
            var source = new GuardedBuffer<double>(length, Guard, length % 7);
            var destination = new GuardedBuffer<double>(length, Guard, length % 3);
            for (int i = 0; i < length; i++)
                source.Span[i] = Draw(numbers, i);
            UnaryKernel.Apply<TKernel>(source.Span, destination.Span);
            for (int i = 0; i < length; i++)
                BitAssert.Equal(TKernel.Of(source.Span[i]), destination.Span[i], $"f({source.Span[i]:R}) at {i} of {length}:");
            destination.AssertIntact();
        }
    }

    [Fact]
    public void Vector_form_equals_the_scalar_form_in_all_ranges()
    {
        var numbers = new SeededNumbers(12);
        Span<double> lanes = stackalloc double[8];
        for (int i = 0; i < 20_000; i++)
        {
            for (int lane = 0; lane < 8; lane++)
                lanes[lane] = Draw(numbers, i);
            AssertLanes(lanes);
        }
    }

    [Fact]
    public void Vector_form_equals_the_scalar_form_for_any_bit_pattern()
    {
        var numbers = new SeededNumbers(13);
        Span<double> lanes = stackalloc double[8];
        for (int i = 0; i < 20_000; i++)
        {
            // One odd lane among ordinary ones as often as eight odd ones.
            for (int lane = 0; lane < 8; lane++)
                lanes[lane] = (i & 1) == 0 || lane == i % 8 ? numbers.AnyDouble() : Draw(numbers, lane);
            AssertLanes(lanes);
        }
    }

    [Fact]
    public void Special_values_are_exact_in_both_forms()
    {
        foreach ((double x, double expected) in SpecialValues)
        {
            BitAssert.Equal(expected, TKernel.Of(x), $"f({x:R}):");
            BitAssert.Equal(expected, TKernel.Of(Vector512.Create(x)).GetElement(5), $"vector f({x:R}):");
        }
    }

    [Fact]
    public void NaN_comes_back_as_it_came()
    {
        ulong odd = 0xFFF80000_0000BEEFUL;
        double nan = BitConverter.UInt64BitsToDouble(odd);
        Assert.Equal(odd, BitConverter.DoubleToUInt64Bits(TKernel.Of(nan)));
        Assert.Equal(odd, BitConverter.DoubleToUInt64Bits(TKernel.Of(Vector512.Create(nan)).GetElement(2)));
    }

    [Fact]
    public void Apply_in_place_equals_apply_apart()
    {
        var numbers = new SeededNumbers(14);
        double[] source = new double[101], apart = new double[101];
        for (int i = 0; i < source.Length; i++)
            source[i] = Draw(numbers, i);
        UnaryKernel.Apply<TKernel>(source, apart);
        UnaryKernel.Apply<TKernel>(source, source);
        BitAssert.Equal(apart, source);
    }

    [Fact]
    public void Apply_short_or_overlapping_destination_is_refused()
    {
        double[] memory = new double[20];
        var tooShort = Assert.Throws<ArgumentException>(() => UnaryKernel.Apply<TKernel>(memory.AsSpan(0, 9), memory.AsSpan(10, 8)));
        Assert.Contains("8 elements; it must have at least 9", tooShort.Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => UnaryKernel.Apply<TKernel>(memory.AsSpan(0, 9), memory.AsSpan(1, 9)));
    }

    [Fact]
    public void Apply_allocates_nothing()
    {
        double[] source = new SeededNumbers(15).Between(0.1, 0.9, 1000), destination = new double[1000];
        Assert.Equal(0, Allocations.FewestOf(() => UnaryKernel.Apply<TKernel>(source, destination)));
    }

    private static void AssertLanes(ReadOnlySpan<double> lanes)
    {
        Vector512<double> result = TKernel.Of(Vector512.Create(lanes));
        for (int lane = 0; lane < 8; lane++)
            BitAssert.Equal(TKernel.Of(lanes[lane]), result.GetElement(lane), $"f({lanes[lane]:R}):");
    }

    private double Draw(SeededNumbers numbers, int i)
    {
        (double low, double high) = Ranges[i % Ranges.Length];
        return numbers.Between(low, high);
    }
}
