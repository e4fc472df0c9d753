using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>How often the tests with exact laws reject a right model at 5%: a count takes few values, so that this is less than 5%.</summary>
public static class AttainableSizes
{
    /// <summary>Sizes of the tests by count, in the order of <see cref="StatisticalTestNames"/>: first two, independence, and where it is enumerated conditional coverage.</summary>
    public static IReadOnlyList<(string Name, double Size)> Of(int days, Confidence confidence, NullLaws laws)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(days, 2);
        var sizes = new List<(string, double)>
        {
            (StatisticalTestNames.KupiecFailures, Rounded(KupiecTests.FailuresLaw(days, confidence, laws))),
            (StatisticalTestNames.KupiecFirstFailure, Rounded(KupiecTests.FirstFailureLaw(days, confidence, laws))),
            (StatisticalTestNames.ChristoffersenIndependence, Significant.Of(Independence(days, confidence, laws))),
        };
        if (days <= ChristoffersenTests.MostEnumerated) sizes.Add((StatisticalTestNames.ChristoffersenConditional, Rounded(ChristoffersenTests.ConditionalLaw(days, confidence, laws))));
        return sizes;
    }

    // Given each count, weighted by its probability; counts that are less likely than rounding are left out.
    private static double Independence(int days, Confidence confidence, NullLaws laws)
    {
        var (count, size) = (new CountLaw(days, 1 - confidence.Level), 0.0);
        for (var x = count.First; x <= count.Last; x++)
        {
            if (count[x] > 1e-18) size += count[x] * ChristoffersenTests.IndependenceLaw(days, x, laws).SizeAt(StatisticalTest.Level);
        }
        return size;
    }

    private static double Rounded(NullLaw law) => Significant.Of(law.SizeAt(StatisticalTest.Level));
}
