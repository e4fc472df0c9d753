using RiskWorker.Numerics.Distributions;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Optimisation;

namespace RiskWorker.Numerics.Statistics;

/// <summary>
/// Degrees of freedom of a t copula where the whole correlation is singular and has no likelihood: by the mean of the likelihoods of pairs
/// of factors (composite likelihood: Varin, Reid and Firth 2011).
/// </summary>
/// <remarks>The mean counts n days: its interval is that of pairs which all tell the same, and wide where they do not.</remarks>
public static class CopulaPairLikelihood
{
    /// <summary>The fit.</summary>
    /// <param name="scores">A row a factor, row-major: normal scores; see <see cref="CopulaLikelihood.NormalScores"/>.</param>
    /// <param name="factors">Rows, at least 2.</param>
    /// <param name="pairs">At least one.</param>
    /// <param name="weights">One a day, 0 or more; none at all means equal ones.</param>
    /// <exception cref="ArgumentException">A score is not finite, a pair faulty, or a length wrong.</exception>
    public static DegreesOfFreedomFit Fit(ReadOnlySpan<double> scores, int factors, ReadOnlySpan<CopulaPair> pairs, ReadOnlySpan<double> weights = default)
    {
        int days = CopulaLikelihood.DaysOf(scores, factors);
        RequirePairs(pairs, factors);
        double[] normals = scores.ToArray(), variates = new double[scores.Length], joint = new double[days], room = new double[days];
        double[] own = new double[factors], means = new double[pairs.Length];
        CopulaPair[] held = pairs.ToArray();
        var dayWeights = DayWeights.Of(weights, days);
        double AtNormal()
        {
            for (int j = 0; j < factors; j++)
                own[j] = MeanSquare(Row(normals, j, days), dayWeights, room);
            for (int i = 0; i < held.Length; i++)
            {
                Squares(normals, held[i], days, joint);
                means[i] = -0.5 * (dayWeights.Mean(joint) - own[held[i].First] - own[held[i].Second] + Logarithm.Of(Spread(held[i])));
            }

            return LaneSum.Of(means) / means.Length;
        }

        double At(double nu)
        {
            MarginMap.OfNormalScore(nu).Of(normals, variates);
            for (int j = 0; j < factors; j++)
            {
                joint.AsSpan().Clear();
                Elementwise.AddSquare(Row(variates, j, days), 1.0, joint);
                own[j] = dayWeights.MeanLogOnePlus(joint, nu, room);
            }

            for (int i = 0; i < held.Length; i++)
            {
                Squares(variates, held[i], days, joint);
                double margins = own[held[i].First] + own[held[i].Second];
                means[i] = CopulaLikelihood.Term(nu, 2, margins, dayWeights.MeanLogOnePlus(joint, nu, room)) - (0.5 * Logarithm.Of(Spread(held[i])));
            }

            return LaneSum.Of(means) / means.Length;
        }

        return DegreesOfFreedomSearch.Maximise(nu => dayWeights.Effective * At(nu), dayWeights.Effective * AtNormal(), dayWeights.Effective);
    }

    private static double Spread(CopulaPair pair) => Math.FusedMultiplyAdd(-pair.Correlation, pair.Correlation, 1.0);

    private static ReadOnlySpan<double> Row(double[] rows, int row, int days) => rows.AsSpan(row * days, days);

    private static double MeanSquare(ReadOnlySpan<double> values, DayWeights weights, double[] room)
    {
        room.AsSpan().Clear();
        Elementwise.AddSquare(values, 1.0, room);
        return weights.Mean(room);
    }

    // x² + (y - r x)²/(1 - r²): the quadratic form of a pair without cancellation.
    private static void Squares(double[] rows, CopulaPair pair, int days, double[] squares)
    {
        ReadOnlySpan<double> x = Row(rows, pair.First, days), y = Row(rows, pair.Second, days);
        double spread = Spread(pair);
        for (int t = 0; t < days; t++)
        {
            double rest = Math.FusedMultiplyAdd(-pair.Correlation, x[t], y[t]);
            squares[t] = Math.FusedMultiplyAdd(x[t], x[t], rest * rest / spread);
        }
    }

    private static void RequirePairs(ReadOnlySpan<CopulaPair> pairs, int factors)
    {
        if (pairs.IsEmpty)
            throw new ArgumentException("There are no pairs; there must be at least one.", nameof(pairs));
        for (int i = 0; i < pairs.Length; i++)
        {
            (int first, int second, double r) = pairs[i];
            if (first < 0 || first >= factors || second < 0 || second >= factors || first == second)
                throw new ArgumentException($"Pair {i} has the factors {first} and {second}; they must be two different ones of 0 to {factors - 1}.", nameof(pairs));
            if (!(Math.Abs(r) < 1.0))
                throw new ArgumentException($"Pair {i} has the correlation {r}; it must lie strictly between -1 and 1.", nameof(pairs));
        }
    }
}
