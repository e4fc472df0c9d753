using RiskWorker.Engine.Plans;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Engine.Simulation.Moves;

/// <summary>
/// B at days inside a horizon, given its value √h Z at the end: the Brownian bridge of the whole factor vector, with the same L as the end, by
/// bisection (Lévy's construction: the middle of two days that are known is their straight line plus √((m - a)(b - m)/(b - a)) L e).
/// </summary>
/// <remarks>
/// A day hangs on the middles that lead to it, so its B is a function of seed, scenario, horizon and day, whichever other days a book asks
/// for; drawn date upon date it would change with every position added. Days asked for in ascending order share their middles.
/// </remarks>
internal sealed class BridgeMoves(int capacity)
{
    private const int Known = -1; // the end that is not a middle: 0 at the start, √h Z at the horizon
    private readonly CorrelatedNormals _normals = new(capacity);
    private double[][] _middles = [];
    private readonly List<Interval> _path = [];
    private RevaluationPlan _plan = null!;
    private long _first;
    private int _width;
    private int _horizon;

    /// <summary>Turns to <paramref name="plan"/>.</summary>
    public void Serve(RevaluationPlan plan)
    {
        _plan = plan;
        _normals.Serve(plan);
        var depth = 0;
        for (var days = plan.Horizons[^1].Days; days > 1; days = (days + 1) / 2) depth++;
        if (_middles.Length < depth) Array.Resize(ref _middles, depth);
        for (var i = 0; i < depth; i++)
        {
            _middles[i] ??= [];
            Room.For(ref _middles[i], plan.Moves.Rows * capacity);
        }
        _path.Clear();
    }

    /// <summary>Turns to scenarios <paramref name="first"/> to first + width - 1.</summary>
    public void Begin(long first, int width)
    {
        (_first, _width) = (first, width);
        _path.Clear();
    }

    /// <summary>B on <paramref name="day"/>, a row a moving factor, as far apart as there are scenarios; written over by another day.</summary>
    /// <param name="horizon">Business days to the end.</param>
    /// <param name="day">1 to <paramref name="horizon"/> - 1.</param>
    /// <param name="end">Z, the correlated normals at the end, rows as here.</param>
    public double[] At(int horizon, int day, double[] end)
    {
        if (_path.Count == 0 || _horizon != horizon)
        {
            _horizon = horizon;
            _path.Clear();
            Bisect(new(0, horizon, Known, Known), end);
        }
        while (!_path[^1].Holds(day)) _path.RemoveAt(_path.Count - 1);
        while (_path[^1].Middle != day) Bisect(_path[^1].Half(day, _path.Count - 1), end);
        return _middles[_path.Count - 1];
    }

    /// <summary>The stream of the middle <paramref name="day"/> of a horizon: pairs of the two are numbered, below the upper half that pricers own.</summary>
    public static DrawStream StreamOf(ulong seed, int horizon, int day) => new(seed, DrawPurpose.PathSteps, (uint)((((horizon - 1) * (horizon - 2)) / 2) + day - 1));

    private void Bisect(in Interval interval, double[] end)
    {
        var (size, length) = (_plan.Moves.Rows * _width, (double)(interval.High - interval.Low));
        var middle = _middles[_path.Count].AsSpan(0, size);
        _normals.Draw(StreamOf(_plan.Seed, _horizon, interval.Middle), _first, _width);
        var (before, after) = ((interval.Middle - interval.Low) / length, (interval.High - interval.Middle) / length);
        middle.Clear();
        BookProfit.AddLinear(_normals.Rows.AsSpan(0, size), 0, Math.Sqrt(before * after * length), middle);
        if (interval.LowPlace != Known) BookProfit.AddLinear(_middles[interval.LowPlace].AsSpan(0, size), 0, after, middle);
        if (interval.HighPlace != Known) BookProfit.AddLinear(_middles[interval.HighPlace].AsSpan(0, size), 0, before, middle);
        else BookProfit.AddLinear(end.AsSpan(0, size), 0, before * Math.Sqrt(_horizon), middle);
        _path.Add(interval);
    }

    /// <summary>Two days whose B is known, and where it is kept.</summary>
    private readonly record struct Interval(int Low, int High, int LowPlace, int HighPlace)
    {
        public int Middle => (Low + High) / 2;

        public bool Holds(int day) => Low < day && day < High;

        public Interval Half(int day, int place) => day < Middle ? new(Low, Middle, LowPlace, place) : new(Middle, High, place, HighPlace);
    }
}
