using System.Runtime.CompilerServices;

namespace RiskWorker.Engine.Simulation;

/// <summary>Rows of numbers side by side, one number a lane. The memory stays from one use to the next.</summary>
internal sealed class LaneTable
{
    private double[] _values = [];
    private int _capacity;

    /// <summary>Lanes in use.</summary>
    public int Width { get; set; }

    /// <summary>The lanes of row <paramref name="row"/>.</summary>
    public Span<double> this[int row]
    {
        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        get => _values.AsSpan(row * _capacity, Width);
    }

    /// <summary>Makes room for so many rows of so many lanes; what they hold is left open.</summary>
    public void Shape(int rows, int capacity)
    {
        _capacity = capacity;
        Room.For(ref _values, rows * capacity);
    }

    /// <summary>Sets rows <paramref name="from"/> up to, not including, <paramref name="to"/> to 0.</summary>
    public void Clear(int from, int to) => _values.AsSpan(from * _capacity, (to - from) * _capacity).Clear();
}
