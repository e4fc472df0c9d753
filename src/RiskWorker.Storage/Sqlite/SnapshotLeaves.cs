using RiskWorker.Domain.Books;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite;

/// <summary>The hashed parts of a snapshot: one a file, and one a date where a file has dates.</summary>
internal static class SnapshotLeaves
{
    /// <summary>Leaves of the files without dates; covariance apart, which only some settings read.</summary>
    public static IReadOnlyList<SnapshotLeaf> Reference(ReferenceData data)
    {
        var text = new CanonicalText();
        foreach (var b in data.Books) text.Text(b.Name).Text(b.Parent).Text(b.DisplayName).Text(b.Currency).End();
        var books = text.Leaf("books");
        foreach (var f in data.Factors)
        {
            text.Text(f.Name).Text(Spelling.Of(f.Class)).Text(Spelling.Of(f.Shock)).Text(f.Currency).Text(f.Curve).Number(f.TenorYears).Text(f.Calendar)
                .Value(f.LiquidityDays).Text(f.Proxy).Number(f.Beta).End();
        }
        var factors = text.Leaf("factors");
        foreach (var l in data.Limits)
        {
            text.Text(l.Name).Text(l.Book).Text(Spelling.Of(l.Measure.Kind)).Value<decimal>(l.Measure.Confidence.Level).Value<int>(l.Measure.Horizon.Days).Number(l.Amount)
                .Text(Spelling.Of(l.Basis)).Text(l.ReferenceBook).Number(l.WarnAt).Date(l.ValidFrom).Date(l.ValidTo).Text(l.Approver).Text(l.Reason).End();
        }
        var limits = text.Leaf("limits");
        foreach (var h in data.Holidays) text.Text(h.Calendar).Date(h.Date).End();
        var holidays = text.Leaf("holidays");
        foreach (var w in data.FeedWarnings) text.Text(w.Code).Text(w.Subject).Text(w.Message).End();
        return [books, factors, limits, holidays, text.Leaf("feed-warnings")];
    }

    /// <summary>Instruments by the terms as they are stored, which decide what is read from them.</summary>
    public static SnapshotLeaf Instruments(IEnumerable<IReadOnlyList<string?>> rows)
    {
        var text = new CanonicalText();
        foreach (var row in rows)
        {
            foreach (var cell in row) text.Text(cell);
            text.End();
        }
        return text.Leaf("instruments");
    }

    public static SnapshotLeaf Covariance(IEnumerable<CovarianceEntry> entries)
    {
        var text = new CanonicalText();
        foreach (var c in entries) text.Text(c.Factor).Text(c.Other).Number(c.Value).End();
        return text.Leaf("covariance");
    }

    /// <summary>One leaf for each date of the table.</summary>
    public static SnapshotLeaf[] Observations(ObservationHistory history)
    {
        var leaves = new SnapshotLeaf[history.Count];
        var text = new CanonicalText();
        for (var i = 0; i < leaves.Length; i++)
        {
            for (var j = 0; j < history.Factors.Count; j++)
            {
                if (history.Column(j)[i] is var value && !double.IsNaN(value)) text.Text(history.Factors[j]).Number(value).End();
            }
            leaves[i] = text.Leaf("observations/" + Iso.Of(history.Dates[i]));
        }
        return leaves;
    }

    public static Dictionary<DateOnly, SnapshotLeaf> Adjustments(IEnumerable<Adjustment> adjustments) => ByDate(adjustments, a => a.Date, "adjustments",
        (text, a) => text.Text(a.Factor).Number(a.Ratio).Text(a.Reason).End());

    public static Dictionary<DateOnly, SnapshotLeaf> Profit(IEnumerable<ProfitAndLoss> rows) => ByDate(rows, p => p.Date, "pnl",
        (text, p) => text.Text(p.Book).Number(p.Actual).Number(p.Hypothetical).End());

    public static SnapshotLeaf Positions(DateOnly date, IReadOnlyList<Position> positions)
    {
        var text = new CanonicalText();
        foreach (var p in positions) text.Text(p.Book).Text(p.Instrument).Number(p.Quantity).Text(p.Trade).Number(p.MarketValue).End();
        return text.Leaf("positions/" + Iso.Of(date));
    }

    public static SnapshotLeaf Run(CountedRun run) => SnapshotLeaf.Of("runs/" + Iso.Of(run.AsOf), $"{run.Run}\n{run.Hash}\n");

    /// <summary>The date that a run is for, and the date that it takes as the one before.</summary>
    public static SnapshotLeaf AsOf(DateOnly asOf, DateOnly? previous) => SnapshotLeaf.Of("as-of", $"{Iso.Of(asOf)}\n{Iso.Of(previous)}\n");

    private static Dictionary<DateOnly, SnapshotLeaf> ByDate<T>(IEnumerable<T> rows, Func<T, DateOnly> date, string file, Action<CanonicalText, T> write)
    {
        var text = new CanonicalText();
        return rows.GroupBy(date).ToDictionary(day => day.Key, day =>
        {
            foreach (var row in day) write(text, row);
            return text.Leaf(file + "/" + Iso.Of(day.Key));
        });
    }
}
