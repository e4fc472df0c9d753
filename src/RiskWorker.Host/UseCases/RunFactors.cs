using RiskWorker.Domain.Books;
using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting;
using RiskWorker.Engine.Backtesting.WalkForward;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.UseCases;

/// <summary>The factors that cost a book most on a day of counted runs, from the positions of the close before; a day is worked out once, for all its books.</summary>
internal sealed class RunFactors(SnapshotReader reader, Snapshot span, BookTree tree, IReadOnlyList<Confidence> confidences, CancellationToken cancellation)
{
    private readonly WalkForwardDay _day = new(span, tree, confidences);
    private readonly DateOnly[] _days = BacktestDays.Of(span.Observations);
    private readonly Dictionary<DateOnly, IReadOnlyDictionary<string, IReadOnlyList<FactorAmount>>> _known = [];

    /// <summary>Of a book on a day; empty where the positions are not stored, or cannot be modelled.</summary>
    public IReadOnlyList<FactorAmount> Of(DateOnly date, string book)
    {
        if (!_known.TryGetValue(date, out var books)) _known[date] = books = Day(date);
        return books.GetValueOrDefault(book) ?? [];
    }

    private IReadOnlyDictionary<string, IReadOnlyList<FactorAmount>> Day(DateOnly date)
    {
        var none = new Dictionary<string, IReadOnlyList<FactorAmount>>();
        if (Array.BinarySearch(_days, date) is not (> 0 and var at) || reader.Held(_days[at - 1]).Positions is not { Count: > 0 } held) return none;
        return _day.FactorsOf(WalkForward.Known(span, _days[at - 1], held), date, [.. tree.Books.Select(b => b.Name)], cancellation);
    }
}
