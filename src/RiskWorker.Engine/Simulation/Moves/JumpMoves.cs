using RiskWorker.Engine.Models;
using RiskWorker.Engine.Plans;
using RiskWorker.Numerics.Estimation;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Engine.Simulation.Moves;

/// <summary>
/// Correlated normals and compound Poisson jumps. One uniform a factor gives the number of its own jumps at every horizon, one for all factors that of
/// the common ones, and one normal a factor the sizes of both.
/// </summary>
internal sealed class JumpMoves(int capacity) : MoveSource
{
    private readonly CorrelatedNormals _normals = new(capacity);
    private RevaluationPlan _plan = null!;
    private JumpLaw? _law;
    private CompoundJumpTerms[] _terms = [];
    private double[] _compensators = [];
    private PoissonCounts[] _common = [];
    private PoissonCounts[][] _own = [];
    private double[] _commonUniforms = [];
    private double[] _ownUniforms = [];
    private double[] _sizes = [];
    private double[] _commonCounts = [];
    private double[] _ownCounts = [];
    private double[] _moves = [];
    private int _width;

    /// <inheritdoc/>
    public override void Draw(long first, int width)
    {
        _width = width;
        _normals.Draw(first, width);
        // The second of the common pair is not used.
        UniformDraws.FillPair(new(_plan.Seed, DrawPurpose.Jumps, 0), (ulong)first, 0, _commonUniforms.AsSpan(0, width), _ownUniforms.AsSpan(0, width));
        for (var row = 0; row < _plan.Moves.Rows; row++)
        {
            if (!Jumps(row)) continue;
            var sizes = _sizes.AsSpan(row * width, width);
            UniformDraws.FillPair(new(_plan.Seed, DrawPurpose.Jumps, (uint)_plan.Moves.FactorOf[row] + 1), (ulong)first, 0, _ownUniforms.AsSpan(row * width, width), sizes);
            InverseNormal.Of(sizes, sizes);
        }
    }

    /// <inheritdoc/>
    public override double[] At(int horizon)
    {
        var days = _plan.Horizons[horizon].Days;
        Span<double> common = _commonCounts.AsSpan(0, _width), own = _ownCounts.AsSpan(0, _width);
        _common[horizon].Of(_commonUniforms.AsSpan(0, _width), common);
        for (var row = 0; row < _plan.Moves.Rows; row++)
        {
            var factor = _plan.Moves.Factors[_plan.Moves.FactorOf[row]];
            var x = _moves.AsSpan(row * _width, _width);
            LogNormalMoves.LogReturns(_normals.Rows.AsSpan(row * _width, _width), factor.Deviation * Math.Sqrt(days), (factor.Drift - _compensators[row]) * days, x);
            if (!Jumps(row)) continue;
            _own[horizon][row].Of(_ownUniforms.AsSpan(row * _width, _width), own);
            CompoundJump.Add(common, own, _sizes.AsSpan(row * _width, _width), _terms[row], x);
        }
        return _moves;
    }

    private bool Jumps(int row) => _law!.OwnPerDay[row] > 0 || (_law.CommonPerDay > 0 && _law.Common[row] != default);

    /// <inheritdoc/>
    protected override void Serve(RevaluationPlan plan)
    {
        _normals.Serve(plan);
        var rows = plan.Moves.Rows;
        Room.For(ref _commonUniforms, capacity);
        Room.For(ref _commonCounts, capacity);
        Room.For(ref _ownCounts, capacity);
        Room.For(ref _ownUniforms, Math.Max(rows, 1) * capacity);
        Room.For(ref _sizes, rows * capacity);
        Room.For(ref _moves, rows * capacity);
        (_plan, _law) = (plan, (JumpLaw)plan.Law);
        _terms = [.. Enumerable.Range(0, rows).Select(Terms)];
        _compensators = [.. Enumerable.Range(0, rows).Select(Compensator)];
        _common = [.. plan.Horizons.Select(h => new PoissonCounts(_law.CommonPerDay * h.Days))];
        _own = [.. plan.Horizons.Select(h => _law.OwnPerDay.Select(rate => new PoissonCounts(rate * h.Days)).ToArray())];
    }

    private CompoundJumpTerms Terms(int row)
    {
        var (common, own) = (_law!.Common[row], _law.Own[row]);
        return new(common.Mean, common.Deviation * common.Deviation, own.Mean, own.Deviation * own.Deviation);
    }

    private double Compensator(int row)
    {
        var isLognormal = _plan.Moves.Factors[_plan.Moves.FactorOf[row]].IsLognormal;
        return (_law!.CommonPerDay * Expected(_law.Common[row], isLognormal)) + (_law.OwnPerDay[row] * Expected(_law.Own[row], isLognormal));
    }

    // E[e^J] - 1 of a log-normal factor's jump; a rate's moves by its size.
    private static double Expected(Domain.Runs.JumpSize size, bool isLognormal) =>
        isLognormal ? Exponential.Of(Math.FusedMultiplyAdd(size.Deviation / 2, size.Deviation, size.Mean)) - 1 : size.Mean;
}
