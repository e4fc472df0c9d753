using System.CommandLine;

namespace RiskWorker.Benchmarks;

/// <summary>Options that name programs.</summary>
internal static class CommonPaths
{
    /// <summary>A Python with NumPy and SciPy.</summary>
    public static Option<string> Python { get; } = new("--python") { Description = "Python with NumPy and SciPy", DefaultValueFactory = _ => File.Exists("/usr/bin/python3") ? "/usr/bin/python3" : "python3" };

    /// <summary>The product, by default as it was built beside this program.</summary>
    public static Option<string> Riskworker { get; } = new("--riskworker") { Description = "Executable of riskworker", DefaultValueFactory = _ => Path.Combine(AppContext.BaseDirectory, "riskworker") };
}
