namespace RiskWorker.Reporting.Document;

/// <summary>One unit and one number of decimals for figures of money that are read together.</summary>
/// <param name="Divisor">The money that one printed unit stands for.</param>
/// <param name="Decimals">Digits after the point.</param>
/// <param name="Unit">The unit's name: the currency, preceded by thousand, million or billion.</param>
public sealed record MoneyScale(double Divisor, int Decimals, string Unit)
{
    /// <summary>The scale that prints the largest figure with four to five digits.</summary>
    /// <param name="largest">The largest absolute figure; not finite counts as 0.</param>
    /// <param name="currency">The currency's code.</param>
    public static MoneyScale For(double largest, string currency)
    {
        var size = double.IsFinite(largest) ? Math.Abs(largest) : 0;
        return size switch
        {
            < 1e5 => new(1, 0, currency),
            < 1e8 => In(1e3, "thousand"),
            < 1e11 => In(1e6, "million"),
            _ => In(1e9, "billion"),
        };

        MoneyScale In(double divisor, string name) => new(divisor, size / divisor < 1e4 ? 1 : 0, $"{name} {currency}");
    }

    /// <summary>Money as a figure of this scale.</summary>
    public string Text(double? money) => Numerals.Fixed(money / Divisor, Decimals);

    /// <summary>A change of money, with its sign.</summary>
    public string Change(double money) => Numerals.Signed(money / Divisor, Decimals);
}
