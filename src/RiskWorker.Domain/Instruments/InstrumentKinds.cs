namespace RiskWorker.Domain.Instruments;

/// <summary>The kinds of <c>instruments.csv</c> and the terms that each uses; the one table behind reading, warnings and documentation.</summary>
public static class InstrumentKinds
{
    /// <summary>The feed's spelling of <see cref="Instruments.Spot"/>.</summary>
    public const string Spot = "spot";

    /// <summary>The feed's spelling of <see cref="Instruments.Cash"/>.</summary>
    public const string Cash = "fx";

    /// <summary>The feed's spelling of <see cref="Instruments.Future"/>.</summary>
    public const string Future = "future";

    /// <summary>The feed's spelling of <see cref="Instruments.Forward"/>.</summary>
    public const string Forward = "forward";

    /// <summary>The feed's spelling of <see cref="Instruments.Option"/>.</summary>
    public const string Option = "option";

    /// <summary>The feed's spelling of <see cref="Instruments.Bond"/>.</summary>
    public const string Bond = "bond";

    /// <summary>The feed's spelling of <see cref="Instruments.Floater"/>.</summary>
    public const string Floater = "floater";

    /// <summary>The feed's spelling of <see cref="Instruments.Swap"/>.</summary>
    public const string Swap = "swap";

    /// <summary>The feed's spelling of <see cref="Instruments.Digital"/>.</summary>
    public const string Digital = "digital";

    /// <summary>The feed's spelling of <see cref="SingleBarrier"/>.</summary>
    public const string Barrier = "barrier";

    /// <summary>The feed's spelling of <see cref="Instruments.Asian"/>.</summary>
    public const string Asian = "asian";

    /// <summary>The feed's spelling of <see cref="Instruments.Lookback"/>.</summary>
    public const string Lookback = "lookback";

    private static readonly string[] s_optionTerms = ["factor", "base_currency", "strike", "expiry", "right", "style", "vol", "vol_factor", "curve", "carry"];
    private static readonly string[] s_floatTerms = ["projection", "float_frequency", "float_day_count", "float_spread", "last_fixing", "issue", "maturity", "curve", "notional"];

    /// <summary>Terms by kind, <c>multiplier</c> apart, which every kind takes.</summary>
    public static IReadOnlyDictionary<string, IReadOnlyCollection<string>> TermsByKind { get; } = new Dictionary<string, IReadOnlyCollection<string>>(StringComparer.Ordinal)
    {
        [Spot] = ["factor"],
        [Cash] = [],
        [Future] = ["factor"],
        [Forward] = ["factor", "base_currency", "strike", "expiry", "curve", "carry", "settlement_currency"],
        [Bond] = ["coupon", "frequency", "day_count", "issue", "maturity", "curve", "notional", "spread"],
        [Floater] = [.. s_floatTerms, "spread"],
        [Swap] = [.. s_floatTerms, "receive", "coupon", "frequency", "day_count"],
        [Option] = s_optionTerms,
        [Digital] = [.. s_optionTerms, "payoff", "notional"],
        [Barrier] = [.. s_optionTerms, "barrier", "barrier_kind", "rebate", "monitoring", "issue", "knocked"],
        [Asian] = [.. s_optionTerms, "average", "fixings", "issue"],
        [Lookback] = [.. s_optionTerms, "monitoring", "issue"],
    };

    /// <summary>The kinds of options: they discount on <c>curve</c> and yield by <c>carry</c>, each 0 where it is left out.</summary>
    public static IReadOnlyList<string> Options { get; } = [Option, Digital, Barrier, Asian, Lookback];

    /// <summary>Every term that some kind uses, ordinal order.</summary>
    public static IReadOnlyList<string> AllTerms { get; } =
        [.. TermsByKind.Values.SelectMany(t => t).Append("multiplier").Distinct(StringComparer.Ordinal).Order(StringComparer.Ordinal)];
}
