using RiskWorker.Engine.Models;
using RiskWorker.Engine.Plans;
using RiskWorker.Numerics.Estimation;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Engine.Simulation.Moves;

/// <summary>Paths of residuals of past days, drawn jointly for all factors, one day after the other.</summary>
internal sealed class FilteredMoves(int capacity) : MoveSource
{
    private RevaluationPlan _plan = null!;
    private FilteredHistoryLaw _law = null!;
    private int[] _days = [];
    private double[] _uniforms = [];
    private double[] _drawn = [];
    private double[] _variances = [];
    private double[] _sums = [];
    private double[][] _atHorizon = [];
    private int _width;

    /// <inheritdoc/>
    public override void Draw(long first, int width)
    {
        _width = width;
        var (stream, longest) = (new DrawStream(_plan.Seed, DrawPurpose.ResidualDays, 0), _plan.Horizons[^1].Days);
        for (var day = 0; day < longest; day += 2)
        {
            UniformDraws.FillPair(stream, (ulong)first, (uint)day / 2, _uniforms.AsSpan(0, width), _uniforms.AsSpan(width, width));
            Choose(_uniforms.AsSpan(0, width), day);
            if (day + 1 < longest) Choose(_uniforms.AsSpan(width, width), day + 1);
        }
        for (var row = 0; row < _plan.Moves.Rows; row++) Walk(row);
    }

    /// <inheritdoc/>
    public override double[] At(int horizon) => _atHorizon[horizon];

    // One place for each horizon: a path passes them all.
    private void Walk(int row)
    {
        var residuals = _law.Residuals.AsSpan(row * _law.Days, _law.Days);
        Span<double> drawn = _drawn.AsSpan(0, _width), variances = _variances.AsSpan(0, _width), sums = _sums.AsSpan(0, _width);
        variances.Fill(_law.Variances[row]);
        sums.Clear();
        for (var (day, next) = (0, 0); next < _atHorizon.Length; day++)
        {
            var days = _days.AsSpan(day * _width, _width);
            for (var lane = 0; lane < days.Length; lane++) drawn[lane] = residuals[days[lane]];
            VarianceStep.Advance(_law.Processes[row], drawn, variances, sums);
            if (day + 1 == _plan.Horizons[next].Days) sums.CopyTo(_atHorizon[next++].AsSpan(row * _width, _width));
        }
    }

    private void Choose(ReadOnlySpan<double> uniforms, int day)
    {
        var days = _days.AsSpan(day * _width, _width);
        for (var lane = 0; lane < days.Length; lane++) days[lane] = (int)(uniforms[lane] * _law.Days);
    }

    /// <inheritdoc/>
    protected override void Serve(RevaluationPlan plan)
    {
        (_plan, _law) = (plan, (FilteredHistoryLaw)plan.Law);
        Room.For(ref _uniforms, 2 * capacity);
        Room.For(ref _drawn, capacity);
        Room.For(ref _variances, capacity);
        Room.For(ref _sums, capacity);
        if (_days.Length < plan.Horizons[^1].Days * capacity) _days = new int[plan.Horizons[^1].Days * capacity];
        if (_atHorizon.Length != plan.Horizons.Count) _atHorizon = [.. plan.Horizons.Select(_ => Array.Empty<double>())];
        for (var horizon = 0; horizon < _atHorizon.Length; horizon++) Room.For(ref _atHorizon[horizon], plan.Moves.Rows * capacity);
    }
}
