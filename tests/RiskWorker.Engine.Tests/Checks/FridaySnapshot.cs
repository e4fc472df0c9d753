using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Tests.Checks;

/// <summary>
/// A snapshot for Friday 2026-11-27, written fact by fact: one book FIRM in EUR until others are named, a window of 60 shocks.
/// <see cref="Sound"/> is one that no check has anything to say on.
/// </summary>
internal sealed class FridaySnapshot
{
    public static readonly DateOnly Friday = new(2026, 11, 27);

    private readonly List<Book> _books = [];
    private readonly List<Factor> _factors = [];
    private readonly List<Observation> _observations = [];
    private readonly List<Adjustment> _adjustments = [];
    private readonly List<Holiday> _holidays = [];
    private readonly Dictionary<string, Instrument> _instruments = new(StringComparer.Ordinal);
    private readonly List<Position> _positions = [];
    private readonly List<Limit> _limits = [];
    private readonly List<ProfitAndLoss> _profits = [];
    private readonly List<CovarianceEntry> _covariance = [];
    private readonly List<CountedRun> _runs = [];
    private readonly List<DatedPositions> _earlier = [];
    private DatedPositions? _previous;
    private RunSettings _settings = new() { Model = new() { Window = 60 } };

    public DateOnly AsOf { get; set; } = Friday;

    /// <summary>One lognormal factor A with 61 prices, one unit of it held.</summary>
    public static FridaySnapshot Sound() => new FridaySnapshot().Factor("A").Prices("A", Wave(61)).Spot("A-UNIT", "A").Position("FIRM", "A-UNIT", 1);

    /// <summary><paramref name="count"/> prices 100, 101, 100, ...: shocks of one size.</summary>
    public static double[] Wave(int count) => [.. Enumerable.Range(0, count).Select(i => 100.0 + (i % 2))];

    /// <summary>The newest <paramref name="count"/> Mondays to Fridays up to <paramref name="last"/>, ascending.</summary>
    public static DateOnly[] Weekdays(DateOnly last, int count)
    {
        var days = new DateOnly[count];
        for (var i = count - 1; i >= 0; i--)
        {
            days[i] = last;
            last = BusinessCalendar.Weekdays.Previous(last);
        }
        return days;
    }

    public FridaySnapshot Book(string name, string? parent, string currency = "EUR") => With(() => _books.Add(new(name, parent, name, currency)));

    public FridaySnapshot Factor(string name, FactorClass @class = FactorClass.Equity, ShockKind shock = ShockKind.Lognormal, string? currency = null, string? calendar = null, string? proxy = null, double? beta = null) =>
        With(() => _factors.Add(new(name, @class, shock, currency, Calendar: calendar, Proxy: proxy, Beta: beta)));

    public FridaySnapshot Factor(Factor factor) => With(() => _factors.Add(factor));

    /// <summary>Prices on the Mondays to Fridays up to the as-of date, oldest first; NaN leaves the day out.</summary>
    public FridaySnapshot Prices(string factor, params double[] prices)
    {
        var days = Weekdays(AsOf, prices.Length);
        for (var i = 0; i < prices.Length; i++)
        {
            if (!double.IsNaN(prices[i])) Price(factor, days[i], prices[i]);
        }
        return this;
    }

    public FridaySnapshot Price(string factor, DateOnly date, double price) => With(() => _observations.Add(new(date, factor, price)));

    public FridaySnapshot Adjustment(string factor, DateOnly date, double ratio) => With(() => _adjustments.Add(new(factor, date, ratio, null)));

    public FridaySnapshot Holiday(string calendar, DateOnly date) => With(() => _holidays.Add(new(calendar, date)));

    public FridaySnapshot Instrument(Instrument instrument) => With(() => _instruments[instrument.Name] = instrument);

    public FridaySnapshot Spot(string name, string factor, string currency = "EUR") => Instrument(new Spot(factor) { Name = name, Currency = currency });

    public FridaySnapshot Position(string book, string instrument, double quantity, double? marketValue = null) =>
        With(() => _positions.Add(new(book, instrument, quantity, MarketValue: marketValue)));

    public FridaySnapshot Previous(DateOnly date, params Position[] positions) => With(() => _previous = new(date, positions));

    public FridaySnapshot Earlier(DateOnly date, params Position[] positions) => With(() => _earlier.Add(new(date, positions)));

    public FridaySnapshot Limit(Limit limit) => With(() => _limits.Add(limit));

    public FridaySnapshot Profit(DateOnly date, string book, double? actual) => With(() => _profits.Add(new(date, book, actual, null)));

    public FridaySnapshot Covariance(string factor, string other, double value) => With(() => _covariance.Add(new(factor, other, value)));

    public FridaySnapshot Run(CountedRun run) => With(() => _runs.Add(run));

    public FridaySnapshot Model(Func<ModelSettings, ModelSettings> change) => With(() => _settings = _settings with { Model = change(_settings.Model) });

    public FridaySnapshot Checks(Func<CheckSettings, CheckSettings> change) => With(() => _settings = _settings with { Checks = change(_settings.Checks) });

    public FridaySnapshot Settings(Func<RunSettings, RunSettings> change) => With(() => _settings = change(_settings));

    public Snapshot Build() => new SnapshotBuilder
    {
        AsOf = AsOf,
        Settings = _settings,
        Books = _books.Count > 0 ? _books : [new("FIRM", null, "FIRM", "EUR")],
        Factors = _factors,
        Observations = _observations,
        Adjustments = _adjustments,
        Holidays = _holidays,
        Instruments = [.. _instruments.Values],
        Positions = _positions,
        Previous = _previous,
        Limits = _limits,
        ProfitAndLoss = _profits,
        Covariance = _covariance,
        CountedRuns = _runs,
        EarlierPositions = _earlier,
    }.Build();

    private FridaySnapshot With(Action add)
    {
        add();
        return this;
    }
}
