using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Runs;
using RiskWorker.Engine.Tests.Checks;

namespace RiskWorker.Engine.Tests.Runs;

/// <summary>What cannot be computed is said, never left out as if all were well.</summary>
public sealed class NothingMissedTests
{
    [Fact]
    public void Limit_on_an_unknown_book_is_undecided_instead_of_left_out()
    {
        var spec = new MeasureSpec(MeasureKind.Var, new(0.99m), new(1));
        var snapshot = SmallBooks.OneFactor(0.02, 100) with { Limits = [new("known", "ALL", spec, 50), new("lost", "NOWHERE", spec, 50), new("unmatched", "ALL", spec, 2, LimitBasis.Book, "NOWHERE")] };
        var results = Calculate(snapshot);
        Assert.Equal(["known", "lost", "unmatched"], results.Limits.Select(l => l.Limit.Name));
        Assert.Equal([LimitStatus.Within, LimitStatus.Inconclusive, LimitStatus.Inconclusive], results.Limits.Select(l => l.Status));
        Assert.Equal([false, true, true], results.Limits.Select(l => l.Used is null));
        Assert.Contains(results.Findings, f => f.Code == "limit-book-unknown");
    }

    [Fact]
    public void Book_without_one_priced_position_fails_instead_of_showing_a_risk_of_zero()
    {
        var snapshot = SmallBooks.OneFactor(0.02, 100) with { Instruments = new Dictionary<string, Instrument> { ["X-UNIT"] = new Spot("X") { Name = "X-UNIT", Currency = "USD" } } };
        var results = Calculate(snapshot);
        Assert.Contains(results.Findings, f => f is { Code: "priced-none", Severity: FindingSeverity.Blocking });
        Assert.Empty(results.Nodes);
    }

    [Fact]
    public void Run_with_an_unpriced_position_that_the_settings_let_block_fails_and_names_it_with_its_notional()
    {
        var sound = FridaySnapshot.Sound().Position("FIRM", "LOOK", -3)
            .Instrument(new UnmodelledInstrument("lookback", new Dictionary<string, string> { ["strike"] = "90" }) { Name = "LOOK", Currency = "EUR" });
        var warned = Calculate(sound.Build());
        Assert.NotEmpty(warned.Nodes);
        Assert.Equal((2, 1, 270.0, 0), (warned.Holdings.Positions, warned.Holdings.Priced, warned.Holdings.UnpricedNotional, warned.Holdings.UnpricedOfUnknownSize));

        var blocked = Calculate(sound.Checks(c => c with { Severity = new SortedDictionary<string, FindingSeverity> { ["not-modelled"] = FindingSeverity.Blocking } }).Build());
        Assert.Contains(blocked.Findings, f => f is { Code: "not-modelled", Severity: FindingSeverity.Blocking } && f.Message.Contains("LOOK, 270 EUR:", StringComparison.Ordinal));
        Assert.Empty(blocked.Nodes);
        Assert.Equal("LOOK", Assert.Single(blocked.Holdings.Unpriced).Instrument);
    }

    private static RunResults Calculate(Snapshot snapshot) => new RunCalculator(snapshot, 1, null, CancellationToken.None).Calculate();
}
