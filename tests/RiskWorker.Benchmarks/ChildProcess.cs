using System.Diagnostics;
using System.Globalization;

namespace RiskWorker.Benchmarks;

/// <summary>A program run to its end, timed from start to exit.</summary>
/// <param name="Output">Its standard output.</param>
/// <param name="Seconds">Wall time.</param>
/// <param name="PeakMegabytes">Largest resident set, in 10^6 bytes: the kernel's own high-water mark, read every 5 ms, so growth in the last of them is missed.</param>
internal sealed record ChildProcess(string Output, double Seconds, double PeakMegabytes)
{
    /// <summary>Variables that pin a BLAS to another processor's code; the yardstick runs without them.</summary>
    private static readonly string[] s_pins = ["OPENBLAS_CORETYPE", "OPENBLAS_L2_SIZE"];

    public static ChildProcess Run(string file, string[] arguments, params int[] expectedExitCodes)
    {
        var start = new ProcessStartInfo(file, arguments) { RedirectStandardOutput = true, RedirectStandardError = true };
        foreach (var pin in s_pins) start.Environment.Remove(pin);
        var clock = Stopwatch.StartNew();
        using var process = Process.Start(start)!;
        var (output, error) = (process.StandardOutput.ReadToEndAsync(), process.StandardError.ReadToEndAsync());
        double peak = 0;
        while (!process.WaitForExit(5)) peak = Math.Max(peak, HighWaterMark(process.Id));
        process.WaitForExit();
        var seconds = clock.Elapsed.TotalSeconds;
        if (!expectedExitCodes.Append(0).Contains(process.ExitCode))
            throw new InvalidOperationException($"{file} {string.Join(' ', arguments)} ended with {process.ExitCode}: {error.Result}{output.Result}");
        return new(output.Result, seconds, peak);
    }

    private static double HighWaterMark(int process)
    {
        try
        {
            var line = File.ReadLines($"/proc/{process}/status").FirstOrDefault(l => l.StartsWith("VmHWM:", StringComparison.Ordinal));
            return line is null ? 0 : double.Parse(line.Split(' ', StringSplitOptions.RemoveEmptyEntries)[1], CultureInfo.InvariantCulture) * 1024 / 1e6;
        }
        catch (IOException)
        {
            return 0;
        }
    }
}
