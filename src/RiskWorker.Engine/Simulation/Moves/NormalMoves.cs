using RiskWorker.Engine.Plans;

namespace RiskWorker.Engine.Simulation.Moves;

/// <summary>The log-normal model: the same correlated normals at every horizon.</summary>
internal sealed class NormalMoves(int capacity) : MoveSource
{
    private readonly CorrelatedNormals _normals = new(capacity);

    /// <inheritdoc/>
    public override void Draw(long first, int width) => _normals.Draw(first, width);

    /// <inheritdoc/>
    public override double[] At(int horizon) => _normals.Rows;

    /// <inheritdoc/>
    protected override void Serve(RevaluationPlan plan) => _normals.Serve(plan);
}
