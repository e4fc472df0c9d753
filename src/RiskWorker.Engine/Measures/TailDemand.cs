using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Statistics;

namespace RiskWorker.Engine.Measures;

/// <summary>How deep into the tail a run must see: the ranks of its measures, those of their intervals included.</summary>
public sealed class TailDemand
{
    private readonly Confidence[] _var;
    private readonly Confidence[] _es;
    private readonly decimal[] _levels;
    private readonly bool _isWhole;
    private volatile IntervalRanks? _ranks;

    /// <summary>Takes the measures, and every level at which an interval of them is asked for.</summary>
    public TailDemand(IEnumerable<MeasureSpec> measures, IEnumerable<decimal> levels)
    {
        var all = measures.ToList();
        _var = [.. all.Where(m => m.Kind == MeasureKind.Var).Select(m => m.Confidence).Distinct()];
        _es = [.. all.Where(m => m.Kind != MeasureKind.Var).Select(m => m.Confidence).Distinct()];
        _levels = [.. levels.Distinct()];
    }

    private TailDemand()
        : this([], []) => _isWhole = true;

    /// <summary>Every loss of the sample.</summary>
    public static TailDemand Whole { get; } = new();

    /// <summary>The deepest rank from the worst that <paramref name="scenarios"/> scenarios need.</summary>
    public int DeepestRank(int scenarios)
    {
        if (_isWhole) return scenarios;
        var (deepest, ranks) = (1, RanksOf(scenarios));
        foreach (var confidence in _var.Concat(_es))
        {
            deepest = Math.Max(deepest, scenarios - BinomialRanks.VarRank(scenarios, confidence.Level) + 1);
            deepest = Math.Max(deepest, Math.Min(scenarios, (int)decimal.Ceiling(BinomialRanks.TailWeight(scenarios, confidence.Level))));
        }
        foreach (var confidence in _var)
        {
            foreach (var level in _levels)
            {
                if (ranks.Interval(confidence.Level, level).Low is { } low) deepest = Math.Max(deepest, scenarios - low + 1);
            }
        }
        return deepest;
    }

    /// <summary>The ranks of intervals in <paramref name="scenarios"/> scenarios; those of the size asked for last are remembered.</summary>
    internal IntervalRanks RanksOf(int scenarios) => _ranks is { } last && last.Count == scenarios ? last : _ranks = new(scenarios);
}
