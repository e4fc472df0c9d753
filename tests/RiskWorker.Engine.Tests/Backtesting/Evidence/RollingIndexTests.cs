using System.Text.Json;
using RiskWorker.Engine.Backtesting.Evidence;
using static RiskWorker.Engine.Tests.Backtesting.Evidence.Years;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

/// <summary>Ten rolling backtests of stock indices against ratios from general-purpose libraries (Data/backtests/README.md).</summary>
public sealed class RollingIndexTests
{
    private static readonly NullLaws s_laws = new();
    private static readonly JsonElement s_cases =
        JsonDocument.Parse(File.ReadAllText(Path.Combine(AppContext.BaseDirectory, "Data", "backtests", "eustock-rolling.json"))).RootElement.GetProperty("cases");

    public static TheoryData<int> Cases => [.. Enumerable.Range(0, s_cases.GetArrayLength())];

    [Theory]
    [MemberData(nameof(Cases))]
    public void Ratios_of_a_rolling_backtest_are_the_recomputed_ones(int at)
    {
        var (one, series) = Case(at);
        Holds("failures", KupiecTests.Failures(series, C99, s_laws).Statistic);
        Holds("firstFailure", KupiecTests.FirstFailure(series, C99, s_laws).Statistic);
        Holds("independence", ChristoffersenTests.Independence(series, s_laws).Statistic);
        var conditional = ChristoffersenTests.Conditional(series, C99, s_laws);
        Holds("conditional", conditional.Statistic);
        Holds("mixed", HaasTest.Of(series, C99, s_laws).Statistic);
        var other = conditional.Note.Split("the statistic is ")[1].Split(". The chi")[0];
        Holds("conditionalOther", double.Parse(other, System.Globalization.CultureInfo.InvariantCulture));

        void Holds(string name, double? value)
        {
            var expected = one.GetProperty(name).GetDouble();
            Assert.Equal(expected, value!.Value, 1e-10 * expected);
        }
    }

    [Theory]
    [MemberData(nameof(Cases))]
    public void Duration_of_a_rolling_backtest_is_that_of_a_search_over_scale_and_shape(int at)
    {
        var (one, series) = Case(at);
        var test = DurationTest.Of(series, s_laws);
        Assert.Equal(one.GetProperty("duration").GetDouble(), test.Statistic!.Value, 1e-7);
        Assert.Contains($"Weibull shape {one.GetProperty("shape").GetDouble():G4}, below 1: exceptions cluster", test.Note, StringComparison.Ordinal);
    }

    private static (JsonElement Case, bool[] Series) Case(int at)
    {
        var one = s_cases[at];
        return (one, On(one.GetProperty("days").GetInt32(), one.GetProperty("exceptions").EnumerateArray().Select(e => e.GetInt32())));
    }
}
