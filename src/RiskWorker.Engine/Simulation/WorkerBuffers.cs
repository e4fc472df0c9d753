using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Surfaces;

namespace RiskWorker.Engine.Simulation;

/// <summary>What one thread of a <see cref="SimulationWorkspace"/> writes to, kept from one evaluation to the next.</summary>
internal sealed class WorkerBuffers
{
    private ScenarioTile? _tile;
    private SurfaceTile? _surfaceTile;
    private SurfaceFit? _fit;
    private double[] _losses = [];
    private double[] _values = [];

    /// <summary>The tile, turned to <paramref name="plan"/>.</summary>
    public ScenarioTile TileOf(RevaluationPlan plan)
    {
        if (_tile is null) return _tile = new(plan);
        _tile.Serve(plan);
        return _tile;
    }

    /// <summary>The tile that values by surface, turned to <paramref name="plan"/> and its surfaces.</summary>
    public SurfaceTile SurfaceTileOf(RevaluationPlan plan, SurfaceSet surfaces)
    {
        if (_surfaceTile is null || !_surfaceTile.Serves(surfaces)) _surfaceTile = new(plan, surfaces, TileOf(plan));
        return _surfaceTile;
    }

    /// <summary>Room for the losses of one block of <paramref name="rows"/> series.</summary>
    public double[] BlockOf(int rows)
    {
        Room.For(ref _losses, rows * Blocks.Size);
        return _losses;
    }

    /// <summary>What fits surfaces.</summary>
    public SurfaceFit Fit => _fit ??= new();

    /// <summary>Room for <paramref name="count"/> numbers.</summary>
    public Span<double> Values(int count)
    {
        Room.For(ref _values, count);
        return _values.AsSpan(0, count);
    }

    /// <summary>What sorting tails needs.</summary>
    public TailOrder Order { get; } = new();
}
