using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting.Evidence;
using static RiskWorker.Engine.Tests.Backtesting.Evidence.Years;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

/// <summary>Exact p-values against all 4,096 series of twelve days, one by one.</summary>
public sealed class ExactLawsTests
{
    private const int Days = 12;
    private static readonly Confidence s_confidence = new(0.8m);
    private readonly NullLaws _laws = new();

    [Fact]
    public void Failures_have_the_mass_of_all_series_as_extreme() => HoldsForAll(e => KupiecTests.Failures(e, s_confidence, _laws));

    [Fact]
    public void First_failure_has_the_mass_of_all_series_as_extreme() => HoldsForAll(e => KupiecTests.FirstFailure(e, s_confidence, _laws));

    [Fact]
    public void Conditional_coverage_has_the_mass_of_all_series_as_extreme() => HoldsForAll(e => ChristoffersenTests.Conditional(e, s_confidence, _laws));

    [Fact]
    public void Independence_has_the_share_of_the_orders_of_its_count_as_extreme()
    {
        var all = All(e => ChristoffersenTests.Independence(e, _laws));
        foreach (var group in all.GroupBy(s => s.Count))
        {
            double orders = group.Count();
            Assert.All(group, s => Assert.Equal(group.Count(o => IsAsExtreme(o.Test, s.Test)) / orders, s.Test.PValue!.Value, 1e-11));
        }
    }

    [Fact]
    public void Mixed_test_has_the_mass_of_all_series_with_as_small_a_tail_within_the_error_of_its_simulation()
    {
        var all = All(e => HaasTest.Of(e, s_confidence, _laws));
        foreach (var one in all.Where((_, number) => number % 37 == 0))
        {
            var exact = all.Where(o => Tail(o) <= Tail(one) * (1 + 1e-9)).Sum(o => o.Mass);
            Assert.Equal(exact, one.Test.PValue!.Value, (4 * Math.Sqrt(exact * (1 - exact) / HaasTest.Series)) + (1.0 / HaasTest.Series));
        }

        static double Tail((StatisticalTest Test, int Count, double Mass) series) => Judgement.ChiSquareTail(series.Test.Statistic!.Value, series.Count + 1);
    }

    [Theory]
    [InlineData(2)]
    [InlineData(3)]
    [InlineData(5)]
    public void Duration_has_the_share_of_the_orders_of_its_count_as_extreme_within_the_error_of_its_simulation(int count)
    {
        var orders = Enumerable.Range(0, 1 << Days).Where(n => int.PopCount(n) == count).Select(n => DurationTest.Of(Bits(Days, n), _laws)).ToArray();
        foreach (var one in orders.Where((_, number) => number % 7 == 0))
        {
            var exact = orders.Count(o => o.Statistic >= one.Statistic - 1e-8) / (double)orders.Length;
            Assert.Equal(exact, one.PValue!.Value, (4 * Math.Sqrt(exact * (1 - exact) / DurationTest.Series)) + (1.0 / DurationTest.Series));
        }
    }

    [Fact]
    public void Attainable_sizes_are_the_mass_of_the_series_that_reject()
    {
        var sizes = AttainableSizes.Of(Days, s_confidence, _laws);
        Func<bool[], StatisticalTest>[] tests =
        [
            e => KupiecTests.Failures(e, s_confidence, _laws),
            e => KupiecTests.FirstFailure(e, s_confidence, _laws),
            e => ChristoffersenTests.Independence(e, _laws),
            e => ChristoffersenTests.Conditional(e, s_confidence, _laws),
        ];
        Assert.Equal(tests.Length, sizes.Count);
        for (var i = 0; i < tests.Length; i++)
        {
            var all = All(tests[i]);
            Assert.Equal(all[0].Test.Name, sizes[i].Name);
            Assert.Equal(all.Where(s => s.Test.Reject == true).Sum(s => s.Mass), sizes[i].Size, 1e-11);
            Assert.InRange(sizes[i].Size, 0, 0.05);
        }
    }

    [Theory]
    [InlineData(250, 0.99, 0.013701447855203655)]
    [InlineData(250, 0.975, 0.03791525848964028)]
    [InlineData(500, 0.99, 0.019814050142193992)]
    [InlineData(500, 0.975, 0.049041424674122605)]
    public void Attainable_size_of_the_count_is_that_of_another_enumeration(int days, double confidence, double size) => // SciPy
        Assert.Equal(size, AttainableSizes.Of(days, new((decimal)confidence), _laws)[0].Size, 1e-11);

    private static void HoldsForAll(Func<bool[], StatisticalTest> test)
    {
        var all = All(test);
        foreach (var group in all.GroupBy(s => s.Test.PValue))
        {
            var one = group.First();
            Assert.Equal(all.Where(o => IsAsExtreme(o.Test, one.Test)).Sum(o => o.Mass), one.Test.PValue!.Value, 1e-11);
        }
    }

    private static bool IsAsExtreme(StatisticalTest other, StatisticalTest one) => other.Statistic >= one.Statistic - 1e-9;

    private static (StatisticalTest Test, int Count, double Mass)[] All(Func<bool[], StatisticalTest> test) =>
    [
        .. from number in Enumerable.Range(0, 1 << Days)
           let count = int.PopCount(number)
           select (test(Bits(Days, number)), count, Math.Pow(0.2, count) * Math.Pow(0.8, Days - count)),
    ];
}
