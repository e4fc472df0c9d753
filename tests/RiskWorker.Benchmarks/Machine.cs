using System.Globalization;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace RiskWorker.Benchmarks;

/// <summary>What a figure of speed was measured on.</summary>
internal static class Machine
{
    /// <summary>The processor's name with family and model, which a virtual machine's name may leave open.</summary>
    public static string Processor => $"{Fact("model name")} (family {Fact("cpu family")}, model {Fact("model")})";

    /// <summary>The widest instructions that this process uses.</summary>
    public static string Instructions =>
        Vector512.IsHardwareAccelerated ? "AVX-512" : Avx2.IsSupported && Fma.IsSupported ? "AVX2" : Vector128.IsHardwareAccelerated ? "no FMA" : "no vectors";

    /// <summary>The processor's name as a file name.</summary>
    public static string FileName =>
        string.Join('-', $"{Fact("model name")} {Fact("cpu family")} {Fact("model")}".ToLowerInvariant().Split(' ', '(', ')', '@', '.', '/').Where(word => word.Length > 0));

    /// <summary>Machine, instructions, runtime, and how busy it is.</summary>
    public static string Description => string.Create(CultureInfo.InvariantCulture,
        $"{Processor}, {Environment.ProcessorCount} cores, {Instructions}, {RuntimeInformation.FrameworkDescription}, load {Load}");

    /// <summary>Mean number of runnable processes over the last minute.</summary>
    public static string Load => File.Exists("/proc/loadavg") ? File.ReadAllText("/proc/loadavg").Split(' ')[0] : "unknown";

    private static string Fact(string name)
    {
        if (!File.Exists("/proc/cpuinfo")) return "unknown";
        var line = File.ReadLines("/proc/cpuinfo").FirstOrDefault(l => l.Split(':')[0].Trim() == name);
        return line is null ? "unknown" : line[(line.IndexOf(':', StringComparison.Ordinal) + 1)..].Trim();
    }
}
