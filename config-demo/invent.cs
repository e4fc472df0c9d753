// Invents the feed of Oudermark & Lisse, a trading house that does not exist, from one seed:
//
//     dotnet run config-demo/invent.cs                 writes config-demo/feed
//     dotnet run config-demo/invent.cs -- SOME/FOLDER  writes SOME/FOLDER
//
// The market comes first (shocks, prices, holidays), then the house trades in it day by day, then the files are
// written. Everything after the market is worked out from prices as printed, so that a last bit that another
// C library sees differently is rounded away before anything rests on it.

using System.Globalization;
using System.Text;

var target = args.Length > 0 ? args[0] : Path.Combine((string)AppContext.GetData("EntryPointFileDirectoryPath")!, "feed");
Directory.CreateDirectory(target);

var market = Market.Invent();
var house = new House(market);
house.TradeThrough();
new Feed(target).Write(market, house);

// ---------------------------------------------------------------------------------------------------------------
// What is invented: dates, factors, books, underlyings, holdings, limits
// ---------------------------------------------------------------------------------------------------------------

internal static class Span
{
    public const ulong Seed = 20261127;
    public const int PositionDates = 322;
    public static readonly DateOnly First = new(2021, 11, 29);
    public static readonly DateOnly AsOf = new(2026, 11, 27);
}

/// <summary>A shock of the whole market: volatility of the common drivers jumps to a multiple and decays.</summary>
internal sealed record Stress(DateOnly Start, double Peak, double DecayDays);

/// <summary>A priced factor. Loadings are on the common drivers, in the order of <see cref="Driver"/>; the rest of its variance is its own.</summary>
internal sealed record Priced(string Name, string Class, string Currency, string Calendar, double Start, int Decimals, double Volatility, double[] Loadings);

/// <summary>An implied volatility: it reverts to a level that follows its underlying's own turbulence, and leans against its moves.</summary>
internal sealed record Implied(string Of, string Calendar, double Level, double Leverage)
{
    public string Name => Of + ".vol";
}

internal enum Driver
{
    World,
    Europe,
    Dollar,
    Energy,
    Metal,
    Harvest,
}

internal static class World
{
    public static readonly Stress[] Stresses = [new(new(2023, 3, 6), 2.4, 35), new(new(2026, 3, 9), 1.8, 25)];

    //                                                                                         World Europe Dollar Energy Metal Harvest
    public static readonly Priced[] Factors =
    [
        new("LowIndex", "equity", "EUR", "Lowland", 1840, 1, 0.17, [0.70, 0.58, 0, 0, 0, 0]),
        new("Brakvest", "equity", "EUR", "Lowland", 38, 2, 0.21, [0.42, 0.38, 0, 0, 0, -0.05]),
        new("Corvane", "equity", "EUR", "Lowland", 52, 2, 0.27, [0.55, 0.42, 0, 0.15, 0, 0]),
        new("Lindeholm", "equity", "EUR", "Lowland", 21, 3, 0.31, [0.52, 0.40, 0, 0, 0.38, 0]),
        new("Merrin", "equity", "EUR", "Lowland", 64, 2, 0.29, [0.58, 0.50, 0, 0, 0, 0]),
        new("Ostwal", "equity", "EUR", "Lowland", 29, 2, 0.20, [0.35, 0.42, 0, 0.20, 0, 0]),
        new("Fjellgard", "equity", "NOK", "Lowland", 142, 1, 0.34, [0.45, 0.25, 0, 0.42, 0, 0]),
        new("Havnsund", "equity", "NOK", "Lowland", 265, 1, 0.28, [0.30, 0.28, 0, 0, 0, 0.12]),
        new("IsleIndex", "equity", "GBP", "Isles", 3120, 1, 0.15, [0.66, 0.50, 0, 0.15, 0.10, 0]),
        new("Heathmoor", "equity", "GBP", "Isles", 11.4, 3, 0.24, [0.55, 0.40, 0, 0, 0, 0]),
        new("Pellgate", "equity", "GBP", "Isles", 4.7, 3, 0.30, [0.45, 0.38, 0, 0, 0, 0]),
        new("AtlIndex", "equity", "USD", "Atlantic", 2260, 1, 0.18, [0.88, 0, 0.10, 0, 0, 0]),
        new("Quinlane", "equity", "USD", "Atlantic", 118, 2, 0.33, [0.68, 0, 0.05, 0, 0, 0]),
        new("Boldenau", "equity", "USD", "Atlantic", 47, 2, 0.38, [0.62, 0, 0, 0, 0.05, 0]),

        new("USD", "fx", "USD", "World", 0.89, 5, 0.075, [-0.25, -0.15, 0.85, 0, 0, 0]),
        new("GBP", "fx", "GBP", "World", 1.17, 5, 0.060, [0.30, 0, 0.40, 0, 0, 0]),
        new("NOK", "fx", "NOK", "World", 0.094, 6, 0.085, [0.38, 0.05, -0.05, 0.40, 0, 0]),
        new("CHF", "fx", "CHF", "World", 1.01, 5, 0.050, [-0.40, -0.15, 0.15, 0, 0, 0]),
        new("JPY", "fx", "JPY", "World", 0.0071, 7, 0.095, [-0.30, -0.05, 0.50, 0, 0, 0]),

        new("Copper", "commodity", "USD", "World", 8900, 0, 0.22, [0.35, 0, -0.25, 0.10, 0.65, 0]),
        new("Zinc", "commodity", "USD", "World", 2850, 1, 0.26, [0.25, 0, -0.20, 0, 0.65, 0]),
        new("Nickel", "commodity", "USD", "World", 18700, 0, 0.34, [0.20, 0, -0.15, 0, 0.60, 0]),
        new("Crude", "commodity", "USD", "World", 74, 2, 0.34, [0.30, 0, -0.10, 0.80, 0, 0]),
        new("Gasoil", "commodity", "USD", "World", 690, 1, 0.36, [0.25, 0, -0.10, 0.78, 0, 0]),
        new("Gas", "commodity", "EUR", "World", 41, 2, 0.55, [0.08, 0.05, 0, 0.45, 0, 0]),
        new("Wheat", "commodity", "EUR", "World", 236, 1, 0.28, [0.05, 0, -0.15, 0.12, 0, 0.70]),
        new("Cocoa", "commodity", "GBP", "World", 2650, 0, 0.38, [0.05, 0, 0, 0, 0, 0.35]),
        new("Coffee", "commodity", "USD", "World", 2310, 0, 0.33, [0.10, 0, -0.05, 0, 0, 0.45]),
    ];

    public static readonly Implied[] Volatilities =
    [
        new("LowIndex", "Lowland", 0.17, -0.75),
        new("Brakvest", "Lowland", 0.22, -0.50),
        new("Corvane", "Lowland", 0.27, -0.55),
        new("Merrin", "Lowland", 0.29, -0.60),
        new("Heathmoor", "Isles", 0.25, -0.50),
        new("AtlIndex", "Atlantic", 0.18, -0.75),
        new("Quinlane", "Atlantic", 0.33, -0.55),
        new("Copper", "World", 0.23, -0.20),
        new("Crude", "World", 0.34, -0.35),
        new("Wheat", "World", 0.28, 0.25),
        new("USD", "World", 0.078, 0.20),
        new("GBPUSD", "World", 0.082, -0.10),
    ];

    // Irregularities worth a finding: a split, a quote that was never delivered, a price that stopped moving.
    public static readonly (string Factor, DateOnly Date, double Ratio, string Reason) Split = ("Boldenau", new(2025, 5, 12), 0.5, "two shares for one");
    public static readonly (string Factor, DateOnly Date) Missing = ("Cocoa", new(2025, 4, 3));
    public static readonly (string Factor, DateOnly Since) Frozen = ("Pellgate", new(2026, 11, 23));

    /// <summary>Flat continuously compounded rates; they discount, and carry a currency against another.</summary>
    public static readonly Dictionary<string, double> Rates = new()
    {
        ["EUR"] = 0.021,
        ["USD"] = 0.038,
        ["GBP"] = 0.037,
        ["NOK"] = 0.040,
        ["CHF"] = 0.004,
        ["JPY"] = 0.008,
    };
}

/// <summary>A node of the book tree; opening cash and the size of a day's intraday trading in its own currency, leaf books only.</summary>
internal sealed record Book(string Name, string Parent, string Title, string Currency, double Cash = 0, double Intraday = 0)
{
    public bool IsLeaf => Cash > 0;
}

/// <summary>What derivatives are written on: a factor, or one unit of a currency (<paramref name="Base"/>) priced in <paramref name="Currency"/>.</summary>
internal sealed record Underlying(string Name, string? Base, string Currency, double Multiplier, double StrikeStep, double Carry, double? FlatVolatility = null);

internal enum Kind
{
    Spot,
    Fx,
    Future,
    Forward,
    Call,
    Put,
}

/// <summary>
/// A holding that a desk keeps up: its notional in thousands of EUR (negative is short) sizes it when it is opened, and
/// trading wanders around that size. Dated contracts expire in March and September (cycle 0) or June and December (cycle 1)
/// and roll half a year on, so that a line of each cycle keeps two expiries alive.
/// </summary>
internal sealed record Line(string Book, Kind Kind, string On, double Notional, double Moneyness = 1, int Cycle = 0);

internal sealed record Limit(
    string Name, string Book, string Measure, string Confidence, int Days, string Amount, string Basis, string Reference,
    string WarnAt, string From, string Approver, string Reason);

internal static class Firm
{
    public static readonly Book[] Books =
    [
        new("HOUSE", "", "Oudermark & Lisse", "EUR"),
        new("EQUITY", "HOUSE", "Shares", "EUR"),
        new("EqLow", "EQUITY", "Lowland shares", "EUR", 3_000_000, 9_000),
        new("EqNorth", "EQUITY", "Northern shares", "NOK", 9_000_000, 60_000),
        new("EqIsles", "EQUITY", "Isles shares", "GBP", 1_200_000, 4_000),
        new("EqAtl", "EQUITY", "Atlantic shares", "USD", 2_500_000, 15_000),
        new("OPTION", "HOUSE", "Options", "EUR"),
        new("OpShare", "OPTION", "Options on shares", "EUR", 6_000_000, 8_000),
        new("OpWrite", "OPTION", "Index option writing", "EUR", 9_000_000, 6_000),
        new("OpFx", "OPTION", "Currency options", "EUR", 5_000_000, 5_000),
        new("COMMOD", "HOUSE", "Commodities", "EUR"),
        new("CoMetal", "COMMOD", "Base metals", "USD", 6_000_000, 12_000),
        new("CoEnergy", "COMMOD", "Oil and gas", "EUR", 7_000_000, 12_000),
        new("CoHarv", "COMMOD", "Grain and softs", "EUR", 4_000_000, 7_000),
        new("TREAS", "HOUSE", "Treasury", "EUR"),
        new("TrHedge", "TREAS", "Currency hedges", "EUR", 2_000_000, 2_000),
        new("TrCross", "TREAS", "Currency crosses", "EUR", 3_000_000, 4_000),
        new("TrCash", "TREAS", "Liquidity", "EUR", 30_000_000, 1_000),
    ];

    /// <summary>Groups whose children keep other currencies report their own P&amp;L in EUR; that of the other groups is the sum of their children's.</summary>
    public static readonly string[] ReportingGroups = ["HOUSE", "EQUITY", "COMMOD"];

    public static readonly Underlying[] Underlyings =
    [
        new("Brakvest", null, "EUR", 100, 1, 0.028),
        new("Corvane", null, "EUR", 100, 1, 0.022),
        new("Merrin", null, "EUR", 100, 1, 0.045),
        new("Heathmoor", null, "GBP", 100, 0.2, 0.036),
        new("Quinlane", null, "USD", 100, 2.5, 0),
        new("LowIndex", null, "EUR", 10, 20, 0.027),
        new("AtlIndex", null, "USD", 10, 20, 0.014),

        // On a futures price the cost of carry is nil: carry equals the discount rate.
        new("Copper", null, "USD", 25, 100, World.Rates["USD"]),
        new("Nickel", null, "USD", 6, 250, World.Rates["USD"], 0.33),
        new("Crude", null, "USD", 1000, 1, World.Rates["USD"]),
        new("Gas", null, "EUR", 1000, 0.5, World.Rates["EUR"]),
        new("Wheat", null, "EUR", 50, 5, World.Rates["EUR"]),
        new("Cocoa", null, "GBP", 10, 50, World.Rates["GBP"], 0.37),

        new("USD", "USD", "EUR", 10_000, 0.005, World.Rates["USD"]),
        new("GBP", "GBP", "EUR", 10_000, 0.005, World.Rates["GBP"]),
        new("NOK", "NOK", "EUR", 100_000, 0.0005, World.Rates["NOK"], 0.088),
        new("CHF", "CHF", "EUR", 10_000, 0.005, World.Rates["CHF"]),
        new("GBPUSD", "GBP", "USD", 10_000, 0.01, World.Rates["GBP"]),
        new("CHFJPY", "CHF", "JPY", 10_000, 1, World.Rates["CHF"], 0.095),
        new("USDJPY", "USD", "JPY", 10_000, 1, World.Rates["USD"]),
    ];

    public static readonly Dictionary<string, double> FutureMultipliers = new()
    {
        ["LowIndex"] = 10,
        ["IsleIndex"] = 10,
        ["AtlIndex"] = 10,
        ["Copper"] = 25,
        ["Zinc"] = 25,
        ["Nickel"] = 6,
        ["Crude"] = 1000,
        ["Gasoil"] = 100,
        ["Gas"] = 1000,
        ["Wheat"] = 50,
        ["Cocoa"] = 10,
        ["Coffee"] = 10,
    };

    public static readonly Dictionary<string, (string Issuer, double DailyVolume)> Issuers = new()
    {
        ["Brakvest"] = ("Brakvest Foods", 420_000),
        ["Corvane"] = ("Corvane Chemicals", 350_000),
        ["Lindeholm"] = ("Lindeholm Steel", 510_000),
        ["Merrin"] = ("Merrin Bank", 640_000),
        ["Ostwal"] = ("Ostwal Grid", 280_000),
        ["Fjellgard"] = ("Fjellgard Shipping", 190_000),
        ["Havnsund"] = ("Havnsund Sea Farms", 150_000),
        ["Heathmoor"] = ("Heathmoor Insurance", 900_000),
        ["Pellgate"] = ("Pellgate Stores", 750_000),
        ["Quinlane"] = ("Quinlane Systems", 1_400_000),
        ["Boldenau"] = ("Boldenau Devices", 620_000),
    };

    public static readonly Line[] Lines =
    [
        .. Spots("EqLow", ("Brakvest", 4000), ("Corvane", 5000), ("Lindeholm", 3500), ("Merrin", 4500), ("Ostwal", 3000)),
        .. Futures("EqLow", ("LowIndex", -5000)),
        .. Spots("EqNorth", ("Fjellgard", 2500), ("Havnsund", 3000)),
        .. Spots("EqIsles", ("Heathmoor", 3500), ("Pellgate", 1800)),
        .. Futures("EqIsles", ("IsleIndex", -1500)),
        .. Spots("EqAtl", ("Quinlane", 5000), ("Boldenau", 3500)),
        .. Futures("EqAtl", ("AtlIndex", 2000)),

        .. Spots("OpShare", ("Brakvest", 900), ("Corvane", -700), ("Merrin", 1200), ("Heathmoor", 600), ("Quinlane", -1500)),
        .. Chain("OpShare", "Brakvest", (Kind.Put, 0.92, 2000), (Kind.Call, 1.08, -1500)),
        .. Chain("OpShare", "Corvane", (Kind.Put, 0.92, -1500), (Kind.Call, 1, 2500), (Kind.Call, 1.08, -2000)),
        .. Chain("OpShare", "Merrin", (Kind.Put, 0.92, 2500), (Kind.Call, 1, -1800), (Kind.Call, 1.08, -800)),
        .. Chain("OpShare", "Heathmoor", (Kind.Put, 0.92, 1200), (Kind.Call, 1, -900)),
        .. Chain("OpShare", "Quinlane", (Kind.Put, 0.90, -1000), (Kind.Call, 1, 3000), (Kind.Call, 1.12, -1500)),
        .. Futures("OpWrite", ("LowIndex", -1500), ("AtlIndex", -1000)),
        .. Chain("OpWrite", "LowIndex", (Kind.Put, 0.90, -9000), (Kind.Put, 0.95, -4000), (Kind.Call, 1.05, -6000)),
        .. Chain("OpWrite", "AtlIndex", (Kind.Put, 0.92, -9000), (Kind.Call, 1.05, -5000)),
        .. Chain("OpFx", "USD", (Kind.Put, 0.97, 9000), (Kind.Call, 1.02, -6000)),
        .. Chain("OpFx", "GBPUSD", (Kind.Put, 0.98, -5000), (Kind.Call, 1, 8000)),
        .. Chain("OpFx", "CHFJPY", (Kind.Put, 0.96, 3000), (Kind.Call, 1.04, -3000)),
        .. Chain("OpFx", "NOK", (Kind.Put, 0.96, -2500), (Kind.Call, 1.04, 3500)),

        .. Spots("CoMetal", ("Copper", 1500)),
        .. Futures("CoMetal", ("Copper", 2500), ("Zinc", -2000), ("Nickel", 1200)),
        .. Forwards("CoMetal", ("Copper", -1200)),
        .. Chain("CoMetal", "Copper", (Kind.Put, 0.93, 3000), (Kind.Call, 1.05, -3000)),
        .. Chain("CoMetal", "Nickel", (Kind.Put, 0.90, -1000), (Kind.Call, 1.10, 1500)),
        .. Futures("CoEnergy", ("Crude", -3000), ("Gasoil", 4200), ("Gas", 1100)),
        .. Forwards("CoEnergy", ("Gas", -500)),
        .. Chain("CoEnergy", "Crude", (Kind.Put, 0.90, -2500), (Kind.Call, 1, 3000), (Kind.Call, 1.12, -3500)),
        .. Spots("CoHarv", ("Wheat", 1400)),
        .. Futures("CoHarv", ("Wheat", 900), ("Cocoa", 700), ("Coffee", -900)),
        .. Forwards("CoHarv", ("Wheat", -1000)),
        .. Chain("CoHarv", "Wheat", (Kind.Put, 0.92, 2500), (Kind.Call, 1.08, -1500)),
        .. Chain("CoHarv", "Cocoa", (Kind.Put, 0.88, 900), (Kind.Call, 1.14, -700)),

        .. Forwards("TrHedge", ("USD", -5500), ("GBP", -2200), ("NOK", -2400), ("CHF", 1000)),
        .. Forwards("TrCross", ("GBPUSD", 3000), ("CHFJPY", -2500), ("USDJPY", 2000)),
        .. new (string Currency, double Notional)[] { ("USD", 4000), ("GBP", 2500), ("NOK", 1500), ("CHF", 2000), ("JPY", 1200) }
            .Select(c => new Line("TrCash", Kind.Fx, c.Currency, c.Notional)),
    ];

    // One is meant to be breached (metal-var) and one to be near (option-es); the others have room.
    public static readonly Limit[] Limits =
    [
        new("house-var", "HOUSE", "var", "0.99", 1, "1400000", "amount", "", "0.8", "2026-01-02", "Board", "risk appetite for 2026"),
        new("house-es", "HOUSE", "es", "0.975", 1, "1400000", "amount", "", "0.8", "2026-01-02", "Board", "risk appetite for 2026"),
        new("house-var-10d", "HOUSE", "var", "0.99", 10, "4200000", "amount", "", "0.8", "2026-01-02", "Board", "two weeks without a market to sell in"),
        new("house-nav", "HOUSE", "var", "0.99", 1, "0.012", "nav", "", "", "2025-01-02", "Board", "covenant of the credit line"),
        new("equity-var", "EQUITY", "var", "0.99", 1, "1000000", "amount", "", "0.75", "2025-01-02", "Risk committee", "yearly review"),
        new("lowland-relative", "EqLow", "var", "0.99", 1, "1.5", "book", "EQUITY", "", "2025-07-01", "Risk committee", "no riskier per euro than half again all shares"),
        new("north-var", "EqNorth", "var", "0.99", 1, "2000000", "amount", "", "", "2025-01-02", "Risk committee", "yearly review"),
        new("atlantic-var", "EqAtl", "var", "0.99", 1, "450000", "amount", "", "0.8", "2025-01-02", "Risk committee", "yearly review"),
        new("option-es", "OPTION", "es", "0.975", 1, "450000", "amount", "", "0.85", "2026-10-01", "Risk committee", "cut after the losses in March"),
        new("writing-es", "OpWrite", "es", "0.975", 1, "320000", "amount", "", "0.8", "2026-10-01", "Risk committee", "cut after the losses in March"),
        new("commodity-var", "COMMOD", "var", "0.99", 1, "400000", "amount", "", "0.8", "2025-01-02", "Risk committee", "yearly review"),
        new("metal-var", "CoMetal", "var", "0.99", 1, "170000", "amount", "", "0.8", "2026-11-25", "Risk committee", "cut until the desk has a second trader"),
        new("treasury-var", "TREAS", "var", "0.99", 1, "200000", "amount", "", "0.9", "2025-01-02", "Risk committee", "treasury hedges and takes no view"),
    ];

    public static IEnumerable<Book> PathToRoot(Book book)
    {
        for (var node = book; node is not null; node = Array.Find(Books, b => b.Name == node.Parent)) yield return node;
    }

    private static IEnumerable<Line> Spots(string book, params (string On, double Notional)[] held) =>
        held.Select(h => new Line(book, Kind.Spot, h.On, h.Notional));

    private static IEnumerable<Line> Futures(string book, params (string On, double Notional)[] held) =>
        held.Select(h => new Line(book, Kind.Future, h.On, h.Notional));

    private static IEnumerable<Line> Forwards(string book, params (string On, double Notional)[] held) =>
        held.SelectMany(h => new[] { new Line(book, Kind.Forward, h.On, h.Notional), new Line(book, Kind.Forward, h.On, h.Notional, 1, 1) });

    private static IEnumerable<Line> Chain(string book, string on, params (Kind Right, double Moneyness, double Notional)[] legs) =>
        legs.SelectMany(l => new[] { new Line(book, l.Right, on, l.Notional, l.Moneyness), new Line(book, l.Right, on, l.Notional, l.Moneyness, 1) });
}

// ---------------------------------------------------------------------------------------------------------------
// Chance
// ---------------------------------------------------------------------------------------------------------------

/// <summary>SplitMix64: integer arithmetic only, so the stream is the same on every machine. One instance a purpose, so that a change in one part of the invention leaves the others as they were.</summary>
internal sealed class Chance(string purpose)
{
    private const int Freedom = 6;
    private ulong _state = Mix(Span.Seed ^ Hash(purpose));

    public double Uniform() => ((Next() >> 12) + 0.5) / (1UL << 52);

    /// <summary>Box-Muller; the second of the pair is dropped for simplicity.</summary>
    public double Normal() => Math.Sqrt(-2 * Math.Log(Uniform())) * Math.Cos(2 * Math.PI * Uniform());

    /// <summary>Student's t with six degrees of freedom, scaled to unit variance: the fat tails.</summary>
    public double FatTailed()
    {
        var squares = 0.0;
        for (var i = 0; i < Freedom; i++)
        {
            var z = Normal();
            squares += z * z;
        }

        return Normal() / Math.Sqrt(squares / Freedom) * Math.Sqrt((Freedom - 2.0) / Freedom);
    }

    private ulong Next() => Mix(_state += 0x9E3779B97F4A7C15);

    private static ulong Mix(ulong z)
    {
        z = (z ^ (z >> 30)) * 0xBF58476D1CE4E5B9;
        z = (z ^ (z >> 27)) * 0x94D049BB133111EB;
        return z ^ (z >> 31);
    }

    private static ulong Hash(string text) => text.Aggregate(0xCBF29CE484222325, (hash, c) => (hash ^ c) * 0x100000001B3);
}

/// <summary>Shocks of unit long-run variance whose conditional variance changes: GARCH(1,1), falls counting for more than rises where asked.</summary>
internal sealed class Turbulence(string purpose, bool asymmetric)
{
    private const double Reaction = 0.04;
    private const double Asymmetry = 0.04;
    private const double Persistence = 0.915;
    private readonly Chance _chance = new(purpose);
    private readonly double _reaction = asymmetric ? Reaction : Reaction + Asymmetry / 2;
    private readonly double _asymmetry = asymmetric ? Asymmetry : 0;

    /// <summary>Conditional variance of the next shock.</summary>
    public double Variance { get; private set; } = 1;

    public double Next()
    {
        var shock = Math.Sqrt(Variance) * _chance.FatTailed();
        const double floor = 1 - Reaction - Asymmetry / 2 - Persistence;
        var reaction = _reaction + (shock < 0 ? _asymmetry : 0);
        Variance = floor + reaction * shock * shock + Persistence * Variance;
        return shock;
    }
}

// ---------------------------------------------------------------------------------------------------------------
// Calendars
// ---------------------------------------------------------------------------------------------------------------

internal static class Calendars
{
    public static readonly string[] Names = ["Atlantic", "Isles", "Lowland", "World"];
    private static readonly HashSet<(string, DateOnly)> s_closed = [.. Holidays()];

    public static bool IsOpen(string calendar, DateOnly date) => IsWeekday(date) && !s_closed.Contains((calendar, date));

    public static bool IsWeekday(DateOnly date) => date.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday);

    /// <summary>Weekday holidays to the end of the year after the as-of date, so that a schedule knows what lies ahead.</summary>
    public static IEnumerable<(string Calendar, DateOnly Date)> Holidays()
    {
        foreach (var calendar in Names)
        {
            for (var year = Span.First.Year; year <= Span.AsOf.Year + 1; year++)
            {
                var dates = Common(year).Concat(Own(calendar, year)).Where(IsWeekday).Distinct().Order();
                foreach (var date in dates) yield return (calendar, date);
            }
        }
    }

    private static IEnumerable<DateOnly> Common(int year) => [new(year, 1, 1), Easter(year).AddDays(-2), new(year, 12, 25)];

    private static IEnumerable<DateOnly> Own(string calendar, int year) => calendar switch
    {
        "Lowland" => [Easter(year).AddDays(1), new(year, 5, 1), new(year, 12, 26)],
        "Isles" => [Easter(year).AddDays(1), Monday(year, 8, 1), new(year, 12, 26)],
        "Atlantic" => [Monday(year, 2, 3), Monday(year, 9, 1)],
        _ => [],
    };

    private static DateOnly Monday(int year, int month, int nth)
    {
        var first = new DateOnly(year, month, 1);
        return first.AddDays((8 - (int)first.DayOfWeek) % 7 + 7 * (nth - 1));
    }

    public static DateOnly ThirdFriday(int year, int month)
    {
        var first = new DateOnly(year, month, 1);
        return first.AddDays((12 - (int)first.DayOfWeek) % 7 + 14);
    }

    /// <summary>The Gregorian computus in its anonymous form.</summary>
    private static DateOnly Easter(int year)
    {
        var (a, b, c) = (year % 19, year / 100, year % 100);
        var h = (19 * a + b - b / 4 - (b - (b + 8) / 25 + 1) / 3 + 15) % 30;
        var l = (32 + 2 * (b % 4) + 2 * (c / 4) - h - c % 4) % 7;
        var m = (a + 11 * h + 22 * l) / 451;
        var day = h + l - 7 * m + 114;
        return new(year, day / 31, day % 31 + 1);
    }
}

// ---------------------------------------------------------------------------------------------------------------
// The market
// ---------------------------------------------------------------------------------------------------------------

/// <summary>Closing prices as printed: one a factor and weekday, the last one carried over days without a quote.</summary>
internal sealed class Market
{
    private const double Year = 252;
    private const double RiskPremium = 0.04;
    private const double PullOfCommodities = 0.003;
    private readonly Dictionary<string, double[]> _closes = [];

    /// <summary>Every weekday of the span, ascending.</summary>
    public DateOnly[] Days { get; } = [.. Enumerable.Range(0, Span.AsOf.DayNumber - Span.First.DayNumber + 1).Select(Span.First.AddDays).Where(Calendars.IsWeekday)];

    /// <summary>What was quoted: (day, factor, value as printed).</summary>
    public List<(int Day, string Factor, string Value)> Quotes { get; } = [];

    public static Market Invent()
    {
        var market = new Market();
        var moves = new Moves(market.Days);
        foreach (var factor in World.Factors) market.Price(factor, moves);
        foreach (var implied in World.Volatilities) market.Imply(implied, moves);
        return market;
    }

    public double Close(string factor, int day) => _closes[factor][day];

    /// <summary>EUR for one unit of <paramref name="currency"/>.</summary>
    public double Rate(string currency, int day) => currency == "EUR" ? 1 : Close(currency, day);

    /// <summary>Shares earn a premium; commodities are slowly pulled back to what it costs to produce them.</summary>
    private void Price(Priced factor, Moves moves)
    {
        var daily = factor.Volatility / Math.Sqrt(Year);
        var drift = (factor.Class == "equity" ? RiskPremium : 0) / Year - daily * daily / 2;
        var pull = factor.Class == "commodity" ? PullOfCommodities : 0;
        var start = Math.Log(factor.Start);
        var log = start;
        var path = new double[Days.Length];
        for (var t = 0; t < path.Length; t++)
        {
            if (t > 0) log += drift + pull * (start - log) + daily * moves.Of(factor.Name)[t];
            path[t] = Math.Exp(log);
        }

        Print(factor.Name, factor.Calendar, factor.Decimals, path);
    }

    private void Imply(Implied implied, Moves moves)
    {
        const double reversion = 0.03;
        const double volatilityOfVolatility = 0.033;
        const double responseToTurbulence = 0.25;
        var chance = new Chance("implied " + implied.Of);
        var (shocks, turbulence) = moves.OfUnderlying(implied.Of);
        var log = Math.Log(implied.Level);
        var path = new double[Days.Length];
        for (var t = 0; t < path.Length; t++)
        {
            var own = Math.Sqrt(1 - implied.Leverage * implied.Leverage) * chance.FatTailed();
            var aim = Math.Log(implied.Level) + responseToTurbulence * Math.Log(turbulence[t]);
            log += reversion * (aim - log) + volatilityOfVolatility * (implied.Leverage * shocks[t] + own);
            path[t] = Math.Exp(log);
        }

        Print(implied.Name, implied.Calendar, 4, path);
    }

    /// <summary>Keeps what the market printed: rounded, on open days, with the irregularities.</summary>
    private void Print(string factor, string calendar, int decimals, double[] path)
    {
        var closes = new double[path.Length];
        var last = path[0];
        for (var t = 0; t < path.Length; t++)
        {
            var frozen = factor == World.Frozen.Factor && Days[t] > World.Frozen.Since;
            var beforeSplit = factor == World.Split.Factor && Days[t] < World.Split.Date;
            if (Calendars.IsOpen(calendar, Days[t]) && (factor, Days[t]) != World.Missing)
            {
                if (!frozen) last = Math.Round(beforeSplit ? path[t] / World.Split.Ratio : path[t], decimals);
                Quotes.Add((t, factor, Text.Plain(last, decimals)));
            }

            closes[t] = last;
        }

        _closes[factor] = closes;
    }
}

/// <summary>Standardised daily moves of every priced factor, and how turbulent each day was for it (1 is usual).</summary>
internal sealed class Moves
{
    private readonly Dictionary<string, (double[] Shocks, double[] Turbulence)> _moves = [];

    public Moves(DateOnly[] days)
    {
        var stress = Array.ConvertAll(days, d => StressOn(days, d));
        var drivers = Enum.GetValues<Driver>().Select(d => DriverPath(d, stress)).ToArray();
        foreach (var factor in World.Factors) _moves[factor.Name] = Combine(factor, drivers);
    }

    public double[] Of(string factor) => _moves[factor].Shocks;

    /// <summary>Moves of a factor, or of the cross of two currencies named together.</summary>
    public (double[] Shocks, double[] Turbulence) OfUnderlying(string name)
    {
        if (_moves.TryGetValue(name, out var own)) return own;
        var (numerator, denominator) = (_moves[name[..3]], _moves[name[3..]]);
        var shocks = numerator.Shocks.Zip(denominator.Shocks, (a, b) => (a - b) / Math.Sqrt(2));
        return ([.. shocks], denominator.Turbulence);
    }

    private static double StressOn(DateOnly[] days, DateOnly day)
    {
        var level = 1.0;
        foreach (var stress in World.Stresses.Where(s => s.Start <= day))
        {
            var elapsed = days.Count(d => d > stress.Start && d <= day);
            level += (stress.Peak - 1) * Math.Exp(-elapsed / stress.DecayDays);
        }

        return level;
    }

    /// <summary>Stress scales the drivers and not what is a factor's own, so correlations rise in it; the world falls while it lasts.</summary>
    private static (double[] Shocks, double[] Variance) DriverPath(Driver driver, double[] stress)
    {
        const double fallInStress = 0.12;
        var turbulence = new Turbulence("driver " + driver, driver is Driver.World or Driver.Europe);
        var (shocks, variance) = (new double[stress.Length], new double[stress.Length]);
        for (var t = 0; t < stress.Length; t++)
        {
            variance[t] = turbulence.Variance * stress[t] * stress[t];
            shocks[t] = stress[t] * turbulence.Next() - (driver == Driver.World ? fallInStress * (stress[t] - 1) : 0);
        }

        return (shocks, variance);
    }

    private static (double[] Shocks, double[] Turbulence) Combine(Priced factor, (double[] Shocks, double[] Variance)[] drivers)
    {
        var own = new Turbulence("own " + factor.Name, asymmetric: false);
        var ownShare = 1 - factor.Loadings.Sum(l => l * l);
        var days = drivers[0].Shocks.Length;
        var (shocks, variance) = (new double[days], new double[days]);
        for (var t = 0; t < days; t++)
        {
            variance[t] = ownShare * own.Variance;
            shocks[t] = Math.Sqrt(ownShare) * own.Next();
            for (var d = 0; d < drivers.Length; d++)
            {
                shocks[t] += factor.Loadings[d] * drivers[d].Shocks[t];
                variance[t] += factor.Loadings[d] * factor.Loadings[d] * drivers[d].Variance[t];
            }
        }

        return (shocks, variance);
    }
}

// ---------------------------------------------------------------------------------------------------------------
// Instruments and their values
// ---------------------------------------------------------------------------------------------------------------

internal sealed record Instrument(string Name, Kind Kind, string On, string Currency, double Multiplier, double Strike = 0, DateOnly Expiry = default);

internal static class Valuation
{
    public static double Years(DateOnly from, DateOnly to) => (to.DayNumber - from.DayNumber) / 365.0;

    public static Underlying? Underlying(string name) => Array.Find(Firm.Underlyings, u => u.Name == name);

    /// <summary>Price of what <paramref name="on"/> names: a factor, or a currency at the cross of two rates.</summary>
    public static double Price(Market market, string on, int day) => Underlying(on) is { Base: { } currency } pair
        ? market.Rate(currency, day) / market.Rate(pair.Currency, day)
        : market.Close(on, day);

    /// <summary>Value of one contract in its currency; a future is settled daily and worth nothing at the close.</summary>
    public static double Value(Market market, Instrument held, int day) => held.Multiplier * held.Kind switch
    {
        Kind.Fx => 1,
        Kind.Future => 0,
        Kind.Spot => Price(market, held.On, day),
        Kind.Forward => Forward(market, held, day),
        _ => Option(market, held, day),
    };

    private static double Forward(Market market, Instrument held, int day)
    {
        var (spot, strike, _) = Discounted(market, held, day);
        return spot - strike;
    }

    /// <summary>Black-Scholes-Merton; with carry equal to the rate it is Black 76, with a foreign rate Garman-Kohlhagen.</summary>
    private static double Option(Market market, Instrument held, int day)
    {
        var (spot, strike, years) = Discounted(market, held, day);
        var volatility = Underlying(held.On)!.FlatVolatility ?? market.Close(held.On + ".vol", day);
        var deviation = volatility * Math.Sqrt(years);
        var d1 = Math.Log(spot / strike) / deviation + deviation / 2;
        var sign = held.Kind == Kind.Call ? 1 : -1;
        return sign * (spot * Normal(sign * d1) - strike * Normal(sign * (d1 - deviation)));
    }

    private static (double Spot, double Strike, double Years) Discounted(Market market, Instrument held, int day)
    {
        var underlying = Underlying(held.On)!;
        var years = Years(market.Days[day], held.Expiry);
        var spot = Price(market, held.On, day) * Math.Exp(-underlying.Carry * years);
        return (spot, held.Strike * Math.Exp(-World.Rates[held.Currency] * years), years);
    }

    /// <summary>The normal distribution function: its Taylor series about 0 (Marsaglia 2004), in the tails Laplace's continued fraction.</summary>
    private static double Normal(double x)
    {
        const double tail = 3;
        if (x > tail) return 1 - UpperTail(x);
        if (x < -tail) return UpperTail(-x);
        var (sum, before, term, i) = (x, 0.0, x, 1);
        while (sum != before)
        {
            i += 2;
            term *= x * x / i;
            (before, sum) = (sum, sum + term);
        }

        return 0.5 + sum * Density(x);
    }

    private static double UpperTail(double x)
    {
        const int levels = 100;
        var fraction = x;
        for (var k = levels; k > 0; k--) fraction = x + k / fraction;
        return Density(x) / fraction;
    }

    private static double Density(double x) => Math.Exp(-x * x / 2) / Math.Sqrt(2 * Math.PI);
}

/// <summary>Every instrument that was ever held, listed when it is first dealt in.</summary>
internal sealed class Listing(Market market)
{
    private const int RollBeforeExpiry = 28;
    private readonly Dictionary<string, Instrument> _instruments = [];

    public IEnumerable<Instrument> All => _instruments.Values.OrderBy(i => i.Name, StringComparer.Ordinal);

    /// <summary>Smallest quantity dealt in.</summary>
    public static double Lot(Instrument held) => held.Kind switch
    {
        Kind.Fx => 10_000,
        Kind.Forward when Valuation.Underlying(held.On)!.Base is not null => 10_000,
        Kind.Spot => 10,
        _ => 1,
    };

    public Instrument Cash(string currency) => Add(new("Cash-" + currency, Kind.Fx, currency, currency, 1));

    /// <summary>Whether a dated contract is near enough to its expiry to be rolled.</summary>
    public bool IsDue(Instrument held, int day) => held.Expiry != default && held.Expiry.DayNumber - market.Days[day].DayNumber < RollBeforeExpiry;

    /// <summary>The contract that <paramref name="line"/> deals in when it is opened or rolled on <paramref name="day"/>.</summary>
    public Instrument For(Line line, int day) => line.Kind switch
    {
        Kind.Fx => Cash(line.On),
        Kind.Spot => Add(new(line.On, Kind.Spot, line.On, CurrencyOf(line.On), 1)),
        Kind.Future => Add(new(line.On + "-f", Kind.Future, line.On, CurrencyOf(line.On), Firm.FutureMultipliers[line.On])),
        _ => Dated(line, day),
    };

    private Instrument Dated(Line line, int day)
    {
        var underlying = Valuation.Underlying(line.On)!;
        var expiry = NextExpiry(line.Cycle, market.Days[day]);
        var month = expiry.ToString("yyMM", CultureInfo.InvariantCulture);
        var price = Valuation.Price(market, line.On, day);
        if (line.Kind == Kind.Forward) return Forward(underlying, expiry, $"{line.On}-fwd-{month}", price, day);

        var strike = Math.Round(Math.Round(price * line.Moneyness / underlying.StrikeStep) * underlying.StrikeStep, 4);
        var name = $"{line.On}-{month}-{(line.Kind == Kind.Call ? 'C' : 'P')}{Text.Short(strike)}";
        return Add(new(name, line.Kind, line.On, underlying.Currency, underlying.Multiplier, strike, expiry));
    }

    /// <summary>Struck at the money to four digits, so that it is worth next to nothing when it is agreed.</summary>
    private Instrument Forward(Underlying underlying, DateOnly expiry, string name, double price, int day)
    {
        var years = Valuation.Years(market.Days[day], expiry);
        var fair = price * Math.Exp((World.Rates[underlying.Currency] - underlying.Carry) * years);
        var strike = Math.Round(fair, Text.DecimalsFor(fair, 4));
        return Add(new(name, Kind.Forward, underlying.Name, underlying.Currency, 1, strike, expiry));
    }

    private Instrument Add(Instrument instrument)
    {
        _instruments.TryAdd(instrument.Name, instrument);
        return _instruments[instrument.Name];
    }

    private static string CurrencyOf(string factor) => Array.Find(World.Factors, f => f.Name == factor)!.Currency;

    private static DateOnly NextExpiry(int cycle, DateOnly day)
    {
        for (var months = 0; ; months++)
        {
            var month = new DateOnly(day.Year, day.Month, 1).AddMonths(months);
            var expiry = Calendars.ThirdFriday(month.Year, month.Month);
            if (month.Month % 6 == (cycle == 0 ? 3 : 0) && expiry.DayNumber - day.DayNumber >= RollBeforeExpiry) return expiry;
        }
    }
}

// ---------------------------------------------------------------------------------------------------------------
// The house trades
// ---------------------------------------------------------------------------------------------------------------

/// <summary>What a line holds now, and the size it was opened at.</summary>
internal sealed record Holding(Instrument Held, double Quantity, double Opened);

internal sealed record PositionRow(int Day, string Book, Instrument Held, double Quantity, double Value);

internal sealed record PnlRow(int Day, string Book, double Amount);

/// <summary>
/// The desks' holdings day by day. What is bought is paid from the book's cash in that currency and futures settle into it
/// daily, so a book's value changes by its P&amp;L and by nothing else.
/// </summary>
internal sealed class House(Market market)
{
    private const double ChanceOfTrade = 0.035;
    private const double SwingOfTrade = 0.25;
    private const double FeeRate = 0.0001;
    private const double ExecutionNoise = 0.003;

    private readonly Chance _trading = new("trading");
    private readonly Chance _intraday = new("intraday");
    private readonly Listing _listing = new(market);
    private readonly Dictionary<Line, Holding> _holdings = [];
    private readonly Dictionary<(string Book, string Currency), double> _cash = [];
    private Dictionary<string, double> _values = [];

    public IEnumerable<Instrument> Instruments => _listing.All;

    public List<PositionRow> Positions { get; } = [];

    public List<PnlRow> Pnl { get; } = [];

    public void TradeThrough()
    {
        // The house deals in all markets, so it closes its books on every day that one of them is open.
        var days = Enumerable.Range(0, market.Days.Length).Where(t => Calendars.Names.Any(c => Calendars.IsOpen(c, market.Days[t])));
        int[] dates = [.. days.TakeLast(Span.PositionDates)];
        foreach (var line in Firm.Lines) Open(line, dates[0]);
        OpenCash();
        Close(dates[0]);
        for (var i = 1; i < dates.Length; i++) LiveThrough(dates[i - 1], dates[i]);
    }

    /// <summary>What is held on the first date was paid for long ago, so what opening it has cost is struck out.</summary>
    private void OpenCash()
    {
        _cash.Clear();
        foreach (var book in Firm.Books.Where(b => b.IsLeaf)) Pay(book.Name, book.Currency, book.Cash);
    }

    private void LiveThrough(int before, int day)
    {
        SettleFutures(before, day);
        foreach (var line in Firm.Lines) Trade(line, day);
        foreach (var book in Firm.Books.Where(b => b.IsLeaf)) Pay(book.Name, book.Currency, book.Intraday * _intraday.FatTailed());

        var opening = _values;
        Close(day);
        foreach (var book in Firm.Books.Where(b => b.IsLeaf || Firm.ReportingGroups.Contains(b.Name)))
        {
            Pnl.Add(new(day, book.Name, _values[book.Name] - opening[book.Name]));
        }
    }

    private void SettleFutures(int before, int day)
    {
        foreach (var line in Firm.Lines.Where(l => l.Kind == Kind.Future))
        {
            var (held, quantity, _) = _holdings[line];
            var change = Valuation.Price(market, held.On, day) - Valuation.Price(market, held.On, before);
            Pay(line.Book, held.Currency, quantity * held.Multiplier * change);
        }
    }

    private void Trade(Line line, int day)
    {
        var holding = _holdings[line];
        var trades = _trading.Uniform() < ChanceOfTrade;
        var swing = SwingOfTrade * (2 * _trading.Uniform() - 1);
        if (_listing.IsDue(holding.Held, day))
        {
            Buy(line.Book, holding.Held, -holding.Quantity, day);
            Open(line, day);
        }
        else if (trades)
        {
            var aim = InLots(holding.Held, holding.Opened * (1 + swing));
            Buy(line.Book, holding.Held, aim - holding.Quantity, day);
            _holdings[line] = holding with { Quantity = aim };
        }
    }

    private void Open(Line line, int day)
    {
        var held = _listing.For(line, day);
        var quantity = InLots(held, line.Notional * 1000 / (Exposure(held, day) * market.Rate(held.Currency, day)));
        Buy(line.Book, held, quantity, day);
        _holdings[line] = new(held, quantity, quantity);
    }

    /// <summary>Pays the value at the close; the price really dealt at was a little off it, and a fee is due.</summary>
    private void Buy(string book, Instrument held, double quantity, int day)
    {
        var value = quantity * Valuation.Value(market, held, day);
        if (held.Kind == Kind.Fx) Pay(book, "EUR", -value * market.Rate(held.Currency, day));
        else Pay(book, held.Currency, -value);

        // Options, forwards and currencies are dealt at tighter prices than shares, measured on what they are written on.
        var tightness = held.Kind is Kind.Spot or Kind.Future ? 1 : 0.1;
        var size = Math.Abs(quantity * Exposure(held, day)) * tightness;
        Pay(book, held.Currency, size * (ExecutionNoise * _intraday.Normal() - FeeRate));
    }

    /// <summary>Cash is kept in whole units.</summary>
    private void Pay(string book, string currency, double amount) =>
        _cash[(book, currency)] = Math.Round(_cash.GetValueOrDefault((book, currency)) + amount);

    private double Exposure(Instrument held, int day) =>
        held.Multiplier * (held.Kind == Kind.Fx ? 1 : Valuation.Price(market, held.On, day));

    private static double InLots(Instrument held, double quantity)
    {
        var lot = Listing.Lot(held);
        var rounded = Math.Round(quantity / lot) * lot;
        return rounded == 0 ? Math.Sign(quantity) * lot : rounded;
    }

    /// <summary>Strikes the day's positions, and every node's value in its own currency.</summary>
    private void Close(int day)
    {
        var lines = Firm.Lines.Select(l => (l.Book, _holdings[l].Held, _holdings[l].Quantity));
        var cash = _cash.Select(c => (c.Key.Book, Held: _listing.Cash(c.Key.Currency), Quantity: c.Value));
        var held = lines.Concat(cash).GroupBy(p => (p.Book, p.Held), p => p.Quantity).ToDictionary(g => g.Key, g => g.Sum());

        var values = Firm.Books.ToDictionary(b => b.Name, _ => 0.0);
        foreach (var book in Firm.Books)
        {
            foreach (var (key, quantity) in held.Where(h => h.Key.Book == book.Name && h.Value != 0).OrderBy(h => h.Key.Held.Name, StringComparer.Ordinal))
            {
                var value = quantity * Valuation.Value(market, key.Held, day);
                Positions.Add(new(day, book.Name, key.Held, quantity, value));
                foreach (var node in Firm.PathToRoot(book)) values[node.Name] += value * market.Rate(key.Held.Currency, day);
            }
        }

        _values = Firm.Books.ToDictionary(b => b.Name, b => values[b.Name] / market.Rate(b.Currency, day));
    }
}

// ---------------------------------------------------------------------------------------------------------------
// The files
// ---------------------------------------------------------------------------------------------------------------

/// <summary>Numbers as text, the same in every culture.</summary>
internal static class Text
{
    public static string Plain(double value, int decimals) => value.ToString("F" + decimals, CultureInfo.InvariantCulture);

    public static string Short(double value) => value.ToString("0.############", CultureInfo.InvariantCulture);

    public static string Date(DateOnly date) => date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);

    /// <summary>Decimals that show <paramref name="value"/> to so many significant digits; none beyond the point where its whole part has more.</summary>
    public static int DecimalsFor(double value, int digits)
    {
        const int most = 12;
        var decimals = digits;
        for (var size = Math.Abs(value); size >= 1 && decimals > 0; size /= 10) decimals--;
        for (var size = Math.Abs(value); size < 0.1 && decimals < most; size *= 10) decimals++;
        return decimals;
    }
}

/// <summary>Writes the feed: UTF-8, line feeds, no quoting, since no text in it holds a comma.</summary>
internal sealed class Feed(string folder)
{
    // The book of record booked this line with a stale volatility on the as-of date; everything else agrees.
    private const string OddBook = "OpShare";
    private const string OddUnderlying = "Corvane";
    private const double OddFactor = 1.06;

    public void Write(Market market, House house)
    {
        Table("books.csv", "book,parent,name,currency", Firm.Books.Select(b => $"{b.Name},{b.Parent},{b.Title},{b.Currency}"));
        Table("factors.csv", "factor,class,shock,currency,calendar", Factors());
        Table("holidays.csv", "calendar,date", Calendars.Holidays().Select(h => $"{h.Calendar},{Text.Date(h.Date)}"));
        Table("adjustments.csv", "factor,date,ratio,reason", [$"{World.Split.Factor},{Text.Date(World.Split.Date)},{Text.Short(World.Split.Ratio)},{World.Split.Reason}"]);
        Table("observations.csv", "date,factor,value", market.Quotes.OrderBy(q => q.Day).Select(q => $"{Text.Date(market.Days[q.Day])},{q.Factor},{q.Value}"));
        Table("instruments.csv", "instrument,kind,currency,multiplier,factor,base_currency,strike,expiry,right,style,vol,vol_factor,curve,carry,issuer,lot,daily_volume", house.Instruments.Select(Instrument));
        Table("positions.csv", "as_of,book,instrument,quantity,market_value", Positions(market, house));
        Table("limits.csv", "limit,book,measure,confidence,horizon_days,amount,basis,reference_book,warn_at,valid_from,approver,reason", Firm.Limits.Select(Limit));
        Table("pnl.csv", "date,book,actual", house.Pnl.Select(p => $"{Text.Date(market.Days[p.Day])},{p.Book},{Text.Plain(p.Amount, 0)}"));
    }

    private static IEnumerable<string> Factors() => World.Factors
        .Select(f => $"{f.Name},{f.Class},lognormal,{f.Currency},{f.Calendar}")
        .Concat(World.Volatilities.Select(v => $"{v.Name},vol,lognormal,,{v.Calendar}"));

    private static string Instrument(Instrument i)
    {
        var multiplier = i.Multiplier == 1 ? "" : Text.Short(i.Multiplier);
        var (issuer, dailyVolume) = Firm.Issuers.GetValueOrDefault(i.On, ("", 0));
        var name = $"{i.Name},{Spelling(i.Kind)},{i.Currency},{multiplier}";
        var lot = i.Kind == Kind.Fx ? "" : Text.Short(Listing.Lot(i));
        var trading = $"{issuer},{lot},{(i.Kind == Kind.Spot && dailyVolume > 0 ? Text.Short(dailyVolume) : "")}";
        return i.Kind switch
        {
            Kind.Fx => $"{name},,,,,,,,,,,{trading}",
            Kind.Spot or Kind.Future => $"{name},{i.On},,,,,,,,,,{trading}",
            _ => $"{name},{DatedTerms(i)},{trading}",
        };
    }

    private static string DatedTerms(Instrument i)
    {
        var underlying = Valuation.Underlying(i.On)!;
        var on = underlying.Base is null ? $"{i.On}," : $",{underlying.Base}";
        var volatility = underlying.FlatVolatility is { } flat ? $"{Text.Short(flat)}," : $",{i.On}.vol";
        var right = i.Kind == Kind.Forward ? ",,," : $"{(i.Kind == Kind.Call ? "call" : "put")},european,{volatility}";
        return $"{on},{Text.Short(i.Strike)},{Text.Date(i.Expiry)},{right},{Text.Short(World.Rates[i.Currency])},{Text.Short(underlying.Carry)}";
    }

    private static string Spelling(Kind kind) => kind switch
    {
        Kind.Spot => "spot",
        Kind.Fx => "fx",
        Kind.Future => "future",
        Kind.Forward => "forward",
        _ => "option",
    };

    private static IEnumerable<string> Positions(Market market, House house)
    {
        const int digits = 6;
        var odd = house.Positions.Last(p => p.Book == OddBook && p.Held.On == OddUnderlying && p.Held.Kind is Kind.Put);
        foreach (var position in house.Positions)
        {
            var value = ReferenceEquals(position, odd) ? position.Value * OddFactor : position.Value;
            var printed = Text.Short(Math.Round(value, Text.DecimalsFor(value, digits)) + 0.0); // a short future's -0 becomes 0
            yield return $"{Text.Date(market.Days[position.Day])},{position.Book},{position.Held.Name},{Text.Short(position.Quantity)},{printed}";
        }
    }

    private static string Limit(Limit l) =>
        $"{l.Name},{l.Book},{l.Measure},{l.Confidence},{l.Days},{l.Amount},{l.Basis},{l.Reference},{l.WarnAt},{l.From},{l.Approver},{l.Reason}";

    private void Table(string file, string head, IEnumerable<string> rows)
    {
        var text = new StringBuilder(head).Append('\n');
        foreach (var row in rows) text.Append(row).Append('\n');
        File.WriteAllText(Path.Combine(folder, file), text.ToString(), new UTF8Encoding(encoderShouldEmitUTF8Identifier: false));
    }
}
