using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Tests.UseCases;

public sealed class ResultsComparisonTests
{
    [Theory]
    [InlineData("""{"a":1.5,"b":[1,2]}""", """{"a":1.5,"b":[1,2]}""", "")]
    [InlineData("""{"a":0}""", """{"a":-0}""", "a: 0, -0")]
    [InlineData("""{"a":"x"}""", """{"a":null}""", "a: \"x\", null")]
    [InlineData("""{"a":1,"b":2}""", """{"a":1}""", "b: 2, ")]
    [InlineData("""{"a":1}""", """{"a":1,"c":{"d":1}}""", "c: , an object")]
    [InlineData("""{"b":[1,2]}""", """{"b":[1]}""", "b: 2 items, 1 item")]
    [InlineData("""{"b":[1,2]}""", """{"b":{}}""", "b: 2 items, an object")]
    [InlineData("""{"figures":"x","nodes":[{"book":"F","measures":[{"measure":"var","confidence":0.99,"horizonDays":1,"low":1}]}]}""",
        """{"figures":"y","nodes":[{"book":"F","measures":[{"measure":"var","confidence":0.99,"horizonDays":1,"low":null}]}]}""", "nodes[F].measures[var 0.99 1].low: 1, null; figures: \"x\", \"y\"")]
    [InlineData("""{"findings":[{"severity":"warning","code":"C","subject":"S","message":"m"}],"x":[[1],[2]]}""",
        """{"findings":[{"severity":"blocking","code":"C","subject":"S","message":"m"}],"x":[[1],[3]]}""", "findings[C S].severity: \"warning\", \"blocking\"; x[1][0]: 2, 3")]
    public void Of_names_what_differs_in_the_order_of_the_file(string recorded, string computed, string expected)
    {
        var comparison = ResultsComparison.Of(recorded, computed);

        Assert.Equal(expected, string.Join("; ", comparison.Differences.Select(d => $"{d.Path}: {d.Recorded}, {d.Computed}")));
    }

    [Fact]
    public void Difference_shows_the_bits_of_numbers_alone()
    {
        Assert.Equal(("3fb999999999999a", "8000000000000000"), (new ValueDifference("", "0.1", null).RecordedBits, new ValueDifference("", null, "-0").ComputedBits));
        Assert.Null(new ValueDifference("", "\"0.1\"", null).RecordedBits);
        Assert.Equal(0.5, new ValueDifference("", "-2", "-1").Relative);
        Assert.Null(new ValueDifference("", "1", "null").Relative);
    }
}
