using RiskWorker.Engine.Plans;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Engine.Simulation.Moves;

/// <summary>Z = L e: a standard normal for each moving factor, correlated as the plan says.</summary>
internal sealed class CorrelatedNormals(int capacity)
{
    private FactorMoves _moves = null!;
    private ulong _seed;
    private double[] _draws = [];
    private double[] _normals = [];

    /// <summary>The normals last drawn, a row a moving factor, as far apart as there are scenarios.</summary>
    public double[] Rows => _normals;

    /// <summary>Turns to <paramref name="plan"/>.</summary>
    public void Serve(RevaluationPlan plan)
    {
        (_moves, _seed) = (plan.Moves, plan.Seed);
        Room.For(ref _draws, (_moves.Rank + 1) * capacity); // room for the second half of an odd last pair
        Room.For(ref _normals, _moves.Rows * capacity);
    }

    /// <summary>Draws scenarios <paramref name="first"/> to first + width - 1.</summary>
    /// <param name="first">Number of the first scenario.</param>
    /// <param name="width">Scenarios.</param>
    /// <param name="day">Which day's, where days are drawn one by one: each has a stream of its own, the first that of a single draw.</param>
    public void Draw(long first, int width, uint day = 0) => Draw(new DrawStream(_seed, DrawPurpose.FactorMoves, day), first, width);

    /// <summary>The same from a stream of its own.</summary>
    public void Draw(DrawStream stream, long first, int width)
    {
        for (var draw = 0; draw < _moves.Rank; draw += 2)
            NormalDraws.FillPair(stream, (ulong)first, (uint)draw / 2, _draws.AsSpan(draw * width, width), _draws.AsSpan((draw + 1) * width, width));
        TriangularProduct.Multiply(_moves.Lower, _moves.Rows, _moves.Rank, _draws.AsSpan(0, _moves.Rank * width), _normals.AsSpan(0, _moves.Rows * width), width);
    }
}
