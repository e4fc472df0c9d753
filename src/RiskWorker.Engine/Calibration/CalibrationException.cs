namespace RiskWorker.Engine.Calibration;

/// <summary>The observations or the given covariance cannot be made into a model.</summary>
/// <param name="subject">What it is about: a factor, a pair of factors, a setting.</param>
/// <param name="reason">Why, as a sentence.</param>
public sealed class CalibrationException(string subject, string reason) : Exception($"{subject}: {reason}")
{
    /// <summary>What it is about: a factor, a pair of factors, a setting.</summary>
    public string Subject { get; } = subject;

    /// <summary>Why, as a sentence.</summary>
    public string Reason { get; } = reason;
}
