using System.Diagnostics;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary><c>riskworker</c> as a process of its own.</summary>
internal static class RiskworkerProcess
{
    private static readonly TimeSpan s_patience = TimeSpan.FromMinutes(5);

    public static Process Start(IEnumerable<string> args, params (string Name, string Value)[] environment) =>
        Start(Path.Combine(AppContext.BaseDirectory, OperatingSystem.IsWindows() ? "riskworker.exe" : "riskworker"), args, null, environment);

    public static Process Start(string program, IEnumerable<string> args, string? folder, params (string Name, string Value)[] environment)
    {
        var start = new ProcessStartInfo(program, args) { RedirectStandardError = true, RedirectStandardOutput = true, WorkingDirectory = folder };
        foreach (var (name, value) in environment) start.Environment[name] = value;
        return Process.Start(start)!;
    }

    public static async Task<Ending> RunAsync(IEnumerable<string> args, params (string Name, string Value)[] environment)
    {
        using var process = Start(args, environment);
        return await EndAsync(process);
    }

    /// <summary>Reads both streams to their ends.</summary>
    public static async Task<Ending> EndAsync(Process process)
    {
        using var patience = CancellationTokenSource.CreateLinkedTokenSource(TestContext.Current.CancellationToken);
        patience.CancelAfter(s_patience);
        var output = process.StandardOutput.ReadToEndAsync(patience.Token);
        var error = await process.StandardError.ReadToEndAsync(patience.Token);
        await process.WaitForExitAsync(patience.Token);
        return new(process.ExitCode, await output, error);
    }
}
