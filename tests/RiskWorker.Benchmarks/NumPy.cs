namespace RiskWorker.Benchmarks;

/// <summary>Which NumPy stands on the other side: its matrix product is as fast as the BLAS that it finds.</summary>
/// <param name="Blas">The BLAS.</param>
/// <param name="Description">Versions, and how fast that product is.</param>
internal sealed record NumPy(string Blas, string Description)
{
    private const string Script = """
        import numpy, scipy, time
        numpy.dot(numpy.ones((2, 2)), numpy.ones((2, 2)))
        libraries = sorted({line.split()[-1].split("/")[-1] for line in open("/proc/self/maps") if "blas" in line and ".so" in line})
        blas = next((l for l in libraries if "openblas" in l), libraries[0] if libraries else "a BLAS of its own")
        a = numpy.ones((200, 200)); b = numpy.ones((200, 10000)); times = []
        for _ in range(5):
            start = time.perf_counter(); a @ b; times.append(time.perf_counter() - start)
        print(blas)
        print(f"NumPy {numpy.__version__}, SciPy {scipy.__version__}, {blas}: {.8 / min(times):.0f} GFLOP/s in a product of 200 x 200 by 200 x 10,000.")
        """;

    /// <summary>The one that <paramref name="python"/> finds.</summary>
    public static NumPy Of(string python)
    {
        var lines = ChildProcess.Run(python, ["-c", Script]).Output.Trim().Split('\n');
        return new(lines[0], lines[1]);
    }
}
