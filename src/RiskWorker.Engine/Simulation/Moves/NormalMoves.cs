using RiskWorker.Engine.Plans;

namespace RiskWorker.Engine.Simulation.Moves;

/// <summary>The log-normal model: the same correlated normals at every horizon, and a bridge to them inside one.</summary>
internal sealed class NormalMoves(int capacity) : MoveSource
{
    private readonly CorrelatedNormals _normals = new(capacity);
    private BridgeMoves? _bridge;
    private RevaluationPlan _plan = null!;

    /// <inheritdoc/>
    public override void Draw(long first, int width)
    {
        _normals.Draw(first, width);
        _bridge?.Begin(first, width);
    }

    /// <inheritdoc/>
    public override double[] At(int horizon) => _normals.Rows;

    /// <inheritdoc/>
    public override double[] Inside(int horizon, int day) => _bridge!.At(_plan.Horizons[horizon].Days, day, _normals.Rows);

    /// <inheritdoc/>
    protected override void Serve(RevaluationPlan plan)
    {
        _plan = plan;
        _normals.Serve(plan);
        if (plan.Aged.Count == 0)
        {
            _bridge = null;
            return;
        }
        _bridge ??= new(capacity);
        _bridge.Serve(plan);
    }
}
