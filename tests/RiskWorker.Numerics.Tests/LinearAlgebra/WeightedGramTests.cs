using RiskWorker.Numerics.LinearAlgebra;

namespace RiskWorker.Numerics.Tests.LinearAlgebra;

public sealed class WeightedGramTests
{
    [Fact]
    public void Of_any_size_equals_the_scalar_sums_bit_for_bit()
    {
        for (var n = 0; n <= 50; n++)
        {
            var length = n % 7 == 0 ? n / 7 : 3 * n;
            var rows = Matrices.Shocks(n, length, seed: n);
            var weights = Matrices.Shocks(1, length, seed: 1000 + n);

            var gram = WeightedGram.Of(rows, n, weights);

            for (var i = 0; i < n; i++)
            {
                for (var j = i; j < n; j++)
                {
                    var sum = 0.0;
                    for (var t = 0; t < length; t++) sum = Math.FusedMultiplyAdd(weights[t] * rows[(i * length) + t], rows[(j * length) + t], sum);
                    Assert.Equal(sum, gram[(i * n) + j]);
                    Assert.Equal(sum, gram[(j * n) + i]);
                }
            }
        }
    }

    [Fact]
    public void Of_two_rows_gives_sums_worked_by_hand() =>
        Assert.Equal([1 + 8 + 27, 4 + 20 + 54, 4 + 20 + 54, 16 + 50 + 108], WeightedGram.Of([1, 2, 3, 4, 5, 6], 2, [1, 2, 3]));

    [Fact]
    public void Of_equal_rows_in_different_panels_has_equal_entries()
    {
        var rows = Matrices.Shocks(40, 100, seed: 3);
        rows.AsSpan(0, 100).CopyTo(rows.AsSpan(39 * 100));
        var weights = Enumerable.Repeat(1.0, 100).ToArray();

        var gram = WeightedGram.Of(rows, 40, weights);

        Assert.Equal(gram[0], gram[39]);
        Assert.Equal(gram[0], gram[(39 * 40) + 39]);
    }

    [Fact]
    public void Of_rows_that_do_not_fit_their_weights_names_both_lengths() =>
        Assert.Contains("5 elements; 2 rows under 3 weights have 6", Assert.Throws<ArgumentException>(() => WeightedGram.Of([1, 2, 3, 4, 5], 2, [1, 1, 1])).Message, StringComparison.Ordinal);
}
