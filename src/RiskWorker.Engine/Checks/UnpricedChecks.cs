using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Pricing;

namespace RiskWorker.Engine.Checks;

/// <summary>Lines that no figure holds, by reason: one finding for the file that has to be mended.</summary>
internal static class UnpricedChecks
{
    private const string Positions = "positions.csv";
    private const string Instruments = "instruments.csv";

    public static void Run(Snapshot snapshot, BookTree tree, LineValue[] lines, FindingList findings)
    {
        var groups = new SortedDictionary<UnpricedReason, Group>();
        LineSize? sizes = null;
        foreach (ref readonly var line in lines.AsSpan())
        {
            if (line.Unpriced is not { } unpriced) continue;
            if (!groups.TryGetValue(unpriced.Reason, out var group)) groups[unpriced.Reason] = group = new();
            group.Add(line, unpriced.Clause, (sizes ??= LineSize.Of(snapshot, tree)).Of(line));
        }
        if (lines.Length > 0 && Array.TrueForAll(lines, l => l.Unpriced is not null))
            findings.Add(FindingCodes.PricedNone, Positions, $"None of the {FindingList.Count(lines.Length, "position", "positions")} can be priced, so no figure holds anything");
        foreach (var (reason, group) in groups)
        {
            var (code, subject) = CodeOf(reason);
            findings.Add(code, subject, group.Statement(tree.ReportingCurrency));
        }
    }

    private static (FindingCode Code, string Subject) CodeOf(UnpricedReason reason) => reason switch
    {
        UnpricedReason.UnknownInstrument => (FindingCodes.InstrumentUnknown, Positions),
        UnpricedReason.UnknownFactor => (FindingCodes.FactorUnknown, Instruments),
        UnpricedReason.UnknownCurrency => (FindingCodes.CurrencyUnpriced, Instruments),
        UnpricedReason.CurrencyMismatch => (FindingCodes.CurrencyMismatch, Instruments),
        UnpricedReason.Expired => (FindingCodes.InstrumentExpired, Positions),
        UnpricedReason.NotModelled => (FindingCodes.NotModelled, Instruments),
        UnpricedReason.MissingFixing => (FindingCodes.FixingMissing, Instruments),
        UnpricedReason.NoLevel => (FindingCodes.LevelMissing, "observations.csv"),
        _ => throw new ArgumentOutOfRangeException(nameof(reason), reason, "Every reason has a code."),
    };

    private sealed class Group
    {
        private readonly Dictionary<string, (string Clause, double? Size)> _instruments = new(StringComparer.Ordinal);
        private int _lines;
        private int _unsized;
        private double _size;

        public void Add(in LineValue line, string clause, double? size)
        {
            var name = line.Position.Instrument;
            _instruments[name] = (clause, _instruments.TryGetValue(name, out var before) ? before.Size + size : size);
            _lines++;
            if (size is { } known) _size += known;
            else _unsized++;
        }

        public string Statement(string currency)
        {
            // One of unknown size may be the largest.
            var ordered = _instruments.OrderByDescending(i => i.Value.Size ?? double.MaxValue).ThenBy(i => i.Key, StringComparer.Ordinal);
            string[] names = [.. ordered.Select(i => $"{i.Key}{(i.Value.Size is { } size ? $", {FindingList.Number(size)} {currency}" : "")}: {i.Value.Clause}")];
            return $"{FindingList.Count(_lines, "line", "lines")} in {FindingList.Count(names.Length, "instrument", "instruments")} cannot be priced ({FindingList.Names(names)}), "
                + $"so {(_lines == 1 ? "it is" : "they are")} in no figure: {Size(currency)}";
        }

        private string Size(string currency)
        {
            if (_unsized == _lines) return $"nothing gives {(_lines == 1 ? "its" : "their")} notional";
            var known = $"gross notional {FindingList.Number(_size)} {currency}";
            return _unsized == 0 ? known : $"{known}, and {FindingList.Count(_unsized, "line", "lines")} of unknown notional";
        }
    }
}
