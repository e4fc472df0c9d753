using RiskWorker.Host.Options;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Tests.Verbs;

public sealed class CommandTreeTests : IDisposable
{
    private readonly TerminalRecorder _terminal = new();
    private readonly TemporaryFolder _folder = new();

    public void Dispose()
    {
        _terminal.Dispose();
        _folder.Dispose();
    }

    [Theory]
    [InlineData("mesure", "riskworker: 'mesure' is not known here; did you mean 'measure'?\n'riskworker --help' lists what there is.\n")]
    [InlineData("measure --senarios 5", "riskworker: '--senarios' is not known here; did you mean '--scenarios'?\n'riskworker measure --help' lists what there is.\n")]
    [InlineData("measure --as-of 2026-02-30", "riskworker: --as-of: found '2026-02-30', expected a date as yyyy-MM-dd\n'riskworker measure --help' lists what there is.\n")]
    [InlineData("measure --threads 0", "riskworker: --threads: found '0', expected a whole number from 1 to 1024\n'riskworker measure --help' lists what there is.\n")]
    [InlineData("measure --from 2026-01-02", "riskworker: --from and --to go together: a span has a first and a last date\n'riskworker measure --help' lists what there is.\n")]
    [InlineData("measure --from 2026-01-03 --to 2026-01-02", "riskworker: --from lies after --to\n'riskworker measure --help' lists what there is.\n")]
    [InlineData("measure --as-of 2026-01-02 --from 2026-01-02 --to 2026-01-02", "riskworker: --as-of does not go with --from and --to: it is one date, they are a span\n'riskworker measure --help' lists what there is.\n")]
    [InlineData("serve --stop-timeout -1", "riskworker: --stop-timeout: found '-1', expected a whole number from 0 to 86400\n'riskworker serve --help' lists what there is.\n")]
    [InlineData("runs show", "riskworker: Required argument 'ID' missing for command: 'show'.\n'riskworker runs show --help' lists what there is.\n")]
    [InlineData("verify", "riskworker: Required argument 'RUN' missing for command: 'verify'.\n'riskworker verify --help' lists what there is.\n")]
    [InlineData("@file", "riskworker: '@file' is not known here\n'riskworker --help' lists what there is.\n")]
    public async Task RunAsync_what_is_not_understood_ends_in_three_and_one_clear_line(string line, string error)
    {
        Assert.Equal(ExitCode.Usage, await _terminal.RunAsync(TerminalRecorder.NoUseCases, line.Split(' ')));
        Assert.Equal(("", error), (_terminal.Output, _terminal.Error.ReplaceLineEndings("\n")));
    }

    [Theory]
    [InlineData("--help", "Exit codes:")]
    [InlineData("load --help", "riskworker load --config demo")]
    [InlineData("measure --help", "[default: the newest with positions]")]
    [InlineData("runs --help", "show <ID>")]
    [InlineData("runs show --help", "--pdf <FILE>")]
    [InlineData("--help", "  5  a stored run")]
    [InlineData("verify --help", "riskworker verify RUN --out out --threads 1 --json")]
    [InlineData("serve --help", "[default: 60]")]
    public async Task RunAsync_help_shows_defaults_and_examples(string line, string shown)
    {
        Assert.Equal(ExitCode.Done, await _terminal.RunAsync(TerminalRecorder.NoUseCases, line.Split(' ')));
        Assert.Contains(shown, _terminal.Output, StringComparison.Ordinal);
        Assert.Equal("", _terminal.Error);
    }

    [Fact]
    public async Task RunAsync_measure_hands_the_use_case_all_that_was_typed()
    {
        MeasureRequest? asked = null;
        var useCases = TerminalRecorder.NoUseCases with
        {
            Measure = (request, _, _) =>
            {
                asked = request;
                return Task.FromResult(SampleRuns.Report());
            },
        };
        var output = Path.Combine(_folder.Path, "o ut");
        string[] typed = ["--config", _folder.Path, "measure", "--out", output, "--as-of", "2026-11-27", "--scenarios", "5000", "--seed", "7", "--threads", "3", "--json"];
        Assert.Equal(ExitCode.Breach, await _terminal.RunAsync(useCases, typed));
        Assert.NotNull(asked);
        Assert.Equal(new Workspace(_folder.Path, output, Path.Combine(output, "riskworker.db")), asked.Workspace);
        Assert.Equal((new DateOnly(2026, 11, 27), null, null, 3), (asked.AsOf, asked.From, asked.To, asked.Threads));
        Assert.Equal((5_000, 7UL), (asked.Configuration.Run.Simulation.Scenarios, asked.Configuration.Run.Simulation.Seed));
        Assert.Equal(["riskworker", "measure", "--config", _folder.Path, "--out", output], asked.Command);
    }

    [Fact]
    public async Task RunAsync_json_leaves_nothing_else_on_the_output()
    {
        var useCases = TerminalRecorder.NoUseCases with
        {
            Measure = (_, progress, _) =>
            {
                progress.Report(new("simulate", 0.25, "[bold]"));
                return Task.FromResult(SampleRuns.Report(ExitCode.Done));
            },
        };
        Assert.Equal(ExitCode.Done, await _terminal.RunAsync(useCases, "measure", "--config", _folder.Path, "--json"));
        Assert.Equal("{ \"schema\": 1 }\n", _terminal.Output.ReplaceLineEndings("\n"));
        Assert.Contains("simulate 25", _terminal.Error, StringComparison.Ordinal);
    }

    public static TheoryData<Exception, ExitCode, string> Thrown => new()
    {
        { new DataRefusedException("feed/books.csv: 1 fault\n  line 3, column parent: \u001b[2J"), ExitCode.Blocked, "riskworker: feed/books.csv: 1 fault\n  line 3, column parent: ?[2J\n" },
        { new NotStoredException("no run 'x'"), ExitCode.Usage, "riskworker: no run 'x'\n" },
        { new SettingsException("riskworker.json", [new("a", "1", "2")]), ExitCode.Usage, "riskworker: riskworker.json: 1 fault\n  a: found 1, expected 2\n" },
        { new IOException("disk full"), ExitCode.Failure, "riskworker: disk full\n" },
        { new OperationCanceledException(), ExitCode.Failure, "riskworker: cancelled before it was done\n" },
        { new InvalidOperationException("odd"), ExitCode.Failure, "riskworker: internal failure: InvalidOperationException: odd (--verbose shows where)\n" },
    };

    [Theory]
    [MemberData(nameof(Thrown), DisableDiscoveryEnumeration = true)]
    public async Task RunAsync_exception_becomes_a_message_and_a_code_without_a_stack_trace(Exception thrown, ExitCode code, string error)
    {
        var useCases = TerminalRecorder.NoUseCases with { Load = (_, _, _) => throw thrown };
        Assert.Equal(code, await _terminal.RunAsync(useCases, "load", "--config", _folder.Path));
        Assert.Equal(("", error), (_terminal.Output, _terminal.Error.ReplaceLineEndings("\n")));
    }

    [Fact]
    public async Task RunAsync_verbose_exception_shows_where()
    {
        var useCases = TerminalRecorder.NoUseCases with { Load = (_, _, _) => throw new InvalidOperationException("odd") };
        await _terminal.RunAsync(useCases, "load", "--config", _folder.Path, "--verbose");
        Assert.Contains("   at RiskWorker.Host", _terminal.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task RunAsync_cancelled_work_ends_in_four()
    {
        using var source = new CancellationTokenSource();
        var useCases = TerminalRecorder.NoUseCases with
        {
            Load = async (_, _, token) =>
            {
                await source.CancelAsync();
                await Task.Delay(Timeout.Infinite, token);
                throw new InvalidOperationException("not reached");
            },
        };
        Assert.Equal(ExitCode.Failure, await _terminal.RunAsync(useCases, source.Token, "load", "--config", _folder.Path));
        Assert.Equal("riskworker: cancelled before it was done\n", _terminal.Error.ReplaceLineEndings("\n"));
    }

    [Fact]
    public async Task RunAsync_out_that_is_a_file_is_refused()
    {
        var file = _folder.Write("taken", "x");
        Assert.Equal(ExitCode.Usage, await _terminal.RunAsync(TerminalRecorder.NoUseCases, "load", "--config", _folder.Path, "--out", file));
        Assert.Contains($"--out: found '{file}', a file, expected a folder", _terminal.Error, StringComparison.Ordinal);
    }
}
