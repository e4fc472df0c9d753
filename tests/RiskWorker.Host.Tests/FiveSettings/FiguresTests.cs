using System.Text.Json;

namespace RiskWorker.Host.Tests.FiveSettings;

/// <summary>One whole small run under each setting, from CSV to results.json: the same figures to the last bit.</summary>
public sealed class FiguresTests : IDisposable
{
    private readonly TemporaryFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public async Task Figures_of_an_estimated_model_are_the_same_under_every_setting()
    {
        using var results = await AgreedAsync("estimated");
        Assert.Equal("complete", results.RootElement.GetProperty("status").GetString());
        Assert.Equal(JsonValueKind.Null, RepairOf(results).ValueKind);
        Assert.True(results.RootElement.GetProperty("surfaces").GetProperty("revalued").GetInt64() > 0, "no price surface was in use");
    }

    [Fact]
    public async Task Figures_of_a_repaired_correlation_are_the_same_under_every_setting()
    {
        using var results = await AgreedAsync("given");
        Assert.InRange(RepairOf(results).GetDouble(), 0.1, 10);
    }

    /// <summary>The results under the machine's own setting, to which those under all others are equal.</summary>
    private async Task<JsonDocument> AgreedAsync(string model)
    {
        MixedFeed.Write(_folder);
        var first = await MeasureAsync(model, HardwareSetting.All[0]);
        foreach (var setting in HardwareSetting.All.Skip(1))
        {
            using var other = await MeasureAsync(model, setting);
            Assert.True(FiguresOf(first) == FiguresOf(other), $"Under {setting.Name} the figures are {FiguresOf(other)}, on the machine as it is {FiguresOf(first)}.");
            Assert.Equal(SensitivitiesOf(first), SensitivitiesOf(other)); // which are no part of the figures' hash
        }
        return first;
    }

    private async Task<JsonDocument> MeasureAsync(string model, HardwareSetting setting)
    {
        string[] arguments = ["measure", "--config", _folder.Path, "--out", Path.Combine(_folder.Path, $"out-{setting.Name}"), "--model", model, "--json"];
        return Measured(await Child.RunAsync(Child.Executable(AppContext.BaseDirectory, "riskworker"), arguments, setting, TestContext.Current.CancellationToken));
    }

    internal static JsonDocument Measured(Child child)
    {
        Assert.True(child.ExitCode is 0 or 1 or 6, $"measure ended with {child.ExitCode}:\n{child.Error}{child.Output}");
        return JsonDocument.Parse(child.Output);
    }

    internal static string FiguresOf(JsonDocument results) => results.RootElement.GetProperty("figures").GetString()!;

    private static string SensitivitiesOf(JsonDocument results)
    {
        var sensitivities = results.RootElement.GetProperty("sensitivities");
        Assert.NotEqual(0, sensitivities.GetArrayLength());
        return sensitivities.GetRawText();
    }

    private static JsonElement RepairOf(JsonDocument results) => results.RootElement.GetProperty("calibration").GetProperty("repairDistance");
}
