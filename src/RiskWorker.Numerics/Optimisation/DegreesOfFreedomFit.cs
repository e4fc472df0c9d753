namespace RiskWorker.Numerics.Optimisation;

/// <summary>Degrees of freedom fitted by maximum likelihood, and how much the data say of them.</summary>
/// <param name="Nu">The maximiser of the likelihood within the range.</param>
/// <param name="LogLikelihood">Its logarithm there.</param>
/// <param name="NormalLogLikelihood">The logarithm of the likelihood in the normal limit, infinite degrees of freedom.</param>
/// <param name="AtLowerEnd">The maximum lies at the range's lower end: the tails ask for less than it allows.</param>
/// <param name="AtUpperEnd">The maximum lies at the range's upper end: the data cannot be told from normal ones.</param>
/// <param name="IntervalLow">Lower end of the 95% profile interval: where twice the log-likelihood has fallen by 3.84, or the range's end.</param>
/// <param name="IntervalHigh">Upper end of that interval, or the range's end.</param>
/// <param name="Days">Days that the likelihood counts: n, or with weights the effective number (Σw)²/Σw².</param>
public sealed record DegreesOfFreedomFit(
    double Nu,
    double LogLikelihood,
    double NormalLogLikelihood,
    bool AtLowerEnd,
    bool AtUpperEnd,
    double IntervalLow,
    double IntervalHigh,
    double Days);
