using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Runs;

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

    private static RunResults Calculate(Snapshot snapshot) => new RunCalculator(snapshot, 1, null, CancellationToken.None).Calculate();
}
