using RiskWorker.Engine.Backtesting;
using RiskWorker.Engine.Backtesting.Evidence;
using static RiskWorker.Engine.Tests.Backtesting.Evidence.Years;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

/// <summary>
/// Basel Committee, Supervisory framework for the use of backtesting (January 1996), tables 1 and 2, the second's plus from memory; MAR32.9,
/// MAR32.19, MAR33.42 to MAR33.44 by secondary texts. Binomial figures recomputed with general-purpose libraries (SciPy).
/// </summary>
public sealed class SupervisoryFiguresTests
{
    [Theory]
    [InlineData(0, 0.00, 1.50)]
    [InlineData(4, 0.00, 1.50)]
    [InlineData(5, 0.40, 1.70)]
    [InlineData(6, 0.50, 1.76)]
    [InlineData(7, 0.65, 1.83)]
    [InlineData(8, 0.75, 1.88)]
    [InlineData(9, 0.85, 1.92)]
    [InlineData(10, 1.00, 2.00)]
    [InlineData(250, 1.00, 2.00)]
    public void Count_of_a_year_has_the_published_plus_and_multiplier(int count, double plus, double multiplier)
    {
        Assert.Equal((decimal)plus, SupervisoryMultipliers.Plus1996(count));
        Assert.Equal((decimal)multiplier, SupervisoryMultipliers.Multiplier(count));
    }

    [Fact]
    public void Multiplier_begins_to_rise_where_the_zone_turns_yellow_and_ends_where_it_turns_red()
    {
        var (yellow, red) = BacktestZones.Boundaries(SupervisoryMultipliers.Days, C99);
        Assert.Equal((0, true), (SupervisoryMultipliers.AddOn(yellow - 1), SupervisoryMultipliers.AddOn(yellow) > 0));
        Assert.Equal((0.42m, 0.50m), (SupervisoryMultipliers.AddOn(red - 1), SupervisoryMultipliers.AddOn(red)));
    }

    [Fact]
    public void Desk_has_a_limit_at_the_two_published_confidences() =>
        Assert.Equal((12, 30, null), (SupervisoryMultipliers.DeskLimit(C99), SupervisoryMultipliers.DeskLimit(new(0.9750m)), SupervisoryMultipliers.DeskLimit(new(0.95m))));

    [Theory]
    [InlineData(0, 0.0810585161621813, 1)]
    [InlineData(5, 0.0666291890265265, 0.107812373096375)]
    [InlineData(10, 0.000196291439693469, 0.00025019006874051)]
    [InlineData(15, 4.37356170100053e-08, 5.12607372364159e-08)]
    public void Count_under_a_right_model_has_the_recomputed_probabilities(int count, double exactly, double typeOne)
    {
        var row = Table()[count];
        Assert.Equal(exactly, row.Exactly, 1e-11 * exactly);
        Assert.Equal(typeOne, row.TypeOne, 1e-11 * typeOne);
    }

    [Theory]
    [InlineData(5, 17.7248, 43.8719, 10.9074, 12.8202, 3.6291, 2.7003, 0.8515, 0.4571)]
    [InlineData(10, 1.7580, 96.9625, 8.6474, 77.9048, 12.7688, 45.5369, 9.6343, 19.4582)]
    [InlineData(15, 0.0132, 99.9814, 0.5185, 99.0823, 3.3978, 92.0782, 8.2445, 72.8836)]
    [InlineData(0, 0.6405, 0.0000, 0.0493, 0.0000, 0.0037, 0.0000, 0.0003, 0.0000)]
    public void Count_under_a_wrong_model_has_the_published_percentages(int count, params double[] percentages) =>
        Assert.Equal(percentages, Table()[count].Wrong.SelectMany(w => new[] { Math.Round(100 * w.Exactly, 4), Math.Round(100 * w.TypeTwo, 4) }));

    [Fact]
    public void Desk_of_a_right_model_passes_its_limits_almost_always() // P(X > 12), P(X > 30)
    {
        Assert.Equal(1.93586375545048e-06, CountErrors.Of(250, C99, [], 13)[13].TypeOne, 1e-16);
        Assert.Equal(3.88691e-13, CountErrors.Of(250, C975, [], 31)[31].TypeOne, 1e-17);
    }

    private static IReadOnlyList<CountErrorRow> Table() =>
        CountErrors.Of(250, C99, [new(0.98m), new(0.97m), new(0.96m), new(0.95m)], 15);
}
