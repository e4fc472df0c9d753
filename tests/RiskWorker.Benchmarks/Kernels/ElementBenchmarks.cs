using BenchmarkDotNet.Attributes;

namespace RiskWorker.Benchmarks.Kernels;

/// <summary>Time an element of each kernel and of its scalar twin.</summary>
public class ElementBenchmarks
{
    private KernelPair _pair = null!;

    public static IEnumerable<string> Kernels => KernelPair.All.Keys;

    [ParamsSource(nameof(Kernels))]
    public string Kernel { get; set; } = "";

    [GlobalSetup]
    public void Choose() => _pair = KernelPair.All[Kernel];

    [Benchmark(OperationsPerInvoke = KernelPair.Count)]
    public void Lanes() => _pair.Lanes();

    [Benchmark(OperationsPerInvoke = KernelPair.Count)]
    public void Twin() => _pair.Twin();
}
