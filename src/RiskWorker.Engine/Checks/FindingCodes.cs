using RiskWorker.Domain.Runs;
using static RiskWorker.Domain.Runs.FindingSeverity;

namespace RiskWorker.Engine.Checks;

/// <summary>
/// The table of findings: its order is the order of every list of findings. What stops a run by default is what leaves a figure
/// without a base; everything else is a warning that travels with the figures.
/// </summary>
public static class FindingCodes
{
    /// <summary>The books do not form one tree.</summary>
    public static readonly FindingCode BookTree = new("book-tree", Blocking,
        "The books form no tree: no root, several roots, an unknown parent or a cycle",
        "correct the parents in books.csv so that exactly one book has none and all others lead up to it", IsFixed: true);

    /// <summary>A book's currency has no price.</summary>
    /// <remarks>Blocking, unlike the currency of an instrument: its lines could be left out, a node's figures in its own currency could not be formed at all.</remarks>
    public static readonly FindingCode BookCurrency = new("book-currency", Blocking,
        "A book's currency has no fx factor, so no figure of the book can be expressed in it",
        "add an fx factor for the currency, or correct the book's currency", IsFixed: true);

    /// <summary>Nothing is held on the as-of date.</summary>
    public static readonly FindingCode PositionsNone = new("positions-none", Blocking,
        "No positions on the as-of date",
        "load the positions of that date, or run for a date that has some", IsFixed: true);

    /// <summary>A factor was never observed.</summary>
    public static readonly FindingCode FactorUnobserved = new("factor-unobserved", Blocking,
        "A factor has no observation at all up to the as-of date",
        "load its prices, or take it out of factors.csv", IsFixed: true);

    /// <summary>A factor was not observed although its market was open.</summary>
    public static readonly FindingCode FactorMissing = new("factor-missing", Blocking,
        "A factor has no observation on the as-of date although its calendar is open",
        "load the closing price, or add the day to the calendar's holidays");

    /// <summary>A price that has no logarithm.</summary>
    public static readonly FindingCode PriceNotPositive = new("price-not-positive", Blocking,
        "A zero or negative price of a factor with lognormal shocks, in the window",
        "correct the price, or give the factor normal shocks", IsFixed: true);

    /// <summary>Too few shocks to estimate from.</summary>
    public static readonly FindingCode HistoryShort = new("history-short", Blocking,
        "A factor has fewer shocks of its own than the minimum, and no proxy with a beta",
        "load more of its history, or name a proxy and a beta in factors.csv");

    /// <summary>Too few days on which all factors moved.</summary>
    public static readonly FindingCode DaysFew = new("days-few", Blocking,
        "Fewer days than the minimum are complete over all factors",
        "load the missing prices, or name proxies for the factors that break the most days");

    /// <summary>No day on which all factors moved.</summary>
    public static readonly FindingCode DaysNone = new("days-none", Blocking,
        "No day is complete over all factors",
        "load the missing prices, or name proxies for the factors that break the most days", IsFixed: true);

    /// <summary>The model of record cannot be calibrated.</summary>
    public static readonly FindingCode ModelUnusable = new("model-unusable", Blocking,
        "The model of record cannot be calibrated",
        "correct its settings, or load the history that it needs", IsFixed: true);

    /// <summary>A model beside the one of record gives no figures.</summary>
    public static readonly FindingCode ModelFailed = new("model-failed", Warning,
        "A model that runs beside the one of record cannot be calibrated, so it has no figures in this run",
        "correct its settings or the history that it needs, or take it out of the challengers");

    /// <summary>The last price stands in on a closed day.</summary>
    public static readonly FindingCode FactorClosed = new("factor-closed", Warning,
        "A factor's calendar is closed on the as-of date, so its last price is used",
        "nothing, where the holiday is right; else correct holidays.csv");

    /// <summary>A proxy stands in for history.</summary>
    public static readonly FindingCode HistoryProxied = new("history-proxied", Warning,
        "A factor has fewer shocks of its own than the window, and its proxy's moves stand in before the first",
        "load more of its history when there is some");

    /// <summary>Fewer shocks than the window.</summary>
    public static readonly FindingCode HistoryPartial = new("history-partial", Warning,
        "A factor has fewer shocks of its own than the window",
        "load more of its history, or shorten the window");

    /// <summary>Days left out of the estimation.</summary>
    public static readonly FindingCode DaysDropped = new("days-dropped", Warning,
        "Days of the window left out because not every factor moved on them",
        "load the missing prices, or name the holidays in holidays.csv");

    /// <summary>A price that does not move.</summary>
    public static readonly FindingCode PriceStale = new("price-stale", Warning,
        "A price unchanged at the end for the given number of its business days or more",
        "ask the source whether the price is live, and correct it where it is not");

    /// <summary>A move far outside what the other days show.</summary>
    public static readonly FindingCode PriceJump = new("price-jump", Warning,
        "A move of more than the given number of standard deviations of the factor's other days, in the window",
        "correct the price where it is wrong, add an adjustment where it is a split or a roll, else leave it");

    /// <summary>A gap that others do not have.</summary>
    public static readonly FindingCode DayMissing = new("day-missing", Warning,
        "A day in the window that other factors of the same calendar have",
        "load the missing prices");

    /// <summary>A price on a closed day.</summary>
    public static readonly FindingCode DayClosed = new("day-closed", Warning,
        "An observation in the window on a day when the factor's calendar is closed; it is in no shock",
        "remove the observation, or the holiday");

    /// <summary>A calendar that has no holidays.</summary>
    public static readonly FindingCode CalendarUnknown = new("calendar-unknown", Warning,
        "A factor's calendar is not in holidays.csv, so every Monday to Friday counts as open",
        "add the calendar's holidays, or correct its name in factors.csv");

    /// <summary>A proxy that cannot stand in.</summary>
    public static readonly FindingCode ProxyUnusable = new("proxy-unusable", Warning,
        "A factor's proxy is unknown, is the factor itself, or has no beta",
        "correct proxy and beta in factors.csv");

    /// <summary>Factors of one curve name that make no curve.</summary>
    public static readonly FindingCode CurveUnusable = new("curve-unusable", Warning,
        "Factors of one curve name make no curve: one without a tenor, two of one tenor, or several classes or currencies; no instrument that names it is in a figure",
        "correct curve, tenor_years, class or currency of its factors in factors.csv");

    /// <summary>An fx factor that is never read.</summary>
    public static readonly FindingCode FxFactorUnused = new("fx-factor-unused", Warning,
        "An fx factor names no currency, the reporting currency, or one that another fx factor prices",
        "keep one fx factor for each foreign currency");

    /// <summary>A drift for nothing.</summary>
    /// <remarks>Blocking, like any fault of the settings: the factor that was meant would be left without its drift.</remarks>
    public static readonly FindingCode DriftUnknown = new("drift-unknown", Blocking,
        "The settings give a drift for a factor that does not exist",
        "correct the factor's name under drifts", IsFixed: true);

    /// <summary>A covariance for nothing.</summary>
    public static readonly FindingCode CovarianceUnknown = new("covariance-unknown", Warning,
        "The given covariance names a factor that does not exist",
        "correct the factor's name in covariance.csv");

    /// <summary>A given covariance that is none.</summary>
    public static readonly FindingCode CovarianceUnusable = new("covariance-unusable", Blocking,
        "The given covariance lacks a variance or a pair, contradicts itself, or is no covariance",
        "complete and correct covariance.csv", IsFixed: true);

    /// <summary>A split or roll of nothing.</summary>
    public static readonly FindingCode AdjustmentUnknown = new("adjustment-unknown", Warning,
        "An adjustment names a factor that does not exist",
        "correct the factor's name in adjustments.csv");

    /// <summary>A limit that binds nothing.</summary>
    public static readonly FindingCode LimitBookUnknown = new("limit-book-unknown", Warning,
        "A limit names a book or a reference book that does not exist, so it cannot be decided",
        "correct the book's name in limits.csv");

    /// <summary>Profit of nothing.</summary>
    public static readonly FindingCode ProfitBookUnknown = new("pnl-book-unknown", Warning,
        "Profit and loss of a book that does not exist",
        "correct the book's name in pnl.csv");

    /// <summary>Positions, and no price for any of them.</summary>
    public static readonly FindingCode PricedNone = new("priced-none", Blocking,
        "Not one of the positions can be priced, so figures of zero would mean nothing",
        "mend what the other findings name", IsFixed: true);

    /// <summary>A position outside the tree.</summary>
    /// <remarks>A warning, since no issue calls it blocking: its lines are listed and sized as unpriced, so what the root lacks is on page 1.</remarks>
    public static readonly FindingCode BookUnknown = new("book-unknown", Warning,
        "A position lies in a book that does not exist, so no figure holds it, the root's neither",
        "add the book to books.csv, or correct the book's name in positions.csv");

    /// <summary>A position in nothing known.</summary>
    public static readonly FindingCode InstrumentUnknown = new("instrument-unknown", Warning,
        "A position's instrument is not in instruments.csv, so no figure holds it",
        "add the instrument, or correct its name in positions.csv");

    /// <summary>An instrument on nothing known.</summary>
    public static readonly FindingCode FactorUnknown = new("factor-unknown", Warning,
        "An instrument held names a factor that is not in factors.csv, so no figure holds it",
        "add the factor, or correct its name in instruments.csv");

    /// <summary>An instrument in money of unknown price.</summary>
    public static readonly FindingCode CurrencyUnpriced = new("currency-unpriced", Warning,
        "An instrument held is in, or on, a currency that no fx factor prices, so no figure holds it",
        "add an fx factor for the currency");

    /// <summary>An instrument and its factor in different money.</summary>
    public static readonly FindingCode CurrencyMismatch = new("currency-mismatch", Warning,
        "An instrument held is in another currency than its factor, so no figure holds it",
        "correct the currency in instruments.csv or factors.csv");

    /// <summary>Something that has ended.</summary>
    public static readonly FindingCode InstrumentExpired = new("instrument-expired", Warning,
        "An instrument is still held after its expiry, so no figure holds it",
        "take the position out, or correct the expiry");

    /// <summary>Something without a pricing function.</summary>
    public static readonly FindingCode NotModelled = new("not-modelled", Warning,
        "An instrument held is of a kind, or has a term, that has no pricing, so no figure holds it",
        "keep its risk in view by other means until it is priced");

    /// <summary>An average that cannot be formed.</summary>
    public static readonly FindingCode FixingMissing = new("fixing-missing", Warning,
        "A fixing of the past is known neither from the terms nor from the observations, so no figure holds the instrument",
        "give it as DATE=VALUE among the fixings or as last_fixing, or load an observation of that date");

    /// <summary>A barrier that has been touched.</summary>
    public static readonly FindingCode BarrierCrossed = new("barrier-crossed", Warning,
        "A barrier was crossed on an earlier date, so the option held is another thing now",
        "book what it has become, or correct issue, barrier or knocked");

    /// <summary>Something whose factor has no price.</summary>
    public static readonly FindingCode LevelMissing = new("level-missing", Warning,
        "An instrument held needs a factor that has no usable price, so no figure holds it",
        "load the factor's price");

    /// <summary>Something that ends inside a horizon that moves the valuation date.</summary>
    public static readonly FindingCode LineExpires = new("line-expires", Warning,
        "The model moves the valuation date, and a line expires, pays or is fixed inside the longest horizon; what it pays is held as cash",
        "nothing, where the dates are right; else correct them in instruments.csv");

    /// <summary>Something that cannot follow the valuation date.</summary>
    public static readonly FindingCode LineNotAged = new("line-not-aged", Warning,
        "The model moves the valuation date, and a line keeps that of the as-of date",
        "read its figures as of an instantaneous shock, or set ageing to none");

    /// <summary>Model and book of record disagree.</summary>
    public static readonly FindingCode ValueDifference = new("value-difference", Warning,
        "A line's model value differs from the book of record's by more than the tolerance",
        "compare terms, price and quantity with the book of record");

    /// <summary>A book that is suddenly another size.</summary>
    public static readonly FindingCode HoldingsChange = new("holdings-change", Warning,
        "A book's number of positions or its gross value changed by more than the given fraction since the previous date",
        "confirm that the positions of both dates are complete");

    /// <summary>A column that nothing reads; found when the feed is loaded.</summary>
    public static readonly FindingCode UnknownColumn = new("unknown-column", Warning,
        "A feed file has a column that is not read",
        "correct the column's name, or leave it");

    /// <summary>A file that nothing reads; found when the feed is loaded.</summary>
    public static readonly FindingCode UnknownFile = new("unknown-file", Warning,
        "The feed folder has a file that is not read",
        "correct the file's name, or leave it");

    /// <summary>A term that its kind does not use; found when the feed is loaded.</summary>
    public static readonly FindingCode UnusedTerm = new("unused-term", Warning,
        "An instrument has a term that its kind does not use",
        "correct the kind or the term in instruments.csv");

    /// <summary>A limit relative to a value that is not positive.</summary>
    public static readonly FindingCode LimitUndecidable = new("limit-undecidable", Warning,
        "A limit is relative to a value or measure that is not positive, so no number of scenarios decides it",
        "give the limit an amount in money");

    /// <summary>A rate that was left out; found when the feed is loaded.</summary>
    public static readonly FindingCode AssumedZeroRate = new("assumed-zero-rate", Warning,
        "An option of any kind has no curve or no carry, which counts as 0",
        "write the rate, 0 where it is meant");

    /// <summary>Every code, in the order of reports.</summary>
    public static IReadOnlyList<FindingCode> All { get; } =
    [
        BookTree, BookCurrency, PositionsNone, FactorUnobserved, FactorMissing, PriceNotPositive, HistoryShort, DaysNone, DaysFew,
        CovarianceUnusable, DriftUnknown, ModelUnusable, PricedNone,
        BookUnknown, InstrumentUnknown, FactorUnknown, CurrencyUnpriced, CurrencyMismatch, InstrumentExpired, NotModelled, FixingMissing, LevelMissing, BarrierCrossed, LineExpires, LineNotAged,
        ValueDifference, HoldingsChange, LimitUndecidable, ModelFailed,
        FactorClosed, PriceStale, PriceJump, DayMissing, DayClosed, DaysDropped, HistoryProxied, HistoryPartial,
        CalendarUnknown, ProxyUnusable, CurveUnusable, FxFactorUnused, CovarianceUnknown, AdjustmentUnknown, LimitBookUnknown, ProfitBookUnknown,
        AssumedZeroRate, UnusedTerm, UnknownColumn, UnknownFile,
    ];

    /// <summary><paramref name="finding"/> at the severity that <paramref name="settings"/> give its code: for findings made where no settings are at hand.</summary>
    public static Finding Under(CheckSettings settings, Finding finding) =>
        All.FirstOrDefault(c => c.Code == finding.Code) is { } code ? finding with { Severity = code.SeverityUnder(settings) } : finding;
}
