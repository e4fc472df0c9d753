namespace RiskWorker.Numerics.Estimation;

/// <summary>Variances of a series day by day, each known the evening before: the one shape that every volatility filter gives.</summary>
/// <param name="Mean">The mean that the residuals are taken from.</param>
/// <param name="Variances">v₁ to v_n: v_t stands for day t and is made of the days before it (the first ones also of the filter's start).</param>
/// <param name="Forecast">v_{n+1}, the variance of the day after the last.</param>
public sealed record ConditionalVariance(double Mean, double[] Variances, double Forecast);
