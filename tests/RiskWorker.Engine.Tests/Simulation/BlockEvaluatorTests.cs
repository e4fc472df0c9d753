using System.Diagnostics;
using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Simulation;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Simulation;

public sealed class BlockEvaluatorTests
{
    // 12,000 options at two horizons: a block alone takes some 200 milliseconds, so the cancellation strikes inside the first ones.
    // The best of several tries: a busy machine may delay any one of them, but not make the evaluator quicker than it is.
    [Fact]
    public void Evaluate_stops_within_100_milliseconds_of_a_cancellation()
    {
        var plan = BigBook().Plan;
        var tooSlow = Enumerable.Range(0, 10).Select(_ => TimeToStop(plan)).TakeWhile(t => t >= TimeSpan.FromMilliseconds(100)).Count();
        Assert.True(tooSlow < 10, "none of ten cancellations stopped it within 100 ms");
    }

    private static TimeSpan TimeToStop(RevaluationPlan plan)
    {
        var reduction = new TailReduction([.. plan.Rows.Select(_ => 1e9)], [.. plan.Rows.Select(_ => new HistogramEdges(-1, 1))]);
        using var source = new CancellationTokenSource();
        var cancelled = 0L;
        using var struck = source.Token.Register(() => Volatile.Write(ref cancelled, Stopwatch.GetTimestamp()));
        source.CancelAfter(30);
        Assert.ThrowsAny<OperationCanceledException>(() => new BlockEvaluator(plan, 2).Evaluate(BlockRange.From(0, 1_000_000), reduction, null, source.Token));
        var stopped = Stopwatch.GetTimestamp();
        SpinWait.SpinUntil(() => Volatile.Read(ref cancelled) != 0); // set by the cancelling thread, perhaps after the last worker left
        return Stopwatch.GetElapsedTime(cancelled, stopped);
    }

    [Fact]
    public void Evaluate_cancelled_before_it_begins_draws_nothing()
    {
        var plan = CompiledBook.Of(MixedBook.Whole().Build(), 1).Plan;
        var blocks = 0;
        Assert.ThrowsAny<OperationCanceledException>(() => new BlockEvaluator(plan, 2).Evaluate(BlockRange.From(0, 100_000), new LossSampleReduction(plan.Rows.Count, 100_000), _ => blocks++, new CancellationToken(true)));
        Assert.Equal(0, blocks);
    }

    [Fact]
    public void Evaluate_tells_the_width_of_each_block()
    {
        var plan = CompiledBook.Of(MixedBook.Whole().Build(), 1).Plan;
        var widths = new List<int>();
        new BlockEvaluator(plan, 1).Evaluate(BlockRange.From(1, 10_000), new LossSampleReduction(plan.Rows.Count, 10_000), widths.Add, CancellationToken.None);
        Assert.Equal([4_096, 1_808], widths.OrderDescending());
    }

    // The fault itself, not the aggregate that parallel loops wrap around it.
    [Fact]
    public void Evaluate_throws_the_fault_of_a_block_itself()
    {
        var plan = CompiledBook.Of(MixedBook.Whole().Build(), 1).Plan;
        var broken = plan with { Nodes = [.. plan.Nodes.Select(n => n with { ValueRoot = double.NaN })] };
        var reduction = new TailReduction([.. plan.Rows.Select(_ => 0.0)], [.. plan.Rows.Select(_ => new HistogramEdges(-1, 1))]);
        Assert.Throws<NotFiniteNumberException>(() => new BlockEvaluator(broken, 2).Evaluate(BlockRange.From(0, 10_000), reduction, null, CancellationToken.None));
    }

    private static CompiledBook BigBook()
    {
        var snapshot = MixedBook.Whole().Build();
        var call = (Option)snapshot.Instruments["EQ-CALL"];
        var options = Enumerable.Range(0, 12_000).Select(i => call with { Name = $"CALL-{i}", Strike = 80 + (i / 100.0) }).ToArray();
        return CompiledBook.Of(snapshot with
        {
            Instruments = options.ToDictionary(o => o.Name, Instrument (o) => o),
            Positions = [.. options.Select(o => new Position("EUROPE", o.Name, 1))],
        }, 1, 10);
    }
}
