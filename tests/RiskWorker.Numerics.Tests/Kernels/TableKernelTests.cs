using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

/// <summary>The kernels that evaluate tables: a sum in four variables, the scale from a boundary, branches and bands.</summary>
public sealed class TableKernelTests
{
    private const double Guard = 6.5;

    [Fact]
    public void Add_in_four_variables_every_length_and_alignment_equals_the_scalar_form()
    {
        var numbers = new SeededNumbers(401);
        for (int length = 0; length <= 130; length++)
        {
            int rows = 1 + (length % 3), columns = 1 + (length % 4), depth = 1 + (length % 5);
            double[] coefficients = numbers.Between(-2, 2, rows * columns * depth * (1 + (length % 6)));
            double[] z = numbers.Between(-1, 1, length), w = numbers.Between(-1, 1, length), u = numbers.Between(-1, 1, length), v = numbers.Between(-1, 1, length);
            GuardedBuffer<double> profit = Filled(numbers.Between(-10, 10, length), length % 7);
            double[] before = profit.Span.ToArray();
            FourVariableSum.Add(coefficients, rows, columns, depth, z, w, u, v, profit.Span);
            for (int s = 0; s < length; s++)
                BitAssert.Equal(FourVariableSum.AddInTurn(coefficients, rows, columns, depth, z[s], w[s], u[s], v[s], before[s]), profit.Span[s], $"{s} of {length}:");
            profit.AssertIntact();
        }
    }

    [Fact]
    public void Add_in_four_variables_of_known_polynomials_gives_their_values()
    {
        double[] profit = [1, 1];
        FourVariableSum.Add([5, -3], 1, 1, 1, [2, -1], [9, 9], [9, 9], [9, 9], profit); // 5 - 3z
        Assert.Equal([0.0, 9.0], profit);
        FourVariableSum.Add([0, 0, 2], 1, 1, 3, [7, 7], [9, 9], [9, 9], [0.5, 2], profit); // 2 T_2(v) = 4v² - 2
        Assert.Equal([-1.0, 23.0], profit);
        FourVariableSum.Add([1, 2, 3, 4], 2, 2, 1, [7, 7], [0.5, 2], [3, -1], [9, 9], profit); // 1 + 2u + w(3 + 4u)
        Assert.Equal([-1 + 7 + (0.5 * 15), 23 - 1 + (2.0 * -1)], profit);
    }

    [Fact]
    public void Add_in_four_variables_of_a_faulty_shape_is_refused()
    {
        double[] eight = new double[8], nine = new double[9];
        Assert.Throws<ArgumentException>(() => FourVariableSum.Add([], 1, 1, 1, eight, eight, eight, eight, eight));
        Assert.Throws<ArgumentException>(() => FourVariableSum.Add([1, 2, 3], 2, 1, 1, eight, eight, eight, eight, eight));
        Assert.Throws<ArgumentException>(() => FourVariableSum.Add([1], 0, 1, 1, eight, eight, eight, eight, eight));
        Assert.Throws<ArgumentException>(() => FourVariableSum.Add([1], 1, 1, 1, eight, eight, nine, eight, eight));
    }

    [Fact]
    public void Boundary_scale_goes_from_minus_one_at_the_boundary_to_one_at_the_end()
    {
        Assert.Equal(-1, BoundaryScale.Of(-0.25, -0.25, 0.5));
        Assert.Equal(1, BoundaryScale.Of(0.5, -0.25, 0.5));
        Assert.Equal(-1.5, BoundaryScale.Of(0.75, 0.5, -0.5)); // beyond a boundary that lies above the end
        var numbers = new SeededNumbers(403);
        for (int length = 0; length <= 100; length++)
        {
            double[] x = numbers.Between(-1, 1, length), boundary = numbers.Between(-1, 0.5, length), u = [.. boundary];
            BoundaryScale.Apply(x, u, 0.75, u);
            for (int s = 0; s < length; s++)
                BitAssert.Equal(BoundaryScale.Of(x[s], boundary[s], 0.75), u[s], $"{s} of {length}:");
        }
    }

    [Fact]
    public void Branches_of_every_length_equal_the_scalar_form()
    {
        var numbers = new SeededNumbers(404);
        for (int length = 0; length <= 100; length++)
        {
            double[] at = numbers.Between(-2, 2, length), other = numbers.Between(5, 6, length), value = numbers.Between(1, 2, length);
            if (length > 0) at[0] = double.NaN;
            if (length > 9) at[9] = -1;
            double[] joined = [.. value], exercised = [.. value];
            Branch.From(at, -1, other, joined);
            Branch.ExerciseBelow(at, -1, other, 9, -1, exercised);
            for (int s = 0; s < length; s++)
            {
                BitAssert.Equal(Branch.From(at[s], -1, other[s], value[s]), joined[s], $"{s} of {length}:");
                BitAssert.Equal(Branch.ExerciseBelow(at[s], -1, other[s], 9, -1, value[s]), exercised[s], $"{s} of {length}:");
            }
        }

        Assert.Equal((7, 2, 2), (Branch.From(1, 1, 7, 2), Branch.From(0.9, 1, 7, 2), Branch.From(double.NaN, 1, 7, 2)));
        Assert.Equal((2, 3, 2), (Branch.ExerciseBelow(-1, -1, 6, 9, -1, 2), Branch.ExerciseBelow(-1.1, -1, 6, 9, -1, 2), Branch.ExerciseBelow(double.NaN, -1, 6, 9, -1, 2)));
    }

    [Fact]
    public void Band_of_every_length_finds_the_one_that_lies_outside()
    {
        for (int length = 0; length <= 40; length++)
        {
            double[] x = new double[length];
            Array.Fill(x, 0.5);
            Assert.True(Band.Holds(x, 0.5, 0.5));
            for (int s = 0; s < length; s++)
            {
                foreach (double outside in new[] { 0.4, 0.6, double.NaN })
                {
                    x[s] = outside;
                    Assert.False(Band.Holds(x, 0.5, 0.5), $"{outside} at {s} of {length}");
                    Assert.False(Band.Holds(outside, 0.5, 0.5));
                }

                x[s] = 0.5;
            }
        }
    }

    private static GuardedBuffer<double> Filled(double[] values, int offset)
    {
        var buffer = new GuardedBuffer<double>(values.Length, Guard, offset);
        values.CopyTo(buffer.Span);
        return buffer;
    }
}
