using System.CommandLine;
using System.Globalization;
using BenchmarkDotNet.Columns;
using BenchmarkDotNet.Configs;
using BenchmarkDotNet.Jobs;
using BenchmarkDotNet.Loggers;
using BenchmarkDotNet.Reports;
using BenchmarkDotNet.Running;
using BenchmarkDotNet.Toolchains.InProcess.Emit;
using Perfolizer.Horology;

namespace RiskWorker.Benchmarks.Kernels;

/// <summary><c>kernels</c>: every kernel against its scalar twin, and the triangular product against what the core can do.</summary>
internal static class KernelCommand
{
    public static Command Create(Option<bool> record)
    {
        var command = new Command("kernels", "Times every kernel and its scalar twin on one core; DOTNET_EnableAVX512=0 in the environment gives the AVX2 figures");
        command.SetAction(parsed => Run(parsed.GetValue(record)));
        return command;
    }

    // In this process, so that the environment's switches hold; in many iterations of a few milliseconds, so that on a busy machine some are not interrupted.
    private static IConfig Settings => ManualConfig.CreateEmpty()
        .AddJob(Job.Default.WithToolchain(InProcessEmitToolchain.Instance).WithIterationTime(TimeInterval.FromMilliseconds(4)).WithWarmupCount(300).WithIterationCount(150))
        .AddColumnProvider(DefaultColumnProviders.Instance)
        .AddLogger(ConsoleLogger.Default)
        .WithOption(ConfigOptions.DisableLogFile, true);

    private static int Run(bool record)
    {
        var peak = PeakBenchmarks.Operations / Timed<PeakBenchmarks>(_ => "")[("", nameof(PeakBenchmarks.Peak))];
        var elements = Timed<ElementBenchmarks>(c => (string)c.Parameters[nameof(ElementBenchmarks.Kernel)]);
        var products = Timed<ProductBenchmarks>(c => ((int)c.Parameters[nameof(ProductBenchmarks.Factors)]).ToString(CultureInfo.InvariantCulture));
        ResultsFile.Publish($"Kernels, {Machine.Instructions}", $"{Elements(elements)}\n{Products(products, peak)}\n"
            + "One core, the fastest of 150 iterations of 4 ms: what else runs on the machine can only add to it.\n", record);
        return 0;
    }

    /// <summary>Nanoseconds an operation, by case and method.</summary>
    private static Dictionary<(string Case, string Method), double> Timed<T>(Func<BenchmarkCase, string> nameOf)
    {
        Summary summary = BenchmarkRunner.Run<T>(Settings);
        return summary.Reports.ToDictionary(r => (nameOf(r.BenchmarkCase), r.BenchmarkCase.Descriptor.WorkloadMethod.Name), r => r.ResultStatistics!.Min);
    }

    private static MarkdownTable Elements(Dictionary<(string Case, string Method), double> times)
    {
        var table = new MarkdownTable("kernel", "ns an element", "scalar twin, ns", "times faster");
        foreach (var kernel in KernelPair.All.Keys)
        {
            var (lanes, twin) = (times[(kernel, nameof(ElementBenchmarks.Lanes))], times[(kernel, nameof(ElementBenchmarks.Twin))]);
            table.Add(kernel, Number(lanes, 2), Number(twin, 2), Number(twin / lanes, 1));
        }
        return table;
    }

    private static MarkdownTable Products(Dictionary<(string Case, string Method), double> times, double peak)
    {
        var table = new MarkdownTable("triangular product", "GFLOP/s useful", "of the FMA peak", "scalar twin, GFLOP/s", "times faster");
        foreach (var factors in times.Keys.Select(k => k.Case).Distinct())
        {
            var useful = ProductBenchmarks.UsefulOperations(int.Parse(factors, CultureInfo.InvariantCulture));
            var (lanes, twin) = (useful / times[(factors, nameof(ProductBenchmarks.Lanes))], useful / times[(factors, nameof(ProductBenchmarks.Twin))]);
            table.Add($"{factors} factors", Number(lanes, 1), Number(100 * lanes / peak, 0) + "%", Number(twin, 1), Number(lanes / twin, 1));
        }
        table.Add("FMA peak", Number(peak, 1), "100%", "", "");
        return table;
    }

    private static string Number(double value, int digits) => value.ToString("F" + digits, CultureInfo.InvariantCulture);
}
