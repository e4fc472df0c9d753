using System.Globalization;
using System.Text.RegularExpressions;
using RiskWorker.Host.Tests.Architecture;

namespace RiskWorker.Host.Tests.FiveSettings;

/// <summary>The whole suite of the numerics under each setting; one of its tests asserts that the setting took effect.</summary>
public sealed partial class NumericsTests
{
    private const string Suite = "RiskWorker.Numerics.Tests";

    // Fewer would mean that the suite was filtered or not found.
    private const int FewestTests = 250;

    public static TheoryData<string> Settings => [.. HardwareSetting.All.Select(s => s.Name)];

    [Theory]
    [MemberData(nameof(Settings))]
    public async Task Suite_passes_whole_and_its_setting_took_effect(string setting)
    {
        var child = await Child.RunAsync(Child.Executable(SuiteFolder(), Suite), ["-noColor"], HardwareSetting.Named(setting), TestContext.Current.CancellationToken);

        var summary = Summary().Match(child.Output);
        Assert.True(child.ExitCode == 0 && summary.Success, $"{Suite} under {setting} ended with {child.ExitCode}:\n{child.Output}\n{child.Error}");
        Assert.InRange(int.Parse(summary.Groups["total"].Value, CultureInfo.InvariantCulture), FewestTests, int.MaxValue);
    }

    /// <summary>Built beside this suite, in the same configuration: bin/CONFIGURATION/FRAMEWORK.</summary>
    private static string SuiteFolder()
    {
        var framework = new DirectoryInfo(AppContext.BaseDirectory);
        return Path.Combine(Repository.Root, "tests", Suite, "bin", framework.Parent!.Name, framework.Name);
    }

    [GeneratedRegex(@"Total: (?<total>\d+), Errors: 0, Failed: 0, Skipped: 0, Not Run: 0\b")]
    private static partial Regex Summary();
}
