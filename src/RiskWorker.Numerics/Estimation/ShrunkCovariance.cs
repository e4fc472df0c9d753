namespace RiskWorker.Numerics.Estimation;

/// <summary>A covariance (or correlation) drawn towards a target: intensity · target + (1 - intensity) · sample.</summary>
/// <param name="Matrix">n × n, row-major, symmetric to the bit.</param>
/// <param name="Intensity">0 to 1: the weight of the target.</param>
/// <param name="Level">
/// The target's one number: the mean variance of the scaled identity, the mean correlation of the constant correlation.
/// </param>
/// <param name="Deviations">Standard deviations of the rows in the sample, divisor n: 0 for a row that does not move.</param>
public sealed record ShrunkCovariance(double[] Matrix, double Intensity, double Level, double[] Deviations);
