using RiskWorker.Engine.Simulation;

namespace RiskWorker.Engine.Reductions;

/// <summary>Every loss of the blocks, series by series: for a pilot, whose few scenarios may be held whole.</summary>
public sealed class LossSampleReduction(int rows, int scenarios) : Reduction<double[][]>
{
    /// <inheritdoc/>
    public override double[][] Empty() => [];

    /// <summary>The sample that blocks write into.</summary>
    public double[][] Sample { get; } = [.. Enumerable.Range(0, rows).Select(_ => new double[scenarios])];

    /// <inheritdoc/>
    public override void Accumulate(double[][] record, in LossBlock block)
    {
        for (var row = 0; row < Sample.Length; row++) block.Row(row).CopyTo(Sample[row].AsSpan((int)block.FirstScenario));
    }

    /// <inheritdoc/>
    public override void Merge(double[][] record, double[][] from)
    {
    }
}
