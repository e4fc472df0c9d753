using System.Buffers;
using System.Globalization;
using System.Text.Json;
using RiskWorker.Domain.Instruments;

namespace RiskWorker.Storage.Feed.Rows;

/// <summary><c>instruments.csv</c>: instrument, kind, currency, the terms of every kind, issuer, lot, daily_volume.</summary>
internal sealed class InstrumentParser(WarningLog warnings) : IRowParser<string?[]>
{
    private const int Name = 0, Kind = 1, Currency = 2, Issuer = 3, Lot = 4, DailyVolume = 5, FirstTerm = 6;

    public static FileFormat Format { get; } = new("instruments.csv", true,
    [
        FeedColumn.Must("instrument"), FeedColumn.Must("kind"), FeedColumn.Must("currency"),
        FeedColumn.May("issuer"), FeedColumn.May("lot"), FeedColumn.May("daily_volume"), .. InstrumentKinds.AllTerms.Select(FeedColumn.May),
    ]);

    private static readonly Dictionary<string, string> s_kinds = InstrumentKinds.TermsByKind.Keys.ToDictionary(k => k, StringComparer.Ordinal);
    private static readonly Dictionary<string, int> s_column =
        Format.Columns.Select((c, i) => (c.Name, i)).ToDictionary(c => c.Name, c => c.i, StringComparer.Ordinal);

    private static readonly Dictionary<string, bool[]> s_usesColumn = InstrumentKinds.TermsByKind.ToDictionary(
        k => k.Key, k => Format.Columns.Select(c => c.Name == "multiplier" || k.Value.Contains(c.Name)).ToArray(), StringComparer.Ordinal);

    private static readonly SearchValues<char> s_numeric = SearchValues.Create("0123456789.,+-eE' ");

    private readonly FirstLines<string> _names = new(StringComparer.Ordinal);

    // Of the current row alone: hundreds of thousands of rows need no dictionary each.
    private readonly Dictionary<string, string> _terms = new(StringComparer.Ordinal);

    public bool TryParse(CellReader cells, out string?[] row)
    {
        var (name, kind, currency, issuer) = (cells.Name(Name), Chosen(cells), cells.Name(Currency), cells.OptionalText(Issuer));
        var lot = cells.OptionalNumber(Lot, "a number above 0", value => value > 0);
        var volume = cells.OptionalNumber(DailyVolume, "a number from 0 on", value => value >= 0);
        row = [];
        if (kind is null || !cells.RowIsSound) return false;
        ReadTerms(cells, name, kind);
        _names.Claim(name, cells, Name, "each instrument");
        foreach (var fault in InstrumentReader.Read(new(name, kind, currency, _terms)).Faults)
            cells.Fault(s_column[fault.Term], fault.Found, fault.Expected);
        if (InstrumentKinds.Options.Contains(kind) && !(_terms.ContainsKey("curve") && _terms.ContainsKey("carry"))) warnings.Add(FeedWarningCodes.AssumedZeroRate, name);
        row = [name, kind, currency, JsonSerializer.Serialize(_terms, TermsJson.Default.DictionaryStringString), issuer, lot?.Text, volume?.Text];
        return cells.RowIsSound;
    }

    private static string? Chosen(CellReader cells)
    {
        var kind = cells.Name(Kind);
        if (s_kinds.ContainsKey(kind)) return kind;
        if (kind.Length > 0) cells.Fault(Kind, "one of " + string.Join(", ", s_kinds.Keys));
        return null;
    }

    // The columns of terms stand in ordinal order, so the terms do, too.
    private void ReadTerms(CellReader cells, string name, string kind)
    {
        _terms.Clear();
        var uses = s_usesColumn[kind];
        for (var c = FirstTerm; c < Format.Columns.Count; c++)
        {
            if (cells.OptionalText(c) is not { } text) continue;
            var term = Format.Columns[c].Name;
            if (!uses[c])
            {
                warnings.Add(FeedWarningCodes.UnusedTerm, $"{name} ({term})");
                continue;
            }
            if (LooksLikeNumber(text) && !IsNumber(text)) cells.Fault(c, "a number with '.' as decimal point, or a name");
            _terms.Add(term, text);
        }
    }

    // A rate may be a number or a curve's name: '0,05' or '1e400' is neither, and must not pass for a curve.
    private static bool LooksLikeNumber(string text) =>
        text.AsSpan().IndexOfAnyExcept(s_numeric) < 0 && !Iso.TryParse(text, out _)
        || text.AsSpan().TrimStart("+-") is "NaN" or "Infinity" or "∞";

    private static bool IsNumber(string text) =>
        double.TryParse(text, NumberStyles.AllowLeadingSign | NumberStyles.AllowDecimalPoint | NumberStyles.AllowExponent, CultureInfo.InvariantCulture, out var value) && double.IsFinite(value);
}
