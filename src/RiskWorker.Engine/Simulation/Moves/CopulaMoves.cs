using RiskWorker.Engine.Models;
using RiskWorker.Engine.Plans;
using RiskWorker.Numerics.Distributions;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Engine.Simulation.Moves;

/// <summary>
/// A t copula with t margins, day by day: each day its own vector of normals and its own mixing draw, each factor carried to its own margin,
/// the days added.
/// </summary>
internal sealed class CopulaMoves(int capacity) : MoveSource
{
    private readonly CorrelatedNormals _normals = new(capacity);
    private RevaluationPlan _plan = null!;
    private StudentLaw? _law;
    private MixingQuantile _mixing = null!;
    private MarginMap[] _margins = [];
    private double[] _roots = [];
    private double[] _variates = [];
    private double[] _sums = [];
    private double[] _moves = [];
    private long _first;
    private int _width, _days;

    /// <inheritdoc/>
    public override void Draw(long first, int width)
    {
        (_first, _width, _days) = (first, width, 0);
        _sums.AsSpan(0, _plan.Moves.Rows * width).Clear();
    }

    /// <inheritdoc/>
    public override double[] At(int horizon)
    {
        var days = _plan.Horizons[horizon].Days;
        if (days < _days) Draw(_first, _width); // an earlier horizon is asked for again
        for (; _days < days; _days++) AddDay(_days);
        var root = 1 / Math.Sqrt(days);
        var moves = _moves.AsSpan(0, _plan.Moves.Rows * _width);
        Elementwise.Scale(_sums.AsSpan(0, moves.Length), root, moves);
        return _moves;
    }

    private void AddDay(int day)
    {
        _normals.Draw(_first, _width, (uint)day);
        var roots = _roots.AsSpan(0, _width);
        DrawMixing(day, roots);
        for (var row = 0; row < _plan.Moves.Rows; row++)
        {
            var variates = _variates.AsSpan(0, _width);
            Elementwise.Product(_normals.Rows.AsSpan(row * _width, _width), roots, variates);
            _margins[row].Of(variates, variates);
            Elementwise.Add(variates, _sums.AsSpan(row * _width, _width));
        }
    }

    // The very draws that MixingDraws takes for the day.
    private void DrawMixing(int day, Span<double> roots)
    {
        var other = _variates.AsSpan(0, roots.Length);
        var isOdd = (day & 1) == 1;
        UniformDraws.FillPair(new(_plan.Seed, DrawPurpose.MixingVariable, 0), (ulong)_first, (uint)day / 2, isOdd ? other : roots, isOdd ? roots : other);
        _mixing.Of(roots, roots);
        Elementwise.SquareRoot(roots, roots);
    }

    /// <inheritdoc/>
    protected override void Serve(RevaluationPlan plan)
    {
        var law = (StudentLaw)plan.Law;
        if (!ReferenceEquals(_law, law))
        {
            _mixing = new(law.DegreesOfFreedom);
            _margins = [.. law.Margins!.Select(margin => MarginMap.ToUnitVariance(law.DegreesOfFreedom, margin))];
        }
        (_plan, _law) = (plan, law);
        _normals.Serve(plan);
        Room.For(ref _roots, capacity);
        Room.For(ref _variates, capacity);
        Room.For(ref _sums, plan.Moves.Rows * capacity);
        Room.For(ref _moves, plan.Moves.Rows * capacity);
    }
}
