using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// How often a rule that rejects from a count of exceptions on is wrong: a right model rejected (type I), a wrong one accepted (type II).
/// Basel Committee, Supervisory framework for the use of backtesting (January 1996), table 1, for any number of days and coverages.
/// </summary>
public static class CountErrors
{
    /// <summary>One row a count from 0 to <paramref name="last"/>.</summary>
    /// <param name="days">Days, at least 1.</param>
    /// <param name="confidence">What a right model covers.</param>
    /// <param name="actual">What wrong models cover.</param>
    /// <param name="last">Last count.</param>
    public static IReadOnlyList<CountErrorRow> Of(int days, Confidence confidence, IReadOnlyList<Confidence> actual, int last)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(last);
        var right = Tails(days, confidence, last);
        var wrong = actual.Select(c => (Coverage: c, Tails: Tails(days, c, last))).ToArray();
        return
        [
            .. from k in Enumerable.Range(0, last + 1)
               select new CountErrorRow(k, Significant.Of(right[k].Exactly), Significant.Of(right[k].AtLeast),
                   [.. wrong.Select(w => new CoverageError(w.Coverage, Significant.Of(w.Tails[k].Exactly), Significant.Of(w.Tails[k].Below)))]),
        ];
    }

    // Both tails are summed from their far ends.
    private static (double Exactly, double AtLeast, double Below)[] Tails(int days, Confidence coverage, int last)
    {
        var law = new CountLaw(days, 1 - coverage.Level);
        var tails = new (double Exactly, double AtLeast, double Below)[last + 1];
        var (above, below) = (0.0, 0.0);
        for (var k = Math.Max(law.Last, last); k >= 0; k--)
        {
            above += law[k];
            if (k <= last) tails[k] = (law[k], Math.Min(above, 1), 0);
        }
        for (var k = 0; k <= last; k++)
        {
            tails[k].Below = Math.Min(below, 1);
            below += law[k];
        }
        return tails;
    }
}

/// <summary>A count of exceptions: its probability under the right model, and that of rejecting it from this count on.</summary>
/// <param name="Exceptions">The count.</param>
/// <param name="Exactly">Its probability.</param>
/// <param name="TypeOne">The probability of as many or more.</param>
/// <param name="Wrong">The same of models that cover something else.</param>
public sealed record CountErrorRow(int Exceptions, double Exactly, double TypeOne, IReadOnlyList<CoverageError> Wrong);

/// <summary>A model of another coverage.</summary>
/// <param name="Coverage">What it covers.</param>
/// <param name="Exactly">The probability of the count.</param>
/// <param name="TypeTwo">The probability of fewer: that of accepting it.</param>
public sealed record CoverageError(Confidence Coverage, double Exactly, double TypeTwo);
