using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Limits;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Tests.Plans;
using RiskWorker.Numerics.Statistics;

namespace RiskWorker.Engine.Tests.Limits;

/// <summary>Limits on hand-made samples: losses 1, 2, ... N, times a scale and a shift, so that a rank is its own loss.</summary>
public sealed class LimitEvaluatorTests
{
    private const int N = 10_000;
    private const decimal Level = 0.99m;
    private static readonly MeasureSpec s_var = new(MeasureKind.Var, new(0.99m), new(1));
    private static readonly MeasureSpec s_es = new(MeasureKind.Es, new(0.975m), new(1));

    // Values: EUROPE 200 EUR, AMERICA 500 USD and with LONDON's 100 GBP below it 500 + 100·1.15/0.9 USD.
    private static readonly CompiledBook s_book = CompiledBook.Of(MixedBook.Holding(
        new("EUROPE", "EUR-CASH", 200), new("AMERICA", "USD-CASH", 500), new("LONDON", "GBP-CASH", 1)).Build(), 1);

    private static readonly RankInterval s_ranks = BinomialRanks.Interval(N, 0.99m, Level);
    private static readonly RankInterval s_half = BinomialRanks.Interval(N, 0.99m, 0.995m);

    private static double Low => s_ranks.Low!.Value;
    private static double High => s_ranks.High!.Value;

    private static LimitEvaluator Evaluator(Dictionary<string, (double Scale, double Shift)>? books = null, int count = N) =>
        new(s_book.Tree, s_book.Plan, new NodeMeasures(s_book.Plan, [.. s_book.Plan.Rows.Select(row => Sample(books?.GetValueOrDefault(s_book.Plan.Nodes[row.Node].Book, (1, 0)) ?? (1, 0), count))]), Level);

    private static SampledLoss Sample((double Scale, double Shift) of, int count) =>
        new(count, [.. Enumerable.Range(0, count).Select(i => new TailEntry((of.Scale * (count - i)) + of.Shift, i))], double.NegativeInfinity, 0);

    private static LimitResult Of(double amount, double warnAt = 0.8) => Evaluator().Of(new("line", "EUROPE", s_var, amount, WarnAt: warnAt));

    [Fact]
    public void Amount_below_the_whole_interval_is_breached_and_at_its_lower_end_is_not()
    {
        Assert.Equal(LimitStatus.Breached, Of(Math.BitDecrement(Low)).Status);
        Assert.Equal(LimitStatus.Inconclusive, Of(Low).Status);
    }

    [Fact]
    public void Amount_at_the_upper_end_of_the_interval_is_kept_and_below_it_is_open()
    {
        Assert.Equal(LimitStatus.Inconclusive, Of(Math.BitDecrement(High)).Status);
        Assert.Equal(LimitStatus.Warning, Of(High).Status);
    }

    // VaR 99% of 1, 2, ... 10,000 is 9,900.
    [Theory]
    [InlineData(12_375, 0.8, LimitStatus.Warning)]
    [InlineData(12_376, 0.8, LimitStatus.Within)]
    [InlineData(11_000, 0.9, LimitStatus.Warning)]
    [InlineData(11_000, 0.95, LimitStatus.Within)]
    [InlineData(11_000, 1.0, LimitStatus.Within)]
    public void Value_at_or_above_the_warning_level_warns(double amount, double warnAt, LimitStatus expected)
    {
        var result = Of(amount, warnAt);
        Assert.Equal(expected, result.Status);
        Assert.Equal((9_900, 9_900 / amount), (result.Value, result.Used));
        Assert.Equal((Low, High, Low / amount, High / amount), (result.Low, result.High, result.UsedLow, result.UsedHigh));
        Assert.Equal(0.99, result.Level);
    }

    // With 200 losses the upper rank of a 99% interval of VaR 99% lies outside the sample: nothing but a breach can be said.
    [Theory]
    [InlineData(1e9, LimitStatus.Inconclusive)]
    [InlineData(199, LimitStatus.Inconclusive)]
    [InlineData(100, LimitStatus.Breached)]
    public void Interval_without_an_upper_end_decides_breaches_alone(double amount, LimitStatus expected)
    {
        var result = Evaluator(count: 200).Of(new("line", "EUROPE", s_var, amount));
        Assert.Equal((expected, null, null), (result.Status, result.High, result.UsedHigh));
        Assert.NotNull(result.Low);
    }

    // With 5 losses the lower rank of VaR 50% lies outside too.
    [Fact]
    public void Interval_without_ends_decides_nothing()
    {
        var result = Evaluator(count: 5).Of(new("line", "EUROPE", new(MeasureKind.Var, new(0.5m), new(1)), 0.001));
        Assert.Equal((LimitStatus.Inconclusive, null, null), (result.Status, result.Low, result.High));
        Assert.Equal(3_000, result.Used!.Value, 1e-9);
    }

    [Fact]
    public void Nav_limit_is_a_fraction_of_the_books_value_in_its_own_currency()
    {
        var nav = 500 + (100 * 1.15 / 0.9);
        var result = Evaluator().Of(new("nav", "AMERICA", s_var, 25, LimitBasis.Nav));
        Assert.Equal("USD", result.Currency);
        Assert.Equal(9_900 / (25 * nav), result.Used!.Value, 1e-13);
        Assert.Equal(Low / (25 * nav), result.UsedLow!.Value, 1e-13);
        Assert.Equal(High / (25 * nav), result.UsedHigh!.Value, 1e-13);
        Assert.Equal(LimitStatus.Within, result.Status);
    }

    // (measure/V) over the same of the reference, over the amount; both intervals at half the error.
    [Fact]
    public void Book_limit_compares_two_relative_measures_with_half_the_error_each()
    {
        var scale = 100 / 200.0 / 0.9; // LONDON is worth 100 GBP, EUROPE 200 EUR
        var result = Evaluator(new() { ["EUROPE"] = (3, 0) }).Of(new("relative", "EUROPE", s_var, 0.9, LimitBasis.Book, "LONDON"));
        Assert.Equal(3 * scale, result.Used!.Value, 1e-14);
        Assert.Equal(3 * scale * s_half.Low!.Value / s_half.High!.Value, result.UsedLow!.Value, 1e-14);
        Assert.Equal(3 * scale * s_half.High!.Value / s_half.Low!.Value, result.UsedHigh!.Value, 1e-14);
        Assert.Equal(LimitStatus.Breached, result.Status);
        Assert.True(s_half.Low < s_ranks.Low && s_half.High > s_ranks.High);
        // The measure itself is shown with the interval of every other measure.
        Assert.Equal((3 * Low, 3 * High), (result.Low!.Value, result.High!.Value));
    }

    [Fact]
    public void Book_limit_on_expected_shortfall_uses_its_own_intervals()
    {
        var (low, high) = Sample((1, 0), N).ExpectedShortfallInterval(s_es.Confidence, 0.995m);
        var result = Evaluator().Of(new("relative", "EUROPE", s_es, 1, LimitBasis.Book, "LONDON"));
        Assert.Equal(0.5 * low / high, result.UsedLow!.Value, 1e-14);
        Assert.Equal(0.5 * high / low, result.UsedHigh!.Value, 1e-14);
        Assert.Equal(LimitStatus.Within, result.Status);
    }

    // A book that gains in nearly every scenario: the ratio's ends change places with the sign.
    [Fact]
    public void Book_limit_of_a_negative_measure_has_an_interval_that_holds_its_value()
    {
        var result = Evaluator(new() { ["EUROPE"] = (1, -20_000) }).Of(new("relative", "EUROPE", s_var, 1, LimitBasis.Book, "LONDON"));
        Assert.Equal(-0.5 * (20_000 - 9_900) / 9_900, result.Used!.Value, 1e-14);
        Assert.Equal(-0.5 * (20_000 - s_half.Low!.Value) / s_half.Low!.Value, result.UsedLow!.Value, 1e-14);
        Assert.Equal(-0.5 * (20_000 - s_half.High!.Value) / s_half.High!.Value, result.UsedHigh!.Value, 1e-14);
        Assert.Equal(LimitStatus.Within, result.Status);
    }

    [Fact]
    public void Reference_whose_interval_reaches_zero_bounds_the_ratio_from_below_alone()
    {
        var result = Evaluator(new() { ["LONDON"] = (1, -9_890) }).Of(new("relative", "EUROPE", s_var, 1, LimitBasis.Book, "LONDON"));
        Assert.Equal(0.5 * 9_900 / 10, result.Used!.Value, 1e-12);
        Assert.Equal(0.5 * s_half.Low!.Value / (s_half.High!.Value - 9_890), result.UsedLow!.Value, 1e-12);
        Assert.Null(result.UsedHigh);
        Assert.Equal(LimitStatus.Breached, result.Status);
    }

    [Theory]
    [InlineData(LimitBasis.Nav, "ALL", null, "the value of book 'ALL' is not positive")]
    [InlineData(LimitBasis.Book, "ALL", "EUROPE", "the value of book 'ALL' is not positive")]
    [InlineData(LimitBasis.Book, "EUROPE", "ALL", "the value of reference book 'ALL' is not positive")]
    [InlineData(LimitBasis.Book, "EUROPE", "LONDON", "the measure of reference book 'LONDON' is not positive")]
    [InlineData(LimitBasis.Book, "EUROPE", "AMERICA", null)]
    [InlineData(LimitBasis.Amount, "ALL", null, null)]
    public void Limit_relative_to_what_is_not_positive_is_undecidable(LimitBasis basis, string book, string? reference, string? reason)
    {
        var worthless = s_book.Plan with { Nodes = [.. s_book.Plan.Nodes.Select(n => n.Book == "ALL" ? n with { ValueRoot = 0 } : n)] };
        var samples = worthless.Rows.Select(row => Sample((1, worthless.Nodes[row.Node].Book == "LONDON" ? -9_900 : 0), N));
        var evaluator = new LimitEvaluator(s_book.Tree, worthless, new NodeMeasures(worthless, [.. samples]), Level);
        var limit = new Limit("line", book, s_var, 1, basis, reference);
        Assert.Equal(reason, evaluator.Undecidable(limit));
        var result = evaluator.Of(limit);
        Assert.Equal(reason is null, result.Used is not null);
        if (reason is not null) Assert.Equal((LimitStatus.Inconclusive, null, null), (result.Status, result.UsedLow, result.UsedHigh));
        Assert.NotEqual(0, result.Value);
    }

    [Theory]
    [InlineData("0.95", "0.975")]
    [InlineData("0.99", "0.995")]
    public void LevelOfEachOfTwo_halves_the_error(string level, string expected) =>
        Assert.Equal(decimal.Parse(expected, System.Globalization.CultureInfo.InvariantCulture), LimitEvaluator.LevelOfEachOfTwo(decimal.Parse(level, System.Globalization.CultureInfo.InvariantCulture)));
}
