using System.Text.Json;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Tests.Verbs;

public sealed class VerifyVerbTests : IDisposable
{
    private readonly TerminalRecorder _terminal = new();
    private readonly TemporaryFolder _folder = new();

    public void Dispose()
    {
        _terminal.Dispose();
        _folder.Dispose();
    }

    [Fact]
    public async Task RunAsync_shows_each_check_and_says_that_all_is_equal()
    {
        Assert.Equal(ExitCode.Done, await RunAsync(Report(VerifyOutcome.Equal, "55,115 values, computed again, are equal to the last bit.")));
        Assert.Equal("""
            Run r-0123456789ab of 2026-11-27, recorded, numerics epoch 1

            Check    Result  What
            chain    equal   Whole.
            figures  equal   55,115 values, computed again, are equal to the last bit.

            This run is what was recorded, to the last bit.

            """.ReplaceLineEndings("\n"), Output());
    }

    [Fact]
    public async Task RunAsync_difference_ends_in_five_and_says_so()
    {
        Assert.Equal(ExitCode.Difference, await RunAsync(Report(VerifyOutcome.Different, "1 of 2 values differ.", "The first: [red]nodes[F].value.")));
        Assert.Contains("figures  DIFFERENT  1 of 2 values differ.\n", Output(), StringComparison.Ordinal);
        Assert.Contains("                    The first: [red]nodes[F].value.\n", Output(), StringComparison.Ordinal);
        Assert.EndsWith("This run is NOT what was recorded.\n", Output(), StringComparison.Ordinal);
    }

    [Fact]
    public async Task RunAsync_another_epoch_ends_in_zero_and_says_so()
    {
        Assert.Equal(ExitCode.Done, await RunAsync(Report(VerifyOutcome.OtherEpoch, "It is of epoch 0.")));
        Assert.EndsWith("What was recorded is whole; its figures are those of another numerics epoch.\n", Output(), StringComparison.Ordinal);
    }

    [Fact]
    public async Task RunAsync_json_holds_checks_and_differences_with_their_bits()
    {
        var report = Report(VerifyOutcome.Different, "x") with { Differences = [new("nodes[F].value", "0.1", "0.2")] };
        await RunAsync(report, "--json");

        var json = JsonDocument.Parse(_terminal.Output).RootElement;
        Assert.Equal(("r-0123456789ab", "2026-11-27", "different"), (json.GetProperty("run").GetString(), json.GetProperty("asOf").GetString(), json.GetProperty("verdict").GetString()));
        Assert.Equal(["chain", "figures"], json.GetProperty("checks").EnumerateArray().Select(c => c.GetProperty("check").GetString()));
        var difference = json.GetProperty("differences")[0];
        Assert.Equal(("nodes[F].value", "0.1", "3fb999999999999a"), (difference.GetProperty("path").GetString(), difference.GetProperty("recorded").GetString(), difference.GetProperty("recordedBits").GetString()));
    }

    [Fact]
    public async Task RunAsync_hands_the_use_case_all_that_was_typed()
    {
        VerifyRequest? asked = null;
        await RunAsync(Report(VerifyOutcome.Equal, "x"), "--threads", "3", request => asked = request);
        Assert.Equal(("0123", 3, Path.Combine(_folder.Path, "riskworker.db")), (asked!.Run, asked.Threads, asked.Workspace.StoreFile));
    }

    private static VerifyReport Report(VerifyOutcome outcome, params string[] findings) => new()
    {
        Run = "r-0123456789ab",
        Record = SampleRuns.Record(),
        Epoch = 1,
        Checks = [new(VerifiedThing.Chain, VerifyOutcome.Equal, ["Whole."]), new(VerifiedThing.Figures, outcome, findings)],
        Differences = [],
    };

    private Task<ExitCode> RunAsync(VerifyReport report, params string[] options) => RunAsync(report, options, _ => { });

    private Task<ExitCode> RunAsync(VerifyReport report, string option, string value, Action<VerifyRequest> asked) => RunAsync(report, [option, value], asked);

    private Task<ExitCode> RunAsync(VerifyReport report, string[] options, Action<VerifyRequest> asked) => _terminal.RunAsync(
        TerminalRecorder.NoUseCases with
        {
            Verify = (request, _, _) =>
            {
                asked(request);
                return Task.FromResult(report);
            },
        },
        ["verify", "0123", "--config", _folder.Path, "--out", _folder.Path, .. options]);

    private string Output() => string.Join('\n', _terminal.Output.ReplaceLineEndings("\n").Split('\n').Select(l => l.TrimEnd()));
}
