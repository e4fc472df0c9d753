namespace RiskWorker.Host.Tests.FiveSettings;

/// <summary>A way to run in which no bit of a figure may differ: an environment, and the name under which the numerics tests check that it took effect.</summary>
/// <param name="Name">What the numerics tests are told to expect.</param>
/// <param name="Variable">The variable that makes the setting; null for the machine as it is.</param>
/// <param name="Value">Its value.</param>
public sealed record HardwareSetting(string Name, string? Variable = null, string? Value = null)
{
    /// <summary>The machine as it is first: the others are held against it.</summary>
    public static IReadOnlyList<HardwareSetting> All { get; } =
    [
        new("default"),
        new("avx512-off", "DOTNET_EnableAVX512", "0"),
        new("avx2-off", "DOTNET_EnableAVX2", "0"),
        new("intrinsics-off", "DOTNET_EnableHWIntrinsic", "0"),
        new("no-fma-libc", "GLIBC_TUNABLES", "glibc.cpu.hwcaps=-FMA,-FMA4,-AVX2"),
    ];

    /// <summary>The setting called <paramref name="name"/>.</summary>
    public static HardwareSetting Named(string name) => All.Single(s => s.Name == name);

    /// <summary>Sets a child's environment to this setting and to no other.</summary>
    public void ApplyTo(IDictionary<string, string?> environment)
    {
        foreach (var setting in All)
        {
            if (setting.Variable is { } other) environment.Remove(other);
        }
        if (Variable is not null) environment[Variable] = Value;
        environment["RISKWORKER_EXPECT"] = Name;
    }
}
