namespace RiskWorker.Engine.Pricing;

/// <summary>
/// What a derivative is written on, as places in the factor list: one factor (<see cref="Quote"/> is -1), or one unit of
/// the base currency in the instrument's currency, the cross of two fx factors; -1 stands there for the reporting currency.
/// </summary>
/// <param name="IsCross">Whether it is a cross.</param>
/// <param name="Factor">The factor, or the base currency's fx factor.</param>
/// <param name="Quote">The instrument currency's fx factor, for a cross.</param>
public readonly record struct UnderlyingKey(bool IsCross, int Factor, int Quote) : IComparable<UnderlyingKey>
{
    /// <summary>The factor itself.</summary>
    public static UnderlyingKey Of(int factor) => new(false, factor, -1);

    /// <summary>Single factors first, each by place.</summary>
    public int CompareTo(UnderlyingKey other)
    {
        var order = IsCross.CompareTo(other.IsCross);
        if (order == 0) order = Factor.CompareTo(other.Factor);
        return order != 0 ? order : Quote.CompareTo(other.Quote);
    }

    /// <summary>The factors whose log-returns add up to its own, each with its weight.</summary>
    public IEnumerable<(int Factor, double Weight)> Terms()
    {
        if (Factor >= 0) yield return (Factor, 1);
        if (IsCross && Quote >= 0) yield return (Quote, -1);
    }

    /// <summary>The underlying's price, given the factors' levels.</summary>
    public double LevelOf(ReadOnlySpan<double> levels)
    {
        if (!IsCross) return levels[Factor];
        return (Factor < 0 ? 1 : levels[Factor]) / (Quote < 0 ? 1 : levels[Quote]);
    }
}
