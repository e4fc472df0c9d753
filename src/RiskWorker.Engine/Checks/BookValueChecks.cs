using System.Globalization;
using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Pricing;

namespace RiskWorker.Engine.Checks;

/// <summary>Values of each book's own lines against the book of record, and against the previous date.</summary>
internal static class BookValueChecks
{
    public static void Run(Snapshot snapshot, BookTree tree, LineValue[] today, LineValue[]? previous, FindingList findings)
    {
        Differences(snapshot, tree, today, findings);
        if (previous is not null) Changes(snapshot, tree, today, previous, findings);
    }

    private static void Differences(Snapshot snapshot, BookTree tree, LineValue[] lines, FindingList findings)
    {
        var tolerance = snapshot.Settings.Checks.ValueTolerance;
        var books = new (int Compared, List<int>? Breaks)[tree.Books.Count];
        for (var i = 0; i < lines.Length; i++)
        {
            ref readonly var line = ref lines[i];
            var node = tree.IndexOf(line.Position.Book);
            if (node < 0 || line.Unpriced is not null || line.Position.MarketValue is not { } market) continue;
            books[node].Compared++;
            if (Reconciliation.IsBreak(line.Value, market, tolerance)) (books[node].Breaks ??= []).Add(i);
        }
        if (books.All(b => b.Breaks is null)) return;
        var sizes = LineSize.Of(snapshot, tree);
        for (var node = 0; node < books.Length; node++)
        {
            if (books[node].Breaks is not { } breaks) continue;
            var total = breaks.Sum(i => Math.Abs(lines[i].Value - lines[i].Position.MarketValue!.Value) * sizes.RateOf(lines[i].Instrument!.Currency));
            findings.Add(FindingCodes.ValueDifference, tree.Books[node].Name, string.Create(CultureInfo.InvariantCulture,
                $"{breaks.Count:#,0} of {books[node].Compared:#,0} lines with a market value {(breaks.Count == 1 ? "differs" : "differ")} from it by more than {tolerance * 100:0.##}% ({FindingList.Names(breaks.Select(i => Named(lines[i])), breaks.Count)}), {total:#,0} {tree.ReportingCurrency} in all, so value and risk may rest on other terms than the book of record"));
        }
    }

    private static string Named(in LineValue line) => string.Create(CultureInfo.InvariantCulture,
        $"{line.Position.Instrument} {line.Value:#,0.##} against {line.Position.MarketValue:#,0.##} {line.Instrument!.Currency}");

    private static void Changes(Snapshot snapshot, BookTree tree, LineValue[] today, LineValue[] previous, FindingList findings)
    {
        var limit = snapshot.Settings.Checks.GrossChange;
        var (now, then) = (Totals(today, tree), Totals(previous, tree));
        for (var node = 0; node < now.Length; node++)
        {
            if (!IsLarge(then[node].Count, now[node].Count, limit) && !IsLarge(then[node].Gross, now[node].Gross, limit)) continue;
            findings.Add(FindingCodes.HoldingsChange, tree.Books[node].Name, string.Create(CultureInfo.InvariantCulture,
                $"{now[node].Count:#,0} positions with a gross value of {now[node].Gross:#,0} {tree.ReportingCurrency} stand against {then[node].Count:#,0} with {then[node].Gross:#,0} on {snapshot.Previous?.Date:yyyy-MM-dd}, a change of more than {limit * 100:0.##}% that moves the book's figures with it"));
        }
    }

    private static bool IsLarge(double before, double after, double limit) => Math.Abs(after - before) > limit * before;

    private static (int Count, double Gross)[] Totals(LineValue[] lines, BookTree tree)
    {
        var totals = new (int Count, double Gross)[tree.Books.Count];
        foreach (ref readonly var line in lines.AsSpan())
        {
            var node = tree.IndexOf(line.Position.Book);
            if (node < 0) continue;
            totals[node].Count++;
            totals[node].Gross += Math.Abs(line.Exposure);
        }
        return totals;
    }
}
