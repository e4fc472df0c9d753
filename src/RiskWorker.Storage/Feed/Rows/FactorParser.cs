using System.Globalization;
using RiskWorker.Domain.Market;

namespace RiskWorker.Storage.Feed.Rows;

/// <summary><c>factors.csv</c>: factor, class, shock, currency, curve, tenor_years, calendar, liquidity_days, proxy, beta.</summary>
internal sealed class FactorParser : IRowParser<string?[]>
{
    public static FileFormat Format { get; } = new("factors.csv", true,
    [
        FeedColumn.Must("factor"), FeedColumn.Must("class"), FeedColumn.Must("shock"), FeedColumn.May("currency"), FeedColumn.May("curve"),
        FeedColumn.May("tenor_years"), FeedColumn.May("calendar"), FeedColumn.May("liquidity_days"), FeedColumn.May("proxy"), FeedColumn.May("beta"),
    ]);

    private const int Name = 0, Currency = 3, LiquidityDays = 7, Proxy = 8, Beta = 9;

    private readonly FirstLines<string> _names = new(StringComparer.Ordinal);
    private readonly FirstLines<string> _currencies = new(StringComparer.Ordinal);

    public bool TryParse(CellReader cells, out string?[] row)
    {
        var name = cells.Name(Name);
        var kind = cells.Choice(1, Spelling.Of<FactorClass>());
        var shock = cells.Choice(2, Spelling.Of<ShockKind>());
        var currency = cells.OptionalName(Currency);
        var tenor = cells.OptionalNumber(5, "a number of years from 0 on", years => years >= 0);
        var liquidity = cells.IsEmpty(LiquidityDays) ? null : cells.Count(LiquidityDays).ToString(CultureInfo.InvariantCulture);
        var (proxy, beta) = (cells.OptionalName(Proxy), cells.OptionalNumber(Beta));
        row = [name, Spelling.Of(kind), Spelling.Of(shock), currency, cells.OptionalName(4), tenor?.Text, cells.OptionalName(6), liquidity, proxy, beta?.Text];
        if (!cells.RowIsSound) return false;

        if (proxy is not null && beta is null) cells.Fault(Beta, "a beta, since proxy is given");
        if (proxy is null && beta is not null) cells.Fault(Proxy, "a factor, since beta is given");
        if (proxy == name) cells.Fault(Proxy, "a factor other than itself");
        _names.Claim(name, cells, Name, "each factor");
        if (kind == FactorClass.Fx && currency is null) cells.Fault(Currency, "the currency that this fx factor is the price of");
        else if (kind == FactorClass.Fx) _currencies.Claim(currency!, cells, Currency, "one fx factor for each currency,");
        return cells.RowIsSound;
    }
}
