namespace RiskWorker.Engine.Simulation;

/// <summary>The fixed unit of work: 4,096 consecutive scenarios, the first of block b being 4,096 b.</summary>
public static class Blocks
{
    /// <summary>Scenarios in a whole block.</summary>
    public const int Size = 4096;

    /// <summary>Blocks that hold <paramref name="scenarios"/>, the last perhaps short.</summary>
    public static int Covering(int scenarios) => (scenarios + Size - 1) / Size;
}

/// <summary>Blocks <paramref name="First"/> up to, not including, <paramref name="End"/>, of a run that ends at <paramref name="Scenarios"/>.</summary>
public readonly record struct BlockRange(int First, int End, int Scenarios)
{
    /// <summary>The whole blocks among the first <paramref name="scenarios"/>, from block <paramref name="first"/> on.</summary>
    public static BlockRange Whole(int first, int scenarios) => new(first, scenarios / Blocks.Size, scenarios);

    /// <summary>Every block that holds one of the first <paramref name="scenarios"/>, from block <paramref name="first"/> on.</summary>
    public static BlockRange From(int first, int scenarios) => new(first, Blocks.Covering(scenarios), scenarios);

    /// <summary>Number of blocks.</summary>
    public int Count => Math.Max(0, End - First);

    /// <summary>Scenarios in block <paramref name="block"/>.</summary>
    public int WidthOf(int block) => Math.Min(Blocks.Size, Scenarios - (block * Blocks.Size));
}

/// <summary>The losses of one block: a row a series of the plan, <see cref="Blocks.Size"/> apart.</summary>
/// <param name="Index">Number of the block.</param>
/// <param name="Width">Scenarios in it.</param>
/// <param name="Values">Losses, row by row; positive is a loss.</param>
/// <param name="Revalued">Scenarios that were revalued fully after a value by surface, each counted once for every node and horizon.</param>
public readonly record struct LossBlock(int Index, int Width, double[] Values, long Revalued = 0)
{
    /// <summary>Number of the block's first scenario.</summary>
    public long FirstScenario => (long)Index * Blocks.Size;

    /// <summary>The losses of series <paramref name="row"/>.</summary>
    public ReadOnlySpan<double> Row(int row) => Values.AsSpan(row * Blocks.Size, Width);
}
