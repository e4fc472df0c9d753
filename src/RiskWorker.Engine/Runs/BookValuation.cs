using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Checks;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Pricing.Ageing;

namespace RiskWorker.Engine.Runs;

/// <summary>The positions of a snapshot valued at their own close, today's and those of the date before.</summary>
public sealed class BookValuation
{
    private readonly ClosingLevels _closes;
    private readonly CalibratedModel _model;
    private readonly string _currency;

    /// <summary>Values them.</summary>
    public BookValuation(Snapshot snapshot, BookTree tree, CalibratedModel model)
    {
        var closes = new ClosingLevels(snapshot);
        (_closes, _model, _currency) = (closes, model, tree.ReportingCurrency);
        Binder = new(tree.ReportingCurrency, model.Factors, closes, snapshot.Settings.Simulation.Seed, snapshot.Settings.CurveInterpolation);
        Today = LineValuation.Of(snapshot.Positions, snapshot.Instruments, Binder, model.Levels, snapshot.AsOf);
        if (snapshot.Previous is { } previous)
            Previous = LineValuation.Of(previous.Positions, snapshot.Instruments, Binder, closes.At(previous.Date), previous.Date);
        Holdings = HoldingsSummary.Of(snapshot, Binder.Currencies, model.Levels, Today, Previous);
    }

    /// <summary>Resolves instruments against the model's factors.</summary>
    public InstrumentBinder Binder { get; }

    /// <summary>Today's lines.</summary>
    public LineValue[] Today { get; }

    /// <summary>The lines of the newest earlier date, or null.</summary>
    public LineValue[]? Previous { get; }

    /// <summary>What is held, what is priced and how it ties to the book of record.</summary>
    public Holdings Holdings { get; }

    /// <summary>What the instruments of today's lines turn into by a horizon, for models that move the valuation date.</summary>
    public BookAgeing Ageing(Snapshot snapshot) =>
        new(Today, new(_currency, _model.Factors, _model.Levels, snapshot.AsOf, _closes, snapshot.Settings.Simulation.Seed, snapshot.Settings.CurveInterpolation), snapshot.AsOf);
}
