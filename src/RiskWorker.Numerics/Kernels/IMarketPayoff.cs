namespace RiskWorker.Numerics.Kernels;

/// <summary>The value of one unit in a scenario and in the scenarios of a <see cref="Workbench"/>, which agree to the last bit.</summary>
internal interface IMarketPayoff<TTerms>
    where TTerms : struct
{
    /// <summary>Rows of the workbench that <see cref="Values"/> writes to.</summary>
    static abstract int Rows { get; }

    static abstract double Value(in TTerms terms, in MarketPoint at);

    /// <summary>Writes a value for each scenario to <see cref="Workbench.Values"/>.</summary>
    static abstract void Values(in TTerms terms, in MarketSpans market, in Workbench bench);
}
