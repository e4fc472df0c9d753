using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Pricing;

namespace RiskWorker.Engine.Checks;

/// <summary>What was held, how it ties to the book of record, and what no figure holds.</summary>
public static class HoldingsSummary
{
    /// <summary>Sums up the lines of a date.</summary>
    /// <param name="snapshot">Where they are from.</param>
    /// <param name="currencies">Turns amounts into the reporting currency.</param>
    /// <param name="levels">Today's level of every factor of the snapshot.</param>
    /// <param name="today">Its positions, valued.</param>
    /// <param name="previous">Those of the previous date at its own prices; null where there are none.</param>
    public static Holdings Of(Snapshot snapshot, CurrencyTable currencies, double[] levels, LineValue[] today, LineValue[]? previous)
    {
        var books = snapshot.Books.Select(b => b.Name).ToHashSet(StringComparer.Ordinal);
        var sizes = new LineSize(snapshot, currencies, levels);
        var (priced, reconciled, breakTotal) = (0, 0, 0.0);
        var (breaks, unpriced) = (new List<(double Size, ReconciliationBreak Break)>(), new List<UnpricedLine>());
        foreach (ref readonly var line in today.AsSpan())
        {
            if (ReasonLeftOut(line, books) is { } reason)
            {
                unpriced.Add(new(line.Position.Book, line.Position.Instrument, line.Instrument?.Kind ?? "-", line.Position.Quantity, sizes.Of(line), reason));
                continue;
            }
            priced++;
            if (line.Position.MarketValue is not { } market) continue;
            reconciled++;
            if (!Reconciliation.IsBreak(line.Value, market, snapshot.Settings.Checks.ValueTolerance)) continue;
            var currency = line.Instrument!.Currency;
            var difference = Math.Abs(line.Value - market) * sizes.RateOf(currency);
            breakTotal += difference;
            breaks.Add((difference, new(line.Position.Book, line.Position.Instrument, currency, line.Value, market)));
        }
        return new()
        {
            Positions = today.Length,
            Priced = priced,
            GrossValue = GrossValue(today, books),
            PreviousGrossValue = previous is null ? null : GrossValue(previous, books),
            Reconciled = reconciled,
            Breaks = [.. breaks.OrderByDescending(b => b.Size).Select(b => b.Break)],
            BreakTotal = breakTotal,
            Unpriced = [.. unpriced.OrderByDescending(u => u.Size ?? double.MaxValue)], // one of unknown size may be the largest
        };
    }

    private static string? ReasonLeftOut(in LineValue line, HashSet<string> books) =>
        books.Contains(line.Position.Book) ? line.Unpriced?.Clause : "its book is not in books.csv";

    private static double GrossValue(LineValue[] lines, HashSet<string> books)
    {
        var sum = 0.0;
        foreach (ref readonly var line in lines.AsSpan())
        {
            if (ReasonLeftOut(line, books) is null) sum += Math.Abs(line.Exposure);
        }
        return sum;
    }
}
