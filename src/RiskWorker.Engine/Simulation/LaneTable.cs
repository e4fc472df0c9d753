namespace RiskWorker.Engine.Simulation;

/// <summary>Rows of numbers side by side, one number a lane.</summary>
internal sealed class LaneTable(int rows, int capacity)
{
    private readonly double[] _values = new double[rows * capacity];

    /// <summary>Lanes in use.</summary>
    public int Width { get; set; }

    /// <summary>The lanes of row <paramref name="row"/>.</summary>
    public Span<double> this[int row] => _values.AsSpan(row * capacity, Width);

    /// <summary>Sets rows <paramref name="from"/> up to, not including, <paramref name="to"/> to 0.</summary>
    public void Clear(int from, int to) => _values.AsSpan(from * capacity, (to - from) * capacity).Clear();
}
