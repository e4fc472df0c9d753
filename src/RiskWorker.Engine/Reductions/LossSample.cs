using RiskWorker.Engine.Simulation;

namespace RiskWorker.Engine.Reductions;

/// <summary>
/// Every loss of some of the first blocks. Each block has a place of its own, so threads may add different blocks to one
/// sample at the same time.
/// </summary>
public sealed class LossSample
{
    private double[][] _blocks = [];
    private int[] _widths = [];

    /// <summary>A sample of no series.</summary>
    internal LossSample()
    {
    }

    /// <summary>Number of series.</summary>
    public int Rows { get; private set; }

    /// <summary>Scenarios from the first block on for which there is room.</summary>
    public int Scenarios { get; private set; }

    /// <summary>First blocks whose losses are those of full revaluation; those of the others are by surface, and must be drawn again where the tail has to be exact.</summary>
    internal int ExactBlocks { get; set; }

    /// <summary>The losses of series <paramref name="row"/>, by scenario.</summary>
    /// <exception cref="InvalidOperationException">A block has not been added.</exception>
    public double[] Row(int row)
    {
        var losses = new double[Scenarios];
        CopyRow(row, losses);
        return losses;
    }

    /// <summary>Whether the first <paramref name="width"/> scenarios of <paramref name="block"/> are there.</summary>
    internal bool Holds(int block, int width) => block < _widths.Length && _widths[block] >= width;

    /// <summary>The first <paramref name="width"/> scenarios of a block that the sample holds: its own array, not to be written to.</summary>
    internal LossBlock Block(int block, int width) => new(block, width, _blocks[block]);

    /// <summary>As <see cref="Row"/>, into <paramref name="losses"/>.</summary>
    internal void CopyRow(int row, Span<double> losses)
    {
        var range = BlockRange.From(0, Scenarios);
        for (var block = 0; block < range.End; block++)
        {
            var width = range.WidthOf(block);
            if (!Holds(block, width)) throw new InvalidOperationException($"Block {block} is not in the sample.");
            Block(block, width).Row(row).CopyTo(losses[(block * Blocks.Size)..]);
        }
    }

    /// <summary>Forgets every block, and makes room for <paramref name="scenarios"/> losses of each of <paramref name="rows"/> series.</summary>
    internal LossSample Reset(int rows, int scenarios)
    {
        (Rows, Scenarios) = (rows, scenarios);
        var blocks = ExactBlocks = Blocks.Covering(scenarios);
        if (_blocks.Length < blocks) Array.Resize(ref _blocks, blocks);
        _widths = new int[blocks];
        for (var block = 0; block < blocks; block++) _blocks[block] ??= [];
        return this;
    }

    /// <summary>Copies a block to its place.</summary>
    internal void Add(in LossBlock block)
    {
        Room.For(ref _blocks[block.Index], Rows * Blocks.Size);
        for (var row = 0; row < Rows; row++) block.Row(row).CopyTo(_blocks[block.Index].AsSpan(row * Blocks.Size));
        _widths[block.Index] = block.Width;
    }

    /// <summary>Adds copies of the blocks of <paramref name="from"/>.</summary>
    internal void Merge(LossSample from)
    {
        for (var block = 0; block < from._widths.Length; block++)
        {
            if (from._widths[block] > 0) Add(from.Block(block, from._widths[block]));
        }
    }
}

/// <summary>Keeps every loss of the first scenarios: for a pilot, whose few scenarios may be held whole.</summary>
/// <param name="rows">Series of the plan.</param>
/// <param name="scenarios">Scenarios, from the first.</param>
/// <param name="bySurface">Whether losses by surface will do; otherwise they are those of full revaluation, and surfaces are checked against them.</param>
public sealed class LossSampleReduction(int rows, int scenarios, bool bySurface = false) : Reduction<LossSample>
{
    /// <inheritdoc/>
    public override double[]? ExactFrom { get; } = bySurface ? [.. Enumerable.Repeat(double.PositiveInfinity, rows)] : null;

    /// <inheritdoc/>
    public override LossSample Empty(int blocks = 0) => new LossSample().Reset(rows, scenarios);

    /// <inheritdoc/>
    public override void Accumulate(LossSample record, in LossBlock block) => record.Add(block);

    /// <inheritdoc/>
    public override void Merge(LossSample record, LossSample from) => record.Merge(from);
}
