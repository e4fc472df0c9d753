using RiskWorker.Engine.Pricing.Curves;
using RiskWorker.TestKit;

namespace RiskWorker.Engine.Tests.Pricing.Curves;

public sealed class LinearFormTests
{
    private static readonly LinearForm s_form = LinearForm.Of(5, 0.5, 2, 0.25).Plus(LinearForm.Of(1.5));

    private static LinearForm Form(SeededNumbers numbers)
    {
        var form = LinearForm.Of((int)(numbers.Unit() * 3));
        for (var i = 0; i < 3; i++) form = form.Plus(LinearForm.Of((int)(numbers.Unit() * 4), (int)(numbers.Unit() * 3) - 1));
        return form;
    }

    [Fact]
    public void Of_two_factors_orders_them()
    {
        Assert.Equal([2, 5], s_form.Factors.ToArray());
        Assert.Equal([0.25, 0.5], s_form.Coefficients.ToArray());
        Assert.Equal("1.5 + 0.25 x[2] + 0.5 x[5]", s_form.ToString());
    }

    [Fact]
    public void Of_one_factor_twice_adds_and_of_no_weight_drops_it()
    {
        Assert.Equal(LinearForm.Of(3, 0.75), LinearForm.Of(3, 0.5, 3, 0.25));
        Assert.Equal(LinearForm.Of(3, 0.5), LinearForm.Of(3, 0.5, 4, 0));
        Assert.Equal(LinearForm.Zero, LinearForm.Of(3, 0.5, 3, -0.5));
        Assert.Equal(0, LinearForm.Of(3, 0).Factors.Length);
    }

    [Fact]
    public void Sums_differences_and_multiples_go_by_coefficient()
    {
        var other = LinearForm.Of(5, -0.5, 0, 2);
        Assert.Equal(LinearForm.Of(0, 2, 2, 0.25).Plus(LinearForm.Of(1.5)), s_form.Plus(other));
        Assert.Equal(LinearForm.Of(0, -2, 2, 0.25).Plus(LinearForm.Of(5, 1)).Plus(LinearForm.Of(1.5)), s_form.Minus(other));
        Assert.Equal(LinearForm.Of(5, -1, 2, -0.5).Plus(LinearForm.Of(-3)), s_form.Times(-2));
        Assert.Equal(LinearForm.Zero, s_form.Minus(s_form));
        Assert.Equal(LinearForm.Zero, s_form.Times(0));
        Assert.Equal(s_form, s_form.Plus(LinearForm.Zero));
    }

    [Fact]
    public void At_is_a_chain_of_fused_multiply_adds_by_ascending_factor()
    {
        double[] levels = [7, 8, 0.1, 9, 10, 0.3];
        BitAssert.Equal(Math.FusedMultiplyAdd(0.5, 0.3, Math.FusedMultiplyAdd(0.25, 0.1, 1.5)), s_form.At(levels));
        Assert.Equal(-2, LinearForm.Of(-2).At([]));
        Assert.Equal(0, LinearForm.Zero.At([]));
    }

    [Fact]
    public void At_is_NaN_only_where_a_level_that_it_needs_is()
    {
        Assert.Equal(1.625, s_form.At([double.NaN, double.NaN, 0.5, double.NaN, double.NaN, 0]));
        Assert.Equal(double.NaN, s_form.At([0, 0, 0.5, 0, 0, double.NaN]));
    }

    // Over all pairs of many small forms: order, equality and hash say the same, and the order is one.
    [Fact]
    public void CompareTo_and_Equals_agree_and_the_order_is_total()
    {
        var numbers = new SeededNumbers(2);
        LinearForm[] forms = [.. Enumerable.Range(0, 120).Select(_ => Form(numbers))];
        var equal = 0;
        foreach (var a in forms)
        {
            foreach (var b in forms)
            {
                Assert.Equal(a.Equals(b), a.CompareTo(b) == 0);
                Assert.Equal(Math.Sign(a.CompareTo(b)), -Math.Sign(b.CompareTo(a)));
                if (!a.Equals(b)) continue;
                equal++;
                Assert.Equal(a.GetHashCode(), b.GetHashCode());
            }
        }
        Assert.True(equal > forms.Length, "No two forms were equal: the test compares nothing.");
        var sorted = forms.Order().ToArray();
        for (var i = 2; i < sorted.Length; i++) Assert.True(sorted[i - 2].CompareTo(sorted[i]) <= 0);
    }

    [Fact]
    public void CompareTo_puts_the_shorter_form_first_and_then_goes_by_coefficient_and_constant()
    {
        LinearForm[] ascending = [LinearForm.Of(-1), LinearForm.Of(9), LinearForm.Of(0, 1), LinearForm.Of(0, 2), LinearForm.Of(0, 1, 1, 1), LinearForm.Of(1, -5)];
        Assert.Equal(ascending, ascending.Reverse().Order());
        Assert.True(LinearForm.Zero.CompareTo(null) > 0);
        Assert.False(LinearForm.Zero.Equals(null));
    }

    [Fact]
    public void Of_numbers_that_are_not_finite_or_a_place_below_0_is_refused()
    {
        Assert.Throws<ArgumentException>(() => LinearForm.Of(double.NaN));
        Assert.Throws<ArgumentException>(() => LinearForm.Of(1, double.PositiveInfinity));
        Assert.Throws<ArgumentOutOfRangeException>(() => LinearForm.Of(-1, 1.0));
    }

    [Fact]
    public void Of_minus_zero_is_zero() => BitAssert.Equal(0.0, LinearForm.Of(-0.0).At([]));
}
