using System.Collections.Concurrent;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// Laws of statistics under the model, each found once for its days, level and count: hand one to the tests of many books. For use by
/// any number of threads; what a test returns does not depend on what was asked before.
/// </summary>
public sealed class NullLaws
{
    /// <summary>Seed of all simulated laws: they are part of the method, as a printed table of critical values would be.</summary>
    internal const ulong Seed = 0x5EED_0000_0000_0001;

    private readonly ConcurrentDictionary<Key, Lazy<NullLaw>> _laws = new();

    /// <summary>The law of that name and those numbers, from <paramref name="find"/> if it is not yet known.</summary>
    internal NullLaw Of(string name, int days, decimal level, int count, Func<NullLaw> find) =>
        _laws.GetOrAdd(new(name, days, level, count), _ => new(find)).Value;

    private readonly record struct Key(string Name, int Days, decimal Level, int Count);
}
