namespace RiskWorker.Domain.Market;

/// <summary>How a factor moves: which difference of two observations is its shock.</summary>
public enum ShockKind
{
    /// <summary>ln(S_t / S_{t-1}); the factor stays positive.</summary>
    Lognormal,

    /// <summary>x_t - x_{t-1}; the factor may cross zero.</summary>
    Normal,
}
