using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Domain.Tests.Runs;

public sealed class FiguresHashTests
{
    private static readonly MeasureSpec s_var = new(MeasureKind.Var, new(0.99m), new(1));
    private static readonly MeasureResult s_measure = new(s_var, 1.5, 1.25, 1.75, 0.95);

    private static readonly NodeResult s_node = new()
    {
        Book = "desk",
        Name = "Desk",
        Parent = "firm",
        Depth = 1,
        Currency = "USD",
        Value = 10.5,
        ValueRoot = 9,
        Positions = 3,
        Measures = [s_measure],
        MeasuresRoot = [s_measure with { Value = 1.35 }],
        Distributions = [],
    };

    private static readonly LimitResult s_limit = new()
    {
        Limit = new("line", "desk", s_var, 3),
        Currency = "USD",
        Value = 1.5,
        Low = 1.25,
        High = 1.75,
        Level = 0.95,
        Used = 0.5,
        UsedLow = 0.4,
        UsedHigh = 0.6,
        Status = LimitStatus.Within,
    };

    private static readonly BacktestResult s_backtest = new()
    {
        Book = "desk",
        Confidence = new(0.99m),
        Currency = "USD",
        Series = [],
        Days = 250,
        Actual = 3,
        Hypothetical = 2,
        MissingVar = 0,
        Backfilled = 0,
        Zone = BacktestZone.Green,
    };

    private static string Hash(NodeResult? node = null, LimitResult? limit = null, BacktestResult? backtest = null) =>
        FiguresHash.Of(new() { Findings = [], Nodes = [node ?? s_node], Limits = [limit ?? s_limit], Backtest = [backtest ?? s_backtest] });

    private static readonly Dictionary<string, Func<Func<double, double>, string>> s_numbers = new()
    {
        ["value of a node"] = f => Hash(s_node with { Value = f(s_node.Value) }),
        ["measure"] = f => Hash(s_node with { Measures = [s_measure with { Value = f(1.5) }] }),
        ["lower end"] = f => Hash(s_node with { Measures = [s_measure with { Low = f(1.25) }] }),
        ["upper end"] = f => Hash(s_node with { Measures = [s_measure with { High = f(1.75) }] }),
        ["level"] = f => Hash(s_node with { Measures = [s_measure with { Level = f(0.95) }] }),
        ["measure in the reporting currency"] = f => Hash(s_node with { MeasuresRoot = [s_measure with { Value = f(1.35) }] }),
        ["amount of a limit"] = f => Hash(limit: s_limit with { Limit = s_limit.Limit with { Amount = f(3) } }),
        ["value of a limit"] = f => Hash(limit: s_limit with { Value = f(1.5) }),
        ["use of a limit"] = f => Hash(limit: s_limit with { Used = f(0.5) }),
    };

    public static TheoryData<string> Numbers => [.. s_numbers.Keys];

    [Theory]
    [MemberData(nameof(Numbers))]
    public void Of_changes_with_each_bit_of_each_number(string number)
    {
        var hashes = Enumerable.Range(0, 64).Select(bit => s_numbers[number](v => BitConverter.UInt64BitsToDouble(BitConverter.DoubleToUInt64Bits(v) ^ (1UL << bit)))).ToList();
        Assert.Equal(Hash(), s_numbers[number](v => v));
        Assert.Equal(65, hashes.Append(Hash()).Distinct().Count());
    }

    [Fact]
    public void Of_tells_a_missing_number_from_zero_and_plus_zero_from_minus_zero()
    {
        double?[] ends = [null, 0.0, -0.0];
        Assert.Equal(3, ends.Select(low => Hash(s_node with { Measures = [s_measure with { Low = low }] })).Distinct().Count());
        Assert.Equal(3, ends.Select(used => Hash(limit: s_limit with { Used = used })).Distinct().Count());
    }

    [Fact]
    public void Of_changes_with_every_name_status_and_count()
    {
        string[] hashes =
        [
            Hash(), Hash(s_node with { Book = "other" }), Hash(s_node with { Parent = null }), Hash(s_node with { Currency = "EUR" }), Hash(s_node with { MeasuresRoot = null }),
            Hash(s_node with { Measures = [s_measure with { Spec = s_var with { Kind = MeasureKind.Es } }] }), Hash(s_node with { Measures = [s_measure with { Spec = s_var with { Horizon = new(2) } }] }),
            Hash(s_node with { Measures = [s_measure, s_measure] }), Hash(s_node with { Measures = [s_measure with { Spec = s_var with { Confidence = new(0.95m) } }] }),
            Hash(limit: s_limit with { Status = LimitStatus.Warning }), Hash(limit: s_limit with { Limit = s_limit.Limit with { Name = "other" } }),
            Hash(backtest: s_backtest with { Days = 249 }), Hash(backtest: s_backtest with { Actual = 4 }), Hash(backtest: s_backtest with { Zone = null }), Hash(backtest: s_backtest with { Confidence = new(0.95m) }),
        ];
        Assert.Equal(hashes.Length, hashes.Distinct().Count());
    }

    [Fact]
    public void Of_does_not_depend_on_findings_or_times() =>
        Assert.Equal(Hash(), FiguresHash.Of(new() { Findings = [new(FindingSeverity.Warning, "code", "subject", "message")], Nodes = [s_node], Limits = [s_limit], Backtest = [s_backtest] }));
}
