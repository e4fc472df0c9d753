using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Charts;

/// <summary>The data of one chart.</summary>
public abstract record ChartSpec;

/// <summary>A histogram of simulated P&amp;L with measures marked where they lie.</summary>
/// <param name="FirstEdge">The lower edge of the first bin, in money; losses are negative.</param>
/// <param name="BinWidth">The width of every bin, above 0.</param>
/// <param name="Counts">Scenarios a bin.</param>
/// <param name="Below">Scenarios below the first edge.</param>
/// <param name="Above">Scenarios at or above the last edge.</param>
/// <param name="Marks">The measures, as losses: VaR and ES.</param>
/// <param name="Currency">The currency's code.</param>
public sealed record DistributionChart(
    double FirstEdge, double BinWidth, IReadOnlyList<long> Counts, long Below, long Above, IReadOnlyList<LossMark> Marks, string Currency) : ChartSpec;

/// <summary>A measure on a P&amp;L axis.</summary>
/// <param name="Name">What it is: VaR 99%.</param>
/// <param name="Loss">The measure as a loss: positive is a loss.</param>
public sealed record LossMark(string Name, double Loss);

/// <summary>Daily P&amp;L against the VaR of the previous close.</summary>
/// <param name="Days">Business days in order; a day without P&amp;L or VaR is a gap that stays visible.</param>
/// <param name="VarName">What the line is: VaR 99%, 1 day.</param>
/// <param name="Currency">The currency's code.</param>
/// <param name="Lowest">The lower end of the axis, shared by charts read together; null to fit the days.</param>
/// <param name="Highest">The upper end of the axis; null to fit the days.</param>
public sealed record PnlChart(
    IReadOnlyList<PnlDay> Days, string VarName, string Currency, double? Lowest = null, double? Highest = null) : ChartSpec;

/// <summary>One day of a <see cref="PnlChart"/>.</summary>
/// <param name="Date">The business day.</param>
/// <param name="Pnl">Its P&amp;L; null where there is none.</param>
/// <param name="Var">The VaR of the previous close, positive; null where there is none.</param>
/// <param name="Exception">Whether the day counts as an exception.</param>
public sealed record PnlDay(DateOnly Date, double? Pnl, double? Var, bool Exception);

/// <summary>A measure by book: a dot for its value, a whisker for its interval, a stroke for its limit.</summary>
/// <param name="Rows">The rows, top to bottom.</param>
/// <param name="Axis">What the axis shows: VaR 99%, 1 day.</param>
/// <param name="Currency">The currency's code.</param>
public sealed record MeasureChart(IReadOnlyList<MeasureRow> Rows, string Axis, string Currency) : ChartSpec;

/// <summary>One row of a <see cref="MeasureChart"/>.</summary>
/// <param name="Name">The book.</param>
/// <param name="Value">The measure, in money.</param>
/// <param name="Low">The lower end of its interval; null where it lies outside the sample.</param>
/// <param name="High">The upper end of its interval; null where it lies outside the sample.</param>
/// <param name="Limit">Its limit; null for none.</param>
/// <param name="Mark">The status that the dot's shape shows.</param>
public sealed record MeasureRow(string Name, double Value, double? Low, double? High, double? Limit = null, StatusMark Mark = StatusMark.None);
