using RiskWorker.Domain.Books;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Plans;

namespace RiskWorker.Engine.Limits;

/// <summary>Holds limits against measures, the sampling interval deciding what may be said.</summary>
public sealed class LimitEvaluator
{
    private readonly BookTree _tree;
    private readonly RevaluationPlan _plan;
    private readonly NodeMeasures _measures;
    private readonly decimal _level;

    /// <summary>Takes the measures and the level of every interval.</summary>
    public LimitEvaluator(BookTree tree, RevaluationPlan plan, NodeMeasures measures, decimal level) => (_tree, _plan, _measures, _level) = (tree, plan, measures, level);

    /// <summary>The level at which each of two independent errors is bounded so that both together stay within 1 - <paramref name="level"/>.</summary>
    public static decimal LevelOfEachOfTwo(decimal level) => 1 - ((1 - level) / 2);

    /// <summary>Where <paramref name="limit"/> stands. A limit that cannot be decided whatever the sample has no <see cref="LimitResult.Used"/>.</summary>
    public LimitResult Of(Limit limit)
    {
        var node = _tree.IndexOf(limit.Book);
        var measure = _measures.Of(node, limit.Measure, _level);
        var use = limit.Basis switch
        {
            LimitBasis.Amount => Divide(measure, limit.Amount),
            LimitBasis.Nav => Divide(measure, limit.Amount * ValueOf(node)),
            _ => RelativeUse(limit, node),
        };
        return new LimitResult
        {
            Limit = limit,
            Currency = _tree.Books[node].Currency,
            Value = measure.Value,
            Low = measure.Low,
            High = measure.High,
            Level = measure.Level,
            Used = use?.Value,
            UsedLow = use?.Low,
            UsedHigh = use?.High,
            Status = StatusOf(use, limit.WarnAt),
        };
    }

    /// <summary>Whether the value that <paramref name="limit"/> is relative to allows a decision; otherwise a clause that says why not.</summary>
    public string? Undecidable(Limit limit)
    {
        if (limit.Basis == LimitBasis.Amount) return null;
        if (ValueOf(_tree.IndexOf(limit.Book)) <= 0) return $"the value of book '{limit.Book}' is not positive";
        if (limit.Basis != LimitBasis.Book) return null;
        var reference = _tree.IndexOf(limit.ReferenceBook!);
        if (ValueOf(reference) <= 0) return $"the value of reference book '{limit.ReferenceBook}' is not positive";
        return _measures.Of(reference, limit.Measure, _level).Value > 0 ? null : $"the measure of reference book '{limit.ReferenceBook}' is not positive";
    }

    private readonly record struct Use(double Value, double? Low, double? High);

    private static LimitStatus StatusOf(Use? use, double warnAt)
    {
        if (use is not { } u) return LimitStatus.Inconclusive;
        if (u.Low > 1) return LimitStatus.Breached;
        if (!(u.High <= 1)) return LimitStatus.Inconclusive;
        return u.Value >= warnAt ? LimitStatus.Warning : LimitStatus.Within;
    }

    private static Use? Divide(MeasureResult measure, double amount) =>
        amount > 0 ? new(measure.Value / amount, measure.Low / amount, measure.High / amount) : null;

    private Use? RelativeUse(Limit limit, int node)
    {
        if (Undecidable(limit) is not null) return null;
        var level = LevelOfEachOfTwo(_level);
        var reference = _tree.IndexOf(limit.ReferenceBook!);
        var (own, other) = (_measures.Of(node, limit.Measure, level), _measures.Of(reference, limit.Measure, level));
        var scale = ValueOf(reference) / ValueOf(node) / limit.Amount;
        // A gain, divided by a larger measure, is a smaller gain: below zero the reference's ends change places.
        return new(scale * own.Value / other.Value,
            Quotient(scale * own.Low, own.Low < 0 ? other.Low : other.High),
            Quotient(scale * own.High, own.High < 0 ? other.High : other.Low));
    }

    // With an end of the reference's interval at or below zero the ratio has no bound on that side.
    private static double? Quotient(double? numerator, double? denominator) => denominator > 0 ? numerator / denominator : null;

    private double ValueOf(int node) => _plan.Nodes[node].ValueRoot / _plan.Currencies[_plan.Nodes[node].Currency].Rate;
}
