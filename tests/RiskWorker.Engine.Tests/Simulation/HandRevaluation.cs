using MathNet.Numerics.Distributions;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Engine.Tests.Plans;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Engine.Tests.Simulation;

/// <summary>
/// One scenario of a book worked position by position from the instruments' own terms: levels from the draws by the model's
/// factor of the correlation, values by the textbook formulas in the C library's functions and MathNet's normal distribution.
/// </summary>
internal sealed class HandRevaluation
{
    private readonly CompiledBook _book;
    private readonly Dictionary<string, double> _today = new(StringComparer.Ordinal);
    private readonly Dictionary<string, double> _then = new(StringComparer.Ordinal);

    public HandRevaluation(CompiledBook book, long scenario, int days)
    {
        _book = book;
        var (model, normals) = (book.Model, Normals(book, scenario));
        for (var j = 0; j < model.Factors.Count; j++)
        {
            var factor = model.Factors[j];
            var move = (model.DailyDrift[j] * days) + (model.Deviations[j] * Math.Sqrt(days) * normals.GetValueOrDefault(j));
            _today[factor.Name] = model.Levels[j];
            _then[factor.Name] = factor.Shock == ShockKind.Lognormal ? model.Levels[j] * Math.Exp(move) : model.Levels[j] + move;
        }
    }

    public double LevelOf(string factor) => _then[factor];

    /// <summary>V(h) - V(0) of a book and all below it, in the reporting currency.</summary>
    public double ProfitOf(string book) => _book.Snapshot.Positions.Where(p => IsUnder(p.Book, book)).Sum(p => p.Quantity * ProfitOf(_book.Snapshot.Instruments[p.Instrument]));

    /// <summary>V(0)/X(0) - V(h)/X(h) of a book and all below it.</summary>
    public double LossInCurrency(string book, string currency)
    {
        var value = _book.Snapshot.Positions.Where(p => IsUnder(p.Book, book)).Sum(p => p.Quantity * ValueInRoot(_book.Snapshot.Instruments[p.Instrument], _today));
        return (value / Rate(currency, _today)) - ((value + ProfitOf(book)) / Rate(currency, _then));
    }

    /// <summary>Sum over all positions of what their values are differences of: levels and strikes, in the reporting currency.</summary>
    public double Gross => _book.Snapshot.Positions.Sum(p => Math.Abs(p.Quantity) * GrossOf(_book.Snapshot.Instruments[p.Instrument]));

    private static Dictionary<int, double> Normals(CompiledBook book, long scenario)
    {
        var model = book.Model;
        var stream = new DrawStream(book.Plan.Seed, DrawPurpose.FactorMoves, 0);
        var e = Enumerable.Range(0, model.Rank).Select(j => NormalDraws.At(stream, (ulong)scenario, (uint)j)).ToArray();
        return model.Moving.Index().ToDictionary(m => m.Item, m => e.Select((draw, j) => model.Lower[(m.Index * model.Rank) + j] * draw).Sum());
    }

    private double GrossOf(Instrument instrument) => Math.Abs(instrument.Multiplier) * Rate(instrument.Currency, _today) * instrument switch
    {
        Spot s => _today[s.Factor],
        Future f => _today[f.Factor],
        Forward f => Underlying(f.Underlying, f.Currency, _today) + f.Strike,
        Option o => Underlying(o.Underlying, o.Currency, _today) + o.Strike,
        _ => 1,
    };

    private bool IsUnder(string book, string ancestor)
    {
        var node = _book.Tree.IndexOf(book);
        while (node >= 0 && node != _book.Tree.IndexOf(ancestor)) node = _book.Tree.ParentOf(node);
        return node >= 0;
    }

    private double ProfitOf(Instrument instrument) => instrument is Future future
        ? instrument.Multiplier * (_then[future.Factor] - _today[future.Factor]) * Rate(instrument.Currency, _then)
        : ValueInRoot(instrument, _then) - ValueInRoot(instrument, _today);

    private static double ValueInRoot(Instrument instrument, Dictionary<string, double> levels) =>
        instrument.Multiplier * Value(instrument, levels) * Rate(instrument.Currency, levels);

    private static double Rate(string currency, Dictionary<string, double> levels) => currency == "EUR" ? 1 : levels[currency];

    private static double Value(Instrument instrument, Dictionary<string, double> levels) => instrument switch
    {
        Cash => 1,
        Spot s => levels[s.Factor],
        Future => 0,
        Forward f => Forward(Underlying(f.Underlying, f.Currency, levels), f.Strike, f.Curve, f.Carry, Years(f.Expiry)),
        Option o => Option(o, Underlying(o.Underlying, o.Currency, levels), o.Volatility.Flat ?? levels[o.Volatility.Factor!]),
        _ => throw new NotSupportedException(instrument.Kind),
    };

    private static double Years(DateOnly expiry) => (expiry.DayNumber - MixedBook.AsOf.DayNumber) / 365.0;

    private static double Underlying(Underlying underlying, string currency, Dictionary<string, double> levels) =>
        underlying.Factor is { } factor ? levels[factor] : Rate(underlying.BaseCurrency!, levels) / Rate(currency, levels);

    private static double Forward(double spot, double strike, RateTerm? rate, RateTerm? carry, double years) =>
        (spot * Math.Exp(-(carry?.Flat ?? 0) * years)) - (strike * Math.Exp(-(rate?.Flat ?? 0) * years));

    // Merton's formula with yield q; a put by its parity with the call.
    private static double Option(Option o, double spot, double volatility)
    {
        var years = Years(o.Expiry);
        var forward = Forward(spot, o.Strike, o.Curve, o.Carry, years);
        var deviation = volatility * Math.Sqrt(years);
        var (asset, cash) = (spot * Math.Exp(-o.Carry!.Value.Flat * years), o.Strike * Math.Exp(-o.Curve!.Value.Flat * years));
        var d1 = (Math.Log(asset / cash) / deviation) + (deviation / 2);
        var call = years == 0 ? Math.Max(forward, 0) : (asset * Normal.CDF(0, 1, d1)) - (cash * Normal.CDF(0, 1, d1 - deviation));
        return o.Right == OptionRight.Call ? call : call - forward;
    }
}
