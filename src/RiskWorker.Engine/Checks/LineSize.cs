using System.Globalization;
using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting;
using RiskWorker.Engine.Pricing;

namespace RiskWorker.Engine.Checks;

/// <summary>The notional of a line that no figure holds, in the reporting currency.</summary>
internal sealed class LineSize
{
    private readonly Dictionary<string, double> _price = new(StringComparer.Ordinal);
    private readonly CurrencyTable _currencies;
    private readonly double[] _levels;

    public LineSize(Snapshot snapshot, CurrencyTable currencies, double[] levels)
    {
        (_currencies, _levels) = (currencies, levels);
        for (var j = 0; j < levels.Length; j++) _price[snapshot.Factors[j].Name] = levels[j];
    }

    /// <summary>The same at the prices of the snapshot's date.</summary>
    public static LineSize Of(Snapshot snapshot, BookTree tree) =>
        new(snapshot, new(tree.ReportingCurrency, snapshot.Factors), new ClosingLevels(snapshot).At(snapshot.AsOf));

    /// <summary>Price of one unit of <paramref name="currency"/>; NaN where there is none.</summary>
    public double RateOf(string currency)
    {
        var index = _currencies.IndexOf(currency);
        return index < 0 ? double.NaN : _currencies.RateOf(index, _levels);
    }

    /// <summary>
    /// The larger of two sizes, so that neither a swap worth nothing nor a price above par is made small: quantity times multiplier times
    /// notional, strike or price, and the market value where one is given. Null where nothing gives either.
    /// </summary>
    public double? Of(in LineValue line)
    {
        if (line.Instrument is not { } instrument) return null;
        if (line.Unpriced is null) return Math.Abs(line.Exposure);
        var notional = Math.Abs(line.Position.Quantity * instrument.Multiplier * UnitOf(instrument));
        var market = Math.Abs(line.Position.MarketValue ?? double.NaN);
        var size = (double.IsNaN(notional) ? market : double.IsNaN(market) ? notional : Math.Max(notional, market)) * RateOf(instrument.Currency);
        return double.IsFinite(size) ? size : null;
    }

    private double UnitOf(Instrument instrument) => instrument switch
    {
        Spot s => PriceOf(s.Factor),
        Future f => PriceOf(f.Factor),
        Forward f => f.Strike,
        Option o => o.Strike,
        Bond b => b.Notional,
        Floater f => f.Notional,
        Swap s => s.Notional,
        Digital d => d.Notional ?? d.Strike,
        SingleBarrier b => b.Strike,
        Asian a => a.Strike,
        Lookback l => l.Strike ?? LevelOf(l.Underlying, l.Currency),
        UnmodelledInstrument u => UnitOf(u),
        _ => 1,
    };

    private double UnitOf(UnmodelledInstrument instrument)
    {
        if (Term(instrument, "notional") is { } notional) return notional;
        if (Term(instrument, "strike") is { } strike) return strike;
        return instrument.Terms.TryGetValue("factor", out var factor) ? PriceOf(factor) : double.NaN;
    }

    private double LevelOf(Underlying underlying, string currency) =>
        underlying.Factor is { } factor ? PriceOf(factor) : RateOf(underlying.BaseCurrency!) / RateOf(currency);

    private double PriceOf(string factor) => _price.GetValueOrDefault(factor, double.NaN);

    private static double? Term(UnmodelledInstrument instrument, string term) =>
        instrument.Terms.TryGetValue(term, out var text) && double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out var value) ? value : null;
}
