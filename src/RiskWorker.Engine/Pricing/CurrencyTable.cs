using RiskWorker.Domain.Market;

namespace RiskWorker.Engine.Pricing;

/// <summary>The currencies that can be turned into the reporting currency: the reporting currency itself, and one for each fx factor.</summary>
public sealed class CurrencyTable
{
    private readonly Dictionary<string, int> _index = new(StringComparer.Ordinal);
    private readonly List<int> _factors = [];

    /// <summary>Reads the fx factors among <paramref name="factors"/>.</summary>
    public CurrencyTable(string reportingCurrency, IReadOnlyList<Factor> factors)
    {
        Reporting = reportingCurrency;
        Add(reportingCurrency, -1);
        for (var j = 0; j < factors.Count; j++)
        {
            if (factors[j] is { Class: FactorClass.Fx, Currency: { } currency } && !_index.ContainsKey(currency)) Add(currency, j);
        }
    }

    /// <summary>The reporting currency; index 0.</summary>
    public string Reporting { get; }

    /// <summary>Number of currencies.</summary>
    public int Count => _factors.Count;

    /// <summary>Index of <paramref name="currency"/>, or -1 where no fx factor prices it.</summary>
    public int IndexOf(string currency) => _index.GetValueOrDefault(currency, -1);

    /// <summary>The fx factor of currency <paramref name="index"/>; -1 for the reporting currency.</summary>
    public int FactorOf(int index) => _factors[index];

    /// <summary>Price of one unit of currency <paramref name="index"/> in the reporting currency, given the factors' levels.</summary>
    public double RateOf(int index, ReadOnlySpan<double> levels) => _factors[index] < 0 ? 1 : levels[_factors[index]];

    private void Add(string currency, int factor)
    {
        _index[currency] = _factors.Count;
        _factors.Add(factor);
    }
}
