namespace RiskWorker.Domain.Market;

/// <summary>The asset class of a risk factor, as spelt in <c>factors.csv</c>.</summary>
public enum FactorClass
{
    /// <summary>A share or an equity index.</summary>
    Equity,

    /// <summary>The price of one unit of the factor's currency in the reporting currency.</summary>
    Fx,

    /// <summary>A commodity price.</summary>
    Commodity,

    /// <summary>An interest rate, continuously compounded, as a decimal.</summary>
    Rate,

    /// <summary>A credit spread, as a decimal.</summary>
    Credit,

    /// <summary>An implied volatility per year, as a decimal.</summary>
    Vol,
}
