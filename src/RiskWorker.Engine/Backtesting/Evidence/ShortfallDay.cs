namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>A day's profit beside what was forecast of it.</summary>
/// <param name="Profit">Profit, positive for a gain.</param>
/// <param name="Var">Value-at-risk forecast, a loss.</param>
/// <param name="Shortfall">Expected shortfall forecast at the same confidence, a loss.</param>
/// <param name="Inverse">The profit that the forecast distribution does not exceed with a probability in (0, 1), such as <see cref="QuantileTable.At"/>.</param>
public sealed record ShortfallDay(double Profit, double Var, double Shortfall, Func<double, double> Inverse);
