using RiskWorker.Host.Jobs;
using RiskWorker.Host.Options;

namespace RiskWorker.Host.Tests.Jobs;

public sealed class StoreLockTests : IDisposable
{
    private readonly TemporaryFolder _folder = new();

    private string Store => Path.Combine(_folder.Path, "riskworker.db");

    private static TimeProvider Clock => new FixedClock(DateTimeOffset.Parse("2026-11-27T06:30:00Z", null));

    public void Dispose() => _folder.Dispose();

    [Fact]
    public void Take_while_held_names_the_holder()
    {
        using var held = StoreLock.Take(Store, Clock);
        var refusal = Assert.Throws<SettingsException>(() => StoreLock.Take(Store, Clock));
        Assert.Contains($"(process {Environment.ProcessId}, since 2026-11-27T06:30:00Z)", refusal.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Take_after_release_succeeds()
    {
        StoreLock.Take(Store, Clock).Dispose();
        using var again = StoreLock.Take(Store, Clock);
        Assert.True(File.Exists(Store + ".holder"));
    }

    [Fact]
    public void Take_other_store_in_one_folder_succeeds()
    {
        using var one = StoreLock.Take(Store, Clock);
        using var other = StoreLock.Take(Store + "2", Clock);
        Assert.False(File.Exists(Store));
    }
}
