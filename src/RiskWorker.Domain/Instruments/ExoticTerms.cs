namespace RiskWorker.Domain.Instruments;

/// <summary>What a digital option pays where it ends in the money.</summary>
public enum DigitalPayoff
{
    /// <summary>A fixed amount.</summary>
    Cash,

    /// <summary>One unit of the underlying.</summary>
    Asset,
}

/// <summary>From which side a barrier is hit, and what the hit does.</summary>
public enum BarrierKind
{
    /// <summary>Hit from above; the option then lives.</summary>
    DownIn,

    /// <summary>Hit from above; the option then dies.</summary>
    DownOut,

    /// <summary>Hit from below; the option then lives.</summary>
    UpIn,

    /// <summary>Hit from below; the option then dies.</summary>
    UpOut,
}

/// <summary>When a barrier or an extreme is looked at.</summary>
public enum Monitoring
{
    /// <summary>At every moment.</summary>
    Continuous,

    /// <summary>At the close of every business day.</summary>
    Daily,
}

/// <summary>How fixings are averaged.</summary>
public enum AverageKind
{
    /// <summary>Their sum over their number.</summary>
    Arithmetic,

    /// <summary>The root of their product.</summary>
    Geometric,
}
