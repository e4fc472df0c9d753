using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class ElementwiseTests
{
    private delegate void SpanForm(ReadOnlySpan<double> values, Span<double> total);

    private static readonly Dictionary<string, (SpanForm Spans, Func<double, double, double> Scalar)> Forms = new()
    {
        [nameof(Elementwise.Add)] = (Elementwise.Add, Elementwise.Add),
        [nameof(Elementwise.Subtract)] = (Elementwise.Subtract, Elementwise.Subtract),
        [nameof(Elementwise.DivideBy)] = (Elementwise.DivideBy, Elementwise.DivideBy),
        [nameof(Elementwise.Negate)] = (Elementwise.Negate, (value, _) => Elementwise.Negate(value)),
        [nameof(Elementwise.SquareRoot)] = (Elementwise.SquareRoot, (value, _) => Elementwise.SquareRoot(value)),
        [nameof(Elementwise.Scale)] = ((values, scaled) => Elementwise.Scale(values, 0.37, scaled), (value, _) => Elementwise.Scale(value, 0.37)),
        [nameof(Elementwise.Product)] = ((values, product) => Elementwise.Product(values, values, product), (value, _) => Elementwise.Product(value, value)),
        [nameof(Elementwise.AddSquare)] = ((values, total) => Elementwise.AddSquare(values, 0.7, total), (value, total) => Elementwise.AddSquare(value, 0.7, total)),
    };

    public static TheoryData<string> Names => [.. Forms.Keys];

    [Theory]
    [MemberData(nameof(Names))]
    public void Every_length_and_alignment_equals_the_scalar_form(string name)
    {
        var numbers = new SeededNumbers(111);
        for (int length = 0; length <= 257; length++)
        {
            double[] values = numbers.Between(-1e3, 1e3, length + 4), totals = numbers.Between(-1e3, 1e3, length);
            AssertForm(name, values.AsSpan(length % 5 == 4 ? 4 : length % 5, length), totals, length % 7);
        }
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void Any_bit_pattern_equals_the_scalar_form(string name)
    {
        var numbers = new SeededNumbers(112);
        double[] values = new double[10_003], totals = new double[10_003];
        for (int i = 0; i < values.Length; i++)
            (values[i], totals[i]) = (i % 3 == 0 ? 0.0 * (i - 5) : numbers.AnyDouble(), i % 5 == 0 ? -0.0 : numbers.AnyDouble());
        AssertForm(name, values, totals, 1);
    }

    [Fact]
    public void Results_are_those_of_the_arithmetic()
    {
        Assert.Equal(5, Elementwise.Add(2, 3));
        Assert.Equal(1, Elementwise.Subtract(2, 3));
        Assert.Equal(1.5, Elementwise.DivideBy(2, 3));
        BitAssert.Equal(double.NegativeInfinity, Elementwise.DivideBy(-0.0, 3));
        BitAssert.Equal(-0.0, Elementwise.Negate(0.0));
        BitAssert.Equal(0.0, Elementwise.Negate(-0.0));
        BitAssert.Equal(0.0, Elementwise.Add(-0.0, 0.0));
        BitAssert.Equal(double.NaN, Elementwise.Subtract(double.PositiveInfinity, double.PositiveInfinity));
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void Faulty_length_is_refused(string name)
    {
        Assert.Throws<ArgumentException>(() => Forms[name].Spans(new double[8], new double[9]));
        Assert.Throws<ArgumentException>(() => Forms[name].Spans(new double[9], new double[8]));
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void Allocates_nothing(string name)
    {
        SpanForm form = Forms[name].Spans;
        double[] values = new SeededNumbers(113).Between(1, 2, 1_001), totals = new double[1_001];
        Assert.Equal(0, Allocations.FewestOf(() => form(values, totals)));
    }

    private static void AssertForm(string name, ReadOnlySpan<double> values, double[] totals, int offset)
    {
        var total = new GuardedBuffer<double>(totals.Length, 3.125, offset);
        totals.CopyTo(total.Span);
        Forms[name].Spans(values, total.Span);
        for (int s = 0; s < totals.Length; s++)
            BitAssert.Equal(Forms[name].Scalar(values[s], totals[s]), total.Span[s], $"{s} of {totals.Length}, {values[s]:R} and {totals[s]:R}:");
        total.AssertIntact();
    }
}
