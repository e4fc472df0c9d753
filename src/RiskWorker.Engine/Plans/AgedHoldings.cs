using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Pricing.Ageing;
using RiskWorker.Engine.Pricing.Curves;

namespace RiskWorker.Engine.Plans;

/// <summary>
/// What a plan's holdings turn into by one horizon, the valuation date having moved: profits that are certain, and what is valued, fixed
/// or looked at close by close. Cash paid on the way stays in its own currency, without interest.
/// </summary>
/// <param name="Certain">Profit by cell that no scenario moves: the worth at unmoved levels of all that <paramref name="Closes"/> value, known cash, less today's value.</param>
/// <param name="Paths">The paths that are looked at.</param>
/// <param name="Fixings">Rates that are fixed inside and paid later.</param>
/// <param name="Closes">Closes inside the horizon at which something happens, ascending, then the horizon's own.</param>
public sealed record AgedHoldings(IReadOnlyList<LinearHolding> Certain, IReadOnlyList<PathStart> Paths, int Fixings, IReadOnlyList<DatedHoldings> Closes);

/// <summary>
/// What happens at one close. Its values are in money of that close and relative to unmoved levels: inside a horizon it is what pays there,
/// at the horizon what is still alive.
/// </summary>
public sealed record DatedHoldings
{
    /// <summary>Whole business days after the as-of date.</summary>
    public required int Day { get; init; }

    /// <summary>What is valued, by underlying.</summary>
    public required IReadOnlyList<UnderlyingGroup> Groups { get; init; }

    /// <summary>Amounts that are valued, by exponent.</summary>
    public required IReadOnlyList<FlowBatch> Flows { get; init; }

    /// <summary>Paths that are looked at before anything is valued, by underlying.</summary>
    public IReadOnlyList<PathLook> Looks { get; init; } = [];

    /// <summary>Options whose value here hangs on the path so far.</summary>
    public IReadOnlyList<PathBatch> Paths { get; init; } = [];

    /// <summary>Rates that are fixed here.</summary>
    public IReadOnlyList<RateFixing> Fixings { get; init; } = [];

    /// <summary>Amounts that have grown by a rate fixed before and are valued here.</summary>
    public IReadOnlyList<FixedBatch> Fixed { get; init; } = [];

    /// <summary>The factors whose levels flows, formulas and fixings read, ascending.</summary>
    public int[] FormFactors => field ??=
    [
        .. Flows.SelectMany(f => f.Exponent.Factors.ToArray())
            .Concat(Groups.SelectMany(g => g.Formulas).SelectMany(f => f.Market.Factors()))
            .Concat(Paths.SelectMany(b => b.Market.Factors()))
            .Concat(Fixings.SelectMany(f => f.Exponent.Factors.ToArray()))
            .Concat(Fixed.SelectMany(f => f.Discount.Factors.ToArray())).Distinct().Order(),
    ];
}

/// <summary>A look at the path of an underlying.</summary>
/// <param name="Path">Number of the path among those of the horizon.</param>
/// <param name="Underlying">The underlying.</param>
/// <param name="Kind">What the look leaves.</param>
/// <param name="Barrier">The barrier, where there is one.</param>
/// <param name="Spot">The underlying's level today.</param>
/// <param name="IsContinuous">Whether every moment since the close before counts, else this close alone.</param>
public readonly record struct PathLook(int Path, UnderlyingKey Underlying, LookKind Kind, double Barrier, double Spot, bool IsContinuous);

/// <summary>Where a path stands today.</summary>
/// <param name="State">What it has left.</param>
/// <param name="Return">0; NaN where it begins only at its first look.</param>
public readonly record struct PathStart(double State, double Return);

/// <summary>Options on the path of one underlying that see the same rates and variance up to their expiry.</summary>
/// <param name="Underlying">The underlying.</param>
/// <param name="Market">How rates and variance follow from the levels.</param>
/// <param name="Items">The options, by cell.</param>
public sealed record PathBatch(UnderlyingKey Underlying, MarketTerms Market, PathItem[] Items);

/// <summary>One such option held in one cell.</summary>
/// <param name="Cell">Where its profit goes.</param>
/// <param name="Quantity">Units times multiplier.</param>
/// <param name="BaseValue">Its value where no level moves.</param>
/// <param name="Path">Number of its path.</param>
/// <param name="Formula">The formula.</param>
public readonly record struct PathItem(int Cell, double Quantity, double BaseValue, int Path, PathMemory Formula);

/// <summary>A rate that is fixed at a close.</summary>
/// <param name="Fixing">Its number among those of the horizon.</param>
/// <param name="Exponent">Minus the logarithm of what an amount grows by.</param>
public readonly record struct RateFixing(int Fixing, LinearForm Exponent);

/// <summary>Amounts that grew alike by one fixing and are discounted alike.</summary>
/// <param name="Fixing">Number of the fixing.</param>
/// <param name="Discount">Minus the logarithm of the discount factor from the close on.</param>
/// <param name="Factor">What one unit of the amounts is worth at unmoved levels.</param>
/// <param name="Amounts">Amounts by cell.</param>
public sealed record FixedBatch(int Fixing, LinearForm Discount, double Factor, IReadOnlyList<LinearHolding> Amounts);
