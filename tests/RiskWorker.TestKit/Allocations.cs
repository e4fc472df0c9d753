namespace RiskWorker.TestKit;

/// <summary>What a piece of code allocates on the thread that runs it.</summary>
public static class Allocations
{
    /// <summary>
    /// The fewest bytes that one of several runs of <paramref name="work"/> allocates, after a first one that is not counted.
    /// The runtime may put objects of its own on any thread while it promotes code, which it does once and not in every run;
    /// what the code itself allocates is there each time.
    /// </summary>
    public static long FewestOf(Action work)
    {
        work();
        var fewest = long.MaxValue;
        for (var run = 0; run < 5; run++)
        {
            var before = GC.GetAllocatedBytesForCurrentThread();
            work();
            fewest = Math.Min(fewest, GC.GetAllocatedBytesForCurrentThread() - before);
        }
        return fewest;
    }
}
