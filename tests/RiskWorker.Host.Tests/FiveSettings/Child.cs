using System.Diagnostics;

namespace RiskWorker.Host.Tests.FiveSettings;

/// <summary>A program run to its end under a hardware setting: such a setting is read once, when a process starts.</summary>
/// <param name="ExitCode">Its exit code.</param>
/// <param name="Output">What it wrote to standard output.</param>
/// <param name="Error">What it wrote to standard error.</param>
internal sealed record Child(int ExitCode, string Output, string Error)
{
    private static readonly TimeSpan s_patience = TimeSpan.FromMinutes(5);

    /// <summary>Runs <paramref name="file"/> and waits for it.</summary>
    public static async Task<Child> RunAsync(string file, IEnumerable<string> arguments, HardwareSetting setting, CancellationToken cancellation)
    {
        var start = new ProcessStartInfo(file, arguments) { RedirectStandardOutput = true, RedirectStandardError = true };
        setting.ApplyTo(start.Environment);
        using var process = Process.Start(start)!;
        try
        {
            var output = process.StandardOutput.ReadToEndAsync(cancellation);
            var error = process.StandardError.ReadToEndAsync(cancellation);
            await process.WaitForExitAsync(cancellation).WaitAsync(s_patience, cancellation);
            return new(process.ExitCode, await output, await error);
        }
        finally
        {
            if (!process.HasExited) process.Kill(entireProcessTree: true);
        }
    }

    /// <summary>The executable <paramref name="name"/> in <paramref name="folder"/>, as this system calls it.</summary>
    public static string Executable(string folder, string name) => Path.Combine(folder, OperatingSystem.IsWindows() ? name + ".exe" : name);
}
