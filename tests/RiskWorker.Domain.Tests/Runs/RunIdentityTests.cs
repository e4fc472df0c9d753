using RiskWorker.Domain.Runs;

namespace RiskWorker.Domain.Tests.Runs;

public sealed class RunIdentityTests
{
    [Fact]
    public void Of_is_the_same_for_the_same_inputs_and_another_for_each_attempt()
    {
        var hash = SnapshotHash.OfText("inputs");
        var ids = Enumerable.Range(1, 100).Select(attempt => RunIdentity.Of(hash, attempt)).Append(RunIdentity.Of(SnapshotHash.OfText("others"), 1)).ToList();
        Assert.Equal(101, ids.Distinct().Count());
        Assert.All(ids, id => Assert.Matches("^[0-9a-f]{12}$", id));
        Assert.Equal(ids[0], RunIdentity.Of(hash, 1));
    }

    [Fact]
    public void Of_an_attempt_below_one_is_refused() => Assert.Throws<ArgumentOutOfRangeException>(() => RunIdentity.Of("hash", 0));
}
