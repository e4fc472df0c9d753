namespace RiskWorker.Domain.Runs;

/// <summary>A measure of loss.</summary>
public enum MeasureKind
{
    /// <summary>Value-at-Risk: the smallest l with P(L &lt;= l) >= confidence.</summary>
    Var,

    /// <summary>Expected shortfall: the mean of the worst N(1 - confidence) losses.</summary>
    Es,

    /// <summary>Expected shortfall with each factor at its liquidity horizon, the cascade of MAR33; the horizon is the base.</summary>
    Les,
}

/// <summary>Which measure, at which confidence, over which horizon.</summary>
public readonly record struct MeasureSpec(MeasureKind Kind, Confidence Confidence, Horizon Horizon) : IComparable<MeasureSpec>
{
    /// <summary>By horizon, kind, then confidence: the order of every list of measures.</summary>
    public int CompareTo(MeasureSpec other)
    {
        var order = Horizon.CompareTo(other.Horizon);
        if (order == 0) order = Kind.CompareTo(other.Kind);
        return order != 0 ? order : Confidence.CompareTo(other.Confidence);
    }

    private string Words => Kind switch { MeasureKind.Var => "VaR", MeasureKind.Es => "ES", _ => "Liquidity-adjusted ES" };

    /// <summary>As in 'VaR 99%, 1 day'.</summary>
    public override string ToString() => $"{Words} {Confidence}, {Horizon}";
}
