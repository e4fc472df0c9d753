using System.Globalization;
using System.Text.RegularExpressions;
using RiskWorker.Host.Tests.Architecture;

namespace RiskWorker.Host.Tests.FiveSettings;

/// <summary>The pinned runs of every kind of model, fitted to a history, under each setting: the engine's own tests of their bits.</summary>
public sealed partial class ModelBitsTests
{
    private const string Suite = "RiskWorker.Engine.Tests";

    // One a kind of model and way to estimate it: fewer would mean that the class was renamed.
    private const int FewestTests = 13;

    public static TheoryData<string> Settings => [.. HardwareSetting.All.Select(s => s.Name)];

    [Theory]
    [MemberData(nameof(Settings))]
    public async Task Pinned_runs_of_every_model_pass_under_every_setting(string setting)
    {
        var child = await Child.RunAsync(Child.Executable(SuiteFolder(), Suite), ["-class", Suite + ".Models.ModelBitsTests", "-noColor"], HardwareSetting.Named(setting), TestContext.Current.CancellationToken);

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
