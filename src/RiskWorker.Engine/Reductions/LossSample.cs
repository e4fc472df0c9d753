using RiskWorker.Engine.Simulation;

namespace RiskWorker.Engine.Reductions;

/// <summary>Every loss of the first scenarios, series by series: for a pilot, whose few scenarios may be held whole.</summary>
public sealed class LossSampleReduction : Reduction<double[][]>
{
    // One array that all threads write to, each its own blocks.
    private readonly double[][] _sample;

    /// <summary>Makes room for <paramref name="scenarios"/> losses of each of <paramref name="rows"/> series.</summary>
    public LossSampleReduction(int rows, int scenarios) => _sample = [.. Enumerable.Range(0, rows).Select(_ => new double[scenarios])];

    /// <inheritdoc/>
    public override double[][] Empty(int blocks = 0) => _sample;

    /// <inheritdoc/>
    public override void Accumulate(double[][] record, in LossBlock block)
    {
        for (var row = 0; row < record.Length; row++) block.Row(row).CopyTo(record[row].AsSpan((int)block.FirstScenario));
    }

    /// <inheritdoc/>
    public override void Merge(double[][] record, double[][] from)
    {
    }
}
