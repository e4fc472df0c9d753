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

/// <summary>
/// A curve of zero rates. It keeps to a story (short and long rate at a few dates, straight lines between them) and wanders about it:
/// a level and a slope that move by <paramref name="DailyMove"/> and half of it, and a little of each tenor's own.
/// </summary>
internal sealed record ZeroCurve(string Currency, string Calendar, double DailyMove, double[] Loadings, (DateOnly Date, double Short, double Long)[] Story)
{
    public static readonly (string Name, double Years)[] Tenors = [("3M", 0.25), ("1Y", 1), ("2Y", 2), ("5Y", 5), ("10Y", 10), ("20Y", 20)];

    public string Name => Currency + ".zero";

    public string Factor(string tenor) => Name + "." + tenor;
}

/// <summary>An issuer's spread over the zero curve: one factor, or a curve of its own where it has tenors. It reverts, and widens when markets fall.</summary>
internal sealed record CreditSpread(string Of, string Currency, string Calendar, double Level, double[] Loadings, (string Name, double Years, double Ratio)[] Tenors)
{
    public string Name => Of + ".spread";

    public string Factor(string tenor) => tenor == "" ? Name : Name + "." + tenor;
}

internal enum Driver
{
    World,
    Europe,
    Dollar,
    Energy,
    Metal,
    Harvest,
    Interest,
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

    //                                                                                         World Europe Dollar Energy Metal Harvest Interest
    public static readonly ZeroCurve[] Curves =
    [
        new("EUR", "Lowland", 0.00042, [0.30, 0.15, 0, 0, 0, 0, 0.65],
            [(Span.First, -0.0052, 0.0040), (new(2022, 8, 1), -0.0030, 0.0175), (new(2023, 10, 2), 0.0365, 0.0300), (new(2025, 3, 3), 0.0250, 0.0270), (Span.AsOf, 0.0205, 0.0290)]),
        new("USD", "Atlantic", 0.00052, [0.25, 0, 0.15, 0, 0, 0, 0.70],
            [(Span.First, 0.0030, 0.0165), (new(2023, 6, 1), 0.0480, 0.0370), (new(2024, 9, 2), 0.0470, 0.0375), (Span.AsOf, 0.0345, 0.0360)]),
        new("GBP", "Isles", 0.00050, [0.25, 0.10, 0, 0, 0, 0, 0.62],
            [(Span.First, 0.0035, 0.0105), (new(2023, 9, 1), 0.0495, 0.0410), (new(2025, 1, 2), 0.0450, 0.0430), (Span.AsOf, 0.0335, 0.0415)]),
    ];

    public static readonly CreditSpread[] Spreads =
    [
        new("Merrin", "EUR", "Lowland", 0.0115, [-0.36, -0.28, 0, 0, 0, 0], [("2Y", 2, 0.75), ("7Y", 7, 1.15)]),
        new("Ostwal", "EUR", "Lowland", 0.0080, [-0.30, -0.28, 0, -0.10, 0, 0], [("", 0, 1)]),
    ];

    // Irregularities worth a finding: a split, a quote that was never delivered, a price that stopped moving.
    public static readonly (string Factor, DateOnly Date, double Ratio, string Reason) Split = ("Boldenau", new(2025, 5, 12), 0.5, "two shares for one");
    public static readonly (string Factor, DateOnly Date) Missing = ("Cocoa", new(2025, 4, 3));
    public static readonly (string Factor, DateOnly Since) Frozen = ("Pellgate", new(2026, 11, 23));

    /// <summary>The factors of a curve, or the one factor of that name, by tenor.</summary>
    public static (string Factor, double Years)[] Points(string curve) =>
    [
        .. Curves.Where(c => c.Name == curve).SelectMany(c => ZeroCurve.Tenors.Select(t => (c.Factor(t.Name), t.Years))),
        .. Spreads.Where(s => s.Name == curve).SelectMany(s => s.Tenors.Select(t => (s.Factor(t.Name), t.Years))),
    ];

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

/// <summary>
/// A node of the book tree; opening cash and the size of a day's intraday trading in its own currency, leaf books only. What was
/// <paramref name="Added"/> to the first invention draws from a stream of its own, so that the rest stays as it was.
/// </summary>
internal sealed record Book(string Name, string Parent, string Title, string Currency, double Cash = 0, double Intraday = 0, bool Added = false)
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
    CurveForward,
    AmericanCall,
    AmericanPut,
    DigitalPut,
    DownOutCall,
    UpOutPut,
    ArithmeticCall,
    GeometricCall,
    LookbackCall,
    Bond,
    Floater,
    Swap,
}

/// <summary>
/// A bond, floater or swap on the zero curve of its currency. It is issued whole periods before it matures, so that a fixed coupon
/// is always the rate over the frequency. A frequency of 0 means that there is no such leg.
/// </summary>
internal sealed record RateProduct(
    string Name, Kind Kind, string Currency, string Issuer, double Coupon, int Frequency, int FloatFrequency, double FloatSpread,
    DateOnly Issue, DateOnly Maturity, string Spread = "", bool ReceivesFixed = true)
{
    public string Curve => Currency + ".zero";

    public double Notional => Kind == Kind.Swap ? 1_000_000 : 100;

    public static RateProduct Bond(string name, string currency, string issuer, double coupon, int frequency, DateOnly issue, DateOnly maturity, string spread = "") =>
        new(name, Kind.Bond, currency, issuer, coupon, frequency, 0, 0, issue, maturity, spread);

    public static RateProduct Floater(string name, string currency, string issuer, double floatSpread, int frequency, DateOnly issue, DateOnly maturity, string spread) =>
        new(name, Kind.Floater, currency, issuer, 0, 0, frequency, floatSpread, issue, maturity, spread);

    public static RateProduct Swap(string name, string currency, bool receivesFixed, double coupon, int frequency, int floatFrequency, DateOnly issue, DateOnly maturity) =>
        new(name, Kind.Swap, currency, "", coupon, frequency, floatFrequency, 0, issue, maturity, "", receivesFixed);
}

/// <summary>
/// A holding that a desk keeps up: its notional in thousands of EUR (negative is short) sizes it when it is opened, and
/// trading wanders around that size. Dated contracts expire in March and September (cycle 0) or June and December (cycle 1)
/// and roll half a year on, so that a line of each cycle keeps two expiries alive.
/// </summary>
internal sealed record Line(string Book, Kind Kind, string On, double Notional, double Moneyness = 1, int Cycle = 0, bool Added = false);

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
        new("OpExotic", "OPTION", "Barriers and averages", "EUR", 1_500_000, 2_000, Added: true),
        new("COMMOD", "HOUSE", "Commodities", "EUR"),
        new("CoMetal", "COMMOD", "Base metals", "USD", 6_000_000, 12_000),
        new("CoEnergy", "COMMOD", "Oil and gas", "EUR", 7_000_000, 12_000),
        new("CoHarv", "COMMOD", "Grain and softs", "EUR", 4_000_000, 7_000),
        new("TREAS", "HOUSE", "Treasury", "EUR"),
        new("TrHedge", "TREAS", "Currency hedges", "EUR", 2_000_000, 2_000),
        new("TrCross", "TREAS", "Currency crosses", "EUR", 3_000_000, 4_000),
        new("TrCash", "TREAS", "Liquidity", "EUR", 30_000_000, 1_000),
        new("RATES", "HOUSE", "Rates", "EUR"),
        new("RtBond", "RATES", "Bonds and floaters", "EUR", 2_000_000, 4_000, Added: true),
        new("RtSwap", "RATES", "Swaps", "EUR", 3_000_000, 4_000, Added: true),
        new("RtDollar", "RATES", "Dollar rates", "USD", 2_500_000, 5_000, Added: true),
        new("RtFund", "RATES", "Currency funding", "EUR", 1_500_000, 1_500, Added: true),
    ];

    /// <summary>Groups whose children keep other currencies report their own P&amp;L in EUR; that of the other groups is the sum of their children's.</summary>
    public static readonly string[] ReportingGroups = ["HOUSE", "EQUITY", "COMMOD", "RATES"];

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

    public static readonly RateProduct[] RateProducts =
    [
        RateProduct.Bond("Vlier-28", "EUR", "State of Vlier", 0.0125, 1, new(2020, 5, 20), new(2028, 5, 20)),
        RateProduct.Bond("Vlier-30", "EUR", "State of Vlier", 0.0225, 1, new(2023, 10, 15), new(2030, 10, 15)),
        RateProduct.Bond("Vlier-34", "EUR", "State of Vlier", 0.0275, 1, new(2024, 4, 10), new(2034, 4, 10)),
        RateProduct.Bond("Vlier-41", "EUR", "State of Vlier", 0.03, 1, new(2021, 9, 5), new(2041, 9, 5)),
        RateProduct.Bond("Merrin-30", "EUR", "Merrin Bank", 0.035, 1, new(2024, 6, 12), new(2030, 6, 12), "Merrin.spread"),
        RateProduct.Bond("Ostwal-33", "EUR", "Ostwal Grid", 0.0325, 1, new(2023, 2, 18), new(2033, 2, 18), "Ostwal.spread"),
        RateProduct.Bond("Heathmoor-31", "GBP", "Heathmoor Insurance", 0.05, 2, new(2024, 7, 22), new(2031, 7, 22), "0.0135"),
        RateProduct.Floater("Merrin-29F", "EUR", "Merrin Bank", 0.0095, 4, new(2024, 9, 16), new(2029, 9, 16), "Merrin.spread"),
        RateProduct.Bond("Tamar-28", "USD", "Tamar Union", 0.0425, 2, new(2023, 8, 15), new(2028, 8, 15)),
        RateProduct.Bond("Tamar-31", "USD", "Tamar Union", 0.04, 2, new(2024, 5, 15), new(2031, 5, 15)),
        RateProduct.Bond("Tamar-36", "USD", "Tamar Union", 0.0425, 2, new(2024, 11, 15), new(2036, 11, 15)),
        RateProduct.Swap("EUR-swap-29R", "EUR", true, 0.0245, 1, 2, new(2024, 3, 8), new(2029, 3, 8)),
        RateProduct.Swap("EUR-swap-34P", "EUR", false, 0.0265, 1, 2, new(2024, 10, 24), new(2034, 10, 24)),
        RateProduct.Swap("EUR-swap-45R", "EUR", true, 0.0285, 1, 2, new(2025, 1, 27), new(2045, 1, 27)),
        RateProduct.Swap("USD-swap-30R", "USD", true, 0.0385, 2, 4, new(2025, 2, 11), new(2030, 2, 11)),
        RateProduct.Swap("USD-swap-35P", "USD", false, 0.0395, 2, 4, new(2025, 6, 3), new(2035, 6, 3)),
    ];

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

        .. Exotics("OpShare", (Kind.AmericanPut, "Brakvest", 0.95, 900), (Kind.AmericanCall, "Corvane", 1.02, 700), (Kind.AmericanPut, "Merrin", 0.98, -600), (Kind.AmericanCall, "Quinlane", 1.05, 600)),
        .. Exotics("OpExotic", (Kind.DownOutCall, "Corvane", 1, 1200), (Kind.UpOutPut, "Heathmoor", 1, 900), (Kind.DigitalPut, "AtlIndex", 0.96, -250)),
        .. Exotics("OpExotic", (Kind.ArithmeticCall, "Crude", 1.02, 1200), (Kind.GeometricCall, "Copper", 1, -1000), (Kind.LookbackCall, "LowIndex", 1, 700)),
        .. RateLines("RtBond", ("Vlier-28", 3000), ("Vlier-30", 4000), ("Vlier-34", 3500), ("Vlier-41", 1000), ("Merrin-30", 2500), ("Ostwal-33", 2000), ("Heathmoor-31", 1200), ("Merrin-29F", 3000)),
        .. RateLines("RtSwap", ("EUR-swap-29R", 20000), ("EUR-swap-34P", 14000), ("EUR-swap-45R", 6000)),
        .. RateLines("RtDollar", ("Tamar-28", 2500), ("Tamar-31", 3000), ("Tamar-36", 1500), ("USD-swap-30R", 12000), ("USD-swap-35P", 3000)),
        new("RtFund", Kind.CurveForward, "USD", -2500, Added: true),
        new("RtFund", Kind.CurveForward, "GBP", -1500, Cycle: 1, Added: true),
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
        new("exotic-es", "OpExotic", "es", "0.975", 1, "90000", "amount", "", "0.8", "2026-10-01", "Risk committee", "barriers and averages stay a sideline"),
        new("rates-var", "RATES", "var", "0.99", 1, "220000", "amount", "", "0.8", "2026-01-02", "Risk committee", "yearly review"),
        new("dollar-var", "RtDollar", "var", "0.99", 1, "110000", "amount", "", "0.8", "2026-01-02", "Risk committee", "yearly review"),
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

    private static IEnumerable<Line> Exotics(string book, params (Kind Kind, string On, double Moneyness, double Notional)[] held) =>
        held.Select(h => new Line(book, h.Kind, h.On, h.Notional, h.Moneyness, Added: true));

    private static IEnumerable<Line> RateLines(string book, params (string Product, double Notional)[] held) =>
        held.Select(h => new Line(book, Product(h.Product).Kind, h.Product, h.Notional, Added: true));

    public static RateProduct Product(string name) => Array.Find(RateProducts, p => p.Name == name)!;

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
        foreach (var curve in World.Curves) market.Draw(curve, moves);
        foreach (var spread in World.Spreads) market.Widen(spread, moves);
        return market;
    }

    public double Close(string factor, int day) => _closes[factor][day];

    /// <summary>EUR for one unit of <paramref name="currency"/>.</summary>
    public double Rate(string currency, int day) => currency == "EUR" ? 1 : Close(currency, day);

    /// <summary>The zero rate, or spread, of a curve at <paramref name="years"/>: straight lines between tenors, flat beyond the ends.</summary>
    public double Zero(string curve, int day, double years)
    {
        var points = World.Points(curve);
        var next = Array.FindIndex(points, p => p.Years >= years);
        if (next == 0 || points.Length == 1) return Close(points[0].Factor, day);
        if (next < 0) return Close(points[^1].Factor, day);
        var (before, after) = (points[next - 1], points[next]);
        var weight = (years - before.Years) / (after.Years - before.Years);
        return (1 - weight) * Close(before.Factor, day) + weight * Close(after.Factor, day);
    }

    /// <summary>The newest day of the market that is not after <paramref name="date"/>.</summary>
    public int DayOf(DateOnly date)
    {
        var found = Array.BinarySearch(Days, date);
        return found >= 0 ? found : ~found - 1;
    }

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

    /// <summary>The short end moves less with the level than the long end, and more with the slope.</summary>
    private void Draw(ZeroCurve curve, Moves moves)
    {
        const double reversion = 0.008;
        var level = Wander(moves.Common(curve.Name + " level", curve.Loadings), reversion, curve.DailyMove);
        var slope = Wander(moves.Common(curve.Name + " slope", []), reversion, curve.DailyMove / 2);
        foreach (var (tenor, years) in ZeroCurve.Tenors)
        {
            var name = curve.Factor(tenor);
            var own = Wander(moves.Common(name, []), 0.05, curve.DailyMove / 7);
            var path = new double[Days.Length];
            for (var t = 0; t < path.Length; t++)
            {
                var (brief, lasting) = Told(curve.Story, Days[t]);
                path[t] = lasting + (brief - lasting) * Math.Exp(-years / 2.5) + level[t] * (1 - 0.65 * Math.Exp(-years)) + slope[t] * (Math.Exp(-years / 4) - 0.4) + own[t];
            }

            Print(name, curve.Calendar, 6, path);
        }
    }

    private static (double Short, double Long) Told((DateOnly Date, double Short, double Long)[] story, DateOnly day)
    {
        var next = Math.Max(Array.FindIndex(story, s => s.Date >= day), 1);
        var (from, to) = (story[next - 1], story[next]);
        var way = (day.DayNumber - from.Date.DayNumber) / (double)(to.Date.DayNumber - from.Date.DayNumber);
        return (from.Short + way * (to.Short - from.Short), from.Long + way * (to.Long - from.Long));
    }

    private void Widen(CreditSpread spread, Moves moves)
    {
        const double dailyMove = 0.018;
        var common = Wander(moves.Common(spread.Name, spread.Loadings), 0.006, dailyMove);
        foreach (var (tenor, _, ratio) in spread.Tenors)
        {
            var own = Wander(moves.Common(spread.Factor(tenor) + " own", []), 0.05, dailyMove / 5);
            Print(spread.Factor(tenor), spread.Calendar, 6, [.. common.Zip(own, (c, o) => spread.Level * ratio * Math.Exp(c + o))]);
        }
    }

    /// <summary>Steps of <paramref name="size"/> that are slowly pulled back to 0.</summary>
    private static double[] Wander(double[] shocks, double reversion, double size)
    {
        var path = new double[shocks.Length];
        for (var t = 1; t < path.Length; t++) path[t] = (1 - reversion) * path[t - 1] + size * shocks[t];
        return path;
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
    private readonly (double[] Shocks, double[] Variance)[] _drivers;

    public Moves(DateOnly[] days)
    {
        var stress = Array.ConvertAll(days, d => StressOn(days, d));
        _drivers = [.. Enum.GetValues<Driver>().Select(d => DriverPath(d, stress))];
        foreach (var factor in World.Factors) _moves[factor.Name] = Combine(factor.Name, factor.Loadings, _drivers);
    }

    /// <summary>Moves that share in the drivers by <paramref name="loadings"/>, the rest of their variance being of their own.</summary>
    public double[] Common(string name, double[] loadings) => Combine(name, loadings, _drivers).Shocks;

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

    private static (double[] Shocks, double[] Turbulence) Combine(string name, double[] loadings, (double[] Shocks, double[] Variance)[] drivers)
    {
        var own = new Turbulence("own " + name, asymmetric: false);
        var ownShare = 1 - loadings.Sum(l => l * l);
        var days = drivers[0].Shocks.Length;
        var (shocks, variance) = (new double[days], new double[days]);
        for (var t = 0; t < days; t++)
        {
            variance[t] = ownShare * own.Variance;
            shocks[t] = Math.Sqrt(ownShare) * own.Next();
            for (var d = 0; d < loadings.Length; d++)
            {
                shocks[t] += loadings[d] * drivers[d].Shocks[t];
                variance[t] += loadings[d] * loadings[d] * drivers[d].Variance[t];
            }
        }

        return (shocks, variance);
    }
}

// ---------------------------------------------------------------------------------------------------------------
// Instruments and their values
// ---------------------------------------------------------------------------------------------------------------

internal sealed record Instrument(string Name, Kind Kind, string On, string Currency, double Multiplier, double Strike = 0, DateOnly Expiry = default)
{
    /// <summary>Where rates are read from: a curve, or where there is none the flat rate of the currency and the underlying's flat carry.</summary>
    public string? Curve { get; init; }

    public string? CarryCurve { get; init; }

    /// <summary>Day on which an option that remembers its path began to.</summary>
    public DateOnly Issue { get; init; }

    public double Barrier { get; init; }

    public DateOnly[] Fixings { get; init; } = [];

    /// <summary>What a bond, floater or swap pays.</summary>
    public RateProduct? Rates { get; init; }

    /// <summary>Rate of the floating period that runs.</summary>
    public double Fixing { get; init; }
}

/// <summary>The value of bonds, floaters and swaps: what they will pay, discounted on the zero curve and the issuer's spread.</summary>
internal static class RateValuation
{
    private const double DaysOfFloating = 360;

    public static double Value(Market market, Instrument held, int day)
    {
        var product = held.Rates!;
        var (today, value) = (market.Days[day], 0.0);
        foreach (var (_, end) in Periods(product, product.Frequency).Where(p => p.End > today)) value += Coupon(product) * Discount(market, product, day, end);
        foreach (var (start, end) in Periods(product, product.FloatFrequency).Where(p => p.End > today))
        {
            var forward = start > today ? Growth(market, product, day, start, end) - 1 : held.Fixing * Floating(start, end);
            value += SignOfFloating(product) * product.Notional * (forward + product.FloatSpread * Floating(start, end)) * Discount(market, product, day, end);
        }

        return product.Kind == Kind.Swap ? value : value + product.Notional * Discount(market, product, day, product.Maturity);
    }

    /// <summary>What one unit pays after the date <paramref name="from"/> and by <paramref name="to"/>.</summary>
    public static double Paid(Instrument held, DateOnly from, DateOnly to)
    {
        var product = held.Rates!;
        bool Falls((DateOnly, DateOnly End) period) => period.End > from && period.End <= to;
        return Periods(product, product.Frequency).Count(Falls) * Coupon(product)
            + Periods(product, product.FloatFrequency).Where(Falls).Sum(p => SignOfFloating(product) * product.Notional * (held.Fixing + product.FloatSpread) * Floating(p.Start, p.End));
    }

    /// <summary>The floating period that runs at the close of <paramref name="today"/>.</summary>
    public static (DateOnly Start, DateOnly End) Running(RateProduct product, DateOnly today) => Periods(product, product.FloatFrequency).First(p => p.End > today);

    /// <summary>Rate of a floating period, read from the curve on the last day of the market before it, as printed.</summary>
    public static double Fixing(Market market, RateProduct product, (DateOnly Start, DateOnly End) period) =>
        Math.Round((Growth(market, product, market.DayOf(period.Start), period.Start, period.End) - 1) / Floating(period.Start, period.End), 6);

    private static IEnumerable<(DateOnly Start, DateOnly End)> Periods(RateProduct product, int frequency)
    {
        const int monthsOfYear = 12;
        if (frequency == 0) yield break;
        for (var (start, months) = (product.Issue, monthsOfYear / frequency); start < product.Maturity; start = start.AddMonths(months)) yield return (start, start.AddMonths(months));
    }

    private static double Coupon(RateProduct product) => product.Frequency == 0 ? 0 : (product.ReceivesFixed ? 1 : -1) * product.Notional * product.Coupon / product.Frequency;

    private static int SignOfFloating(RateProduct product) => product.Kind == Kind.Swap && product.ReceivesFixed ? -1 : 1;

    private static double Floating(DateOnly start, DateOnly end) => (end.DayNumber - start.DayNumber) / DaysOfFloating;

    private static double Growth(Market market, RateProduct product, int day, DateOnly start, DateOnly end) =>
        Math.Exp(Exponent(market, product.Curve, day, end) - Exponent(market, product.Curve, day, start));

    private static double Discount(Market market, RateProduct product, int day, DateOnly paid) =>
        Math.Exp(-Exponent(market, product.Curve, day, paid) - Exponent(market, product.Spread, day, paid));

    private static double Exponent(Market market, string curve, int day, DateOnly date)
    {
        if (curve == "") return 0;
        var years = Valuation.Years(market.Days[day], date);
        return years * (double.TryParse(curve, NumberStyles.Float, CultureInfo.InvariantCulture, out var flat) ? flat : market.Zero(curve, day, years));
    }
}

/// <summary>What an option's value rests on: spot, strike, rate, carry, volatility, years.</summary>
internal readonly record struct Terms(double Spot, double Strike, double Rate, double Carry, double Volatility, double Years)
{
    public double Growth => Rate - Carry;

    public double Deviation => Volatility * Math.Sqrt(Years);

    public double Discount => Math.Exp(-Rate * Years);

    public double Forward => Spot * Math.Exp(Growth * Years);
}

/// <summary>Options beyond the plain ones.</summary>
internal static class Exotic
{
    public const double Payoff = 1000;

    // Half a look's move, by which a barrier that is looked at daily lies farther away (Broadie, Glasserman, Kou 1997).
    private const double ShiftOfLooks = 0.5826;
    private const double LooksOfYear = 252;
    private const int Steps = 300;

    public static double Value(Market market, Instrument held, Terms terms, int day) => held.Kind switch
    {
        Kind.AmericanCall => American(terms, 1),
        Kind.AmericanPut => American(terms, -1),
        Kind.DigitalPut => Payoff * terms.Discount * Valuation.Normal(terms.Deviation / 2 - Math.Log(terms.Forward / terms.Strike) / terms.Deviation),
        Kind.DownOutCall => OutLike(terms, held.Barrier, 1),
        Kind.UpOutPut => OutLike(terms, held.Barrier * Math.Exp(ShiftOfLooks * terms.Volatility / Math.Sqrt(LooksOfYear)), -1),
        Kind.ArithmeticCall => Arithmetic(terms, Past(market, held, day), ToCome(market, held, day)),
        Kind.GeometricCall => Geometric(terms, Past(market, held, day), ToCome(market, held, day)),
        Kind.LookbackCall => Lookback(terms, Lowest(market, held, day)),
        _ => throw new InvalidOperationException(held.Name),
    };

    /// <summary>Whether a barrier is touched at the close of <paramref name="day"/>.</summary>
    public static bool IsKnocked(Market market, Instrument held, int day) => held.Kind switch
    {
        Kind.DownOutCall => market.Close(held.On, day) <= held.Barrier,
        Kind.UpOutPut => market.Close(held.On, day) >= held.Barrier,
        _ => false,
    };

    /// <summary>The binomial tree of Cox, Ross and Rubinstein (1979); what it gets wrong for the plain option is taken off.</summary>
    private static double American(Terms terms, int sign)
    {
        var step = terms.Years / Steps;
        var up = Math.Exp(terms.Volatility * Math.Sqrt(step));
        var chance = (Math.Exp(terms.Growth * step) - 1 / up) / (up - 1 / up);
        var discount = Math.Exp(-terms.Rate * step);
        var (early, late) = (new double[Steps + 1], new double[Steps + 1]);
        double Exercise(int n, int ups) => sign * (terms.Spot * Math.Pow(up, 2 * ups - n) - terms.Strike);
        for (var i = 0; i <= Steps; i++) early[i] = late[i] = Math.Max(Exercise(Steps, i), 0);
        for (var n = Steps - 1; n >= 0; n--)
        {
            for (var i = 0; i <= n; i++)
            {
                late[i] = discount * (chance * late[i + 1] + (1 - chance) * late[i]);
                early[i] = Math.Max(discount * (chance * early[i + 1] + (1 - chance) * early[i]), Exercise(n, i));
            }
        }

        return Math.Max(early[0] - late[0] + Plain(terms, sign), sign * (terms.Spot - terms.Strike));
    }

    private static double Plain(Terms terms, int sign) => terms.Discount * Black(terms.Forward, terms.Strike, terms.Deviation, sign);

    /// <summary>A down-and-out call with its barrier below the strike, or an up-and-out put with it above (Reiner and Rubinstein 1991).</summary>
    private static double OutLike(Terms terms, double barrier, int sign)
    {
        if (sign * (terms.Spot - barrier) <= 0) return 0;
        var mu = terms.Growth / (terms.Volatility * terms.Volatility) - 0.5;
        var y = Math.Log(barrier * barrier / (terms.Spot * terms.Strike)) / terms.Deviation + (1 + mu) * terms.Deviation;
        var ratio = barrier / terms.Spot;
        var knockedIn = sign * terms.Discount * (terms.Forward * Math.Pow(ratio, 2 * (mu + 1)) * Valuation.Normal(sign * y)
            - terms.Strike * Math.Pow(ratio, 2 * mu) * Valuation.Normal(sign * (y - terms.Deviation)));
        return Plain(terms, sign) - knockedIn;
    }

    /// <summary>An average of log-normal prices taken for log-normal: its first two moments are matched (Turnbull and Wakeman 1991).</summary>
    private static double Arithmetic(Terms terms, double[] past, double[] toCome)
    {
        var count = past.Length + toCome.Length;
        var strike = terms.Strike - past.Sum() / count;
        double Mean(double t) => terms.Spot * Math.Exp(terms.Growth * t) / count;
        var mean = toCome.Sum(Mean);
        if (strike <= 0) return terms.Discount * (mean - strike);
        double Row(double a) => toCome.Sum(b => Mean(a) * Mean(b) * Math.Exp(terms.Volatility * terms.Volatility * Math.Min(a, b)));
        var square = toCome.Sum(Row);
        return terms.Discount * Black(mean, strike, Math.Sqrt(Math.Log(square / (mean * mean))), 1);
    }

    /// <summary>A geometric average is log-normal itself (Kemna and Vorst 1990).</summary>
    private static double Geometric(Terms terms, double[] past, double[] toCome)
    {
        double count = past.Length + toCome.Length;
        var drift = terms.Growth - terms.Volatility * terms.Volatility / 2;
        var mean = (past.Sum(Math.Log) + toCome.Sum(t => Math.Log(terms.Spot) + drift * t)) / count;
        double Row(double a) => toCome.Sum(b => Math.Min(a, b));
        var variance = terms.Volatility * terms.Volatility * toCome.Sum(Row) / (count * count);
        return terms.Discount * Black(Math.Exp(mean + variance / 2), terms.Strike, Math.Sqrt(variance), 1);
    }

    /// <summary>A call that buys at the lowest price since its issue (Goldman, Sosin and Gatto 1979).</summary>
    private static double Lookback(Terms terms, double lowest)
    {
        var (growth, variance) = (terms.Growth, terms.Volatility * terms.Volatility);
        var a = Math.Log(terms.Spot / lowest) / terms.Deviation + (growth / variance + 0.5) * terms.Deviation;
        return terms.Discount * (terms.Forward * Valuation.Normal(a) - lowest * Valuation.Normal(a - terms.Deviation)
            + terms.Spot * variance / (2 * growth) * (Math.Pow(terms.Spot / lowest, -2 * growth / variance) * Valuation.Normal(2 * growth * terms.Years / terms.Deviation - a)
                - Math.Exp(growth * terms.Years) * Valuation.Normal(-a)));
    }

    private static double Black(double forward, double strike, double deviation, int sign)
    {
        var d1 = Math.Log(forward / strike) / deviation + deviation / 2;
        return sign * (forward * Valuation.Normal(sign * d1) - strike * Valuation.Normal(sign * (d1 - deviation)));
    }

    private static double[] Past(Market market, Instrument held, int day) =>
        [.. held.Fixings.Where(f => f <= market.Days[day]).Select(f => market.Close(held.On, market.DayOf(f)))];

    private static double[] ToCome(Market market, Instrument held, int day) =>
        [.. held.Fixings.Where(f => f > market.Days[day]).Select(f => Valuation.Years(market.Days[day], f))];

    private static double Lowest(Market market, Instrument held, int day) =>
        Enumerable.Range(0, day + 1).Where(t => market.Days[t] >= held.Issue).Min(t => market.Close(held.On, t));
}

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
        Kind.Forward or Kind.CurveForward => Forward(market, held, day),
        Kind.Call or Kind.Put => Option(market, held, day),
        Kind.Bond or Kind.Floater or Kind.Swap => RateValuation.Value(market, held, day),
        _ => Exotic.Value(market, held, TermsOf(market, held, day), day),
    };

    /// <summary>The rate, and the carry, of an instrument that expires in <paramref name="years"/>.</summary>
    public static (double Rate, double Carry) RatesOf(Market market, Instrument held, int day, double years) => (
        held.Curve is null ? World.Rates[held.Currency] : market.Zero(held.Curve, day, years),
        held.CarryCurve is null ? Underlying(held.On)!.Carry : market.Zero(held.CarryCurve, day, years));

    private static Terms TermsOf(Market market, Instrument held, int day)
    {
        var years = Years(market.Days[day], held.Expiry);
        var (rate, carry) = RatesOf(market, held, day, years);
        return new(Price(market, held.On, day), held.Strike, rate, carry, Volatility(market, held, day), years);
    }

    // The averages and the lookback are quoted at one volatility by their maker, and kept at it.
    public static double? FlatVolatility(Instrument held) => held.Kind switch
    {
        Kind.ArithmeticCall => 0.34,
        Kind.LookbackCall => 0.19,
        _ => Underlying(held.On)!.FlatVolatility,
    };

    private static double Volatility(Market market, Instrument held, int day) => FlatVolatility(held) ?? market.Close(held.On + ".vol", day);

    private static double Forward(Market market, Instrument held, int day)
    {
        var (spot, strike, _) = Discounted(market, held, day);
        return spot - strike;
    }

    /// <summary>Black-Scholes-Merton; with carry equal to the rate it is Black 76, with a foreign rate Garman-Kohlhagen.</summary>
    private static double Option(Market market, Instrument held, int day)
    {
        var (spot, strike, years) = Discounted(market, held, day);
        var volatility = Volatility(market, held, day);
        var deviation = volatility * Math.Sqrt(years);
        var d1 = Math.Log(spot / strike) / deviation + deviation / 2;
        var sign = held.Kind == Kind.Call ? 1 : -1;
        return sign * (spot * Normal(sign * d1) - strike * Normal(sign * (d1 - deviation)));
    }

    private static (double Spot, double Strike, double Years) Discounted(Market market, Instrument held, int day)
    {
        var years = Years(market.Days[day], held.Expiry);
        var (rate, carry) = RatesOf(market, held, day, years);
        return (Price(market, held.On, day) * Math.Exp(-carry * years), held.Strike * Math.Exp(-rate * years), years);
    }

    /// <summary>The normal distribution function: its Taylor series about 0 (Marsaglia 2004), in the tails Laplace's continued fraction.</summary>
    public static double Normal(double x)
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
        Kind.Forward or Kind.CurveForward when Valuation.Underlying(held.On)!.Base is not null => 10_000,
        Kind.Bond or Kind.Floater => 1000,
        Kind.Spot => 10,
        _ => 1,
    };

    public Instrument Cash(string currency) => Add(new("Cash-" + currency, Kind.Fx, currency, currency, 1));

    /// <summary>Whether a dated contract is near enough to its expiry to be rolled, or has been knocked out.</summary>
    public bool IsDue(Instrument held, int day) =>
        held.Expiry != default && (held.Expiry.DayNumber - market.Days[day].DayNumber < RollBeforeExpiry || Exotic.IsKnocked(market, held, day));

    /// <summary>The contract that <paramref name="line"/> deals in when it is opened or rolled on <paramref name="day"/>.</summary>
    public Instrument For(Line line, int day) => line.Kind switch
    {
        Kind.Fx => Cash(line.On),
        Kind.Spot => Add(new(line.On, Kind.Spot, line.On, CurrencyOf(line.On), 1)),
        Kind.Future => Add(new(line.On + "-f", Kind.Future, line.On, CurrencyOf(line.On), Firm.FutureMultipliers[line.On])),
        Kind.Bond or Kind.Floater or Kind.Swap => Paying(Firm.Product(line.On), day),
        _ => Dated(line, day),
    };

    /// <summary>Where something floats, a row a period: the rate fixed for it is a term of the row, and the next period is another row.</summary>
    private Instrument Paying(RateProduct product, int day)
    {
        if (product.FloatFrequency == 0) return Add(new(product.Name, product.Kind, product.Name, product.Currency, 1) { Rates = product });
        var period = RateValuation.Running(product, market.Days[day]);
        var name = product.Name + "." + period.Start.ToString("yyMM", CultureInfo.InvariantCulture);
        return Add(new(name, product.Kind, product.Name, product.Currency, 1) { Rates = product, Fixing = RateValuation.Fixing(market, product, period) });
    }

    private Instrument Dated(Line line, int day)
    {
        var underlying = Valuation.Underlying(line.On)!;
        var expiry = NextExpiry(line.Cycle, market.Days[day]);
        var month = expiry.ToString("yyMM", CultureInfo.InvariantCulture);
        var price = Valuation.Price(market, line.On, day);
        if (line.Kind == Kind.Forward) return Forward(new($"{line.On}-fwd-{month}", Kind.Forward, line.On, underlying.Currency, 1, 0, expiry), price, day);
        if (line.Kind == Kind.CurveForward)
        {
            var (curve, carry) = (underlying.Currency + ".zero", underlying.Base + ".zero");
            return Forward(new($"{line.On}-cfwd-{month}", Kind.CurveForward, line.On, underlying.Currency, 1, 0, expiry) { Curve = curve, CarryCurve = carry }, price, day);
        }

        var strike = Math.Round(Math.Round(price * line.Moneyness / underlying.StrikeStep) * underlying.StrikeStep, 4);
        if (line.Kind is not (Kind.Call or Kind.Put)) return Exotics(line.Kind, underlying, strike, expiry, day);
        var name = $"{line.On}-{month}-{(line.Kind == Kind.Call ? 'C' : 'P')}{Text.Short(strike)}";
        return Add(new(name, line.Kind, line.On, underlying.Currency, underlying.Multiplier, strike, expiry));
    }

    /// <summary>What remembers its path bears the day of its issue in its name, since another day's remembers another path.</summary>
    private Instrument Exotics(Kind kind, Underlying underlying, double strike, DateOnly expiry, int day)
    {
        const double wayDown = 0.85;
        const double wayUp = 1.15;
        var issue = market.Days[day];
        var (month, issued) = (expiry.ToString("yyMM", CultureInfo.InvariantCulture), issue.ToString("yyMMdd", CultureInfo.InvariantCulture));
        Instrument Named(string ending, double struck, double multiplier) => new($"{underlying.Name}-{month}-{ending}", kind, underlying.Name, underlying.Currency, multiplier, struck, expiry);
        var (plain, curve) = (Text.Short(strike), underlying.Currency + ".zero");
        double Beyond(double way) => Math.Round(Math.Round(strike * way / underlying.StrikeStep) * underlying.StrikeStep, 4);
        return Add(kind switch
        {
            Kind.AmericanCall => Named("AC" + plain, strike, underlying.Multiplier),
            Kind.AmericanPut => Named("AP" + plain, strike, underlying.Multiplier),
            Kind.DigitalPut => Named("DP" + plain, strike, 1) with { Curve = curve },
            Kind.DownOutCall => Named($"DOC{plain}-{issued}", strike, underlying.Multiplier) with { Curve = curve, Issue = issue, Barrier = Beyond(wayDown) },
            Kind.UpOutPut => Named($"UOP{plain}-{issued}", strike, underlying.Multiplier) with { Curve = curve, Issue = issue, Barrier = Beyond(wayUp) },
            Kind.ArithmeticCall => Named($"AVC{plain}-{issued}", strike, underlying.Multiplier) with { Issue = issue, Fixings = [.. MonthEnds(underlying.Name, issue, expiry)] },
            Kind.GeometricCall => Named($"GVC{plain}-{issued}", strike, underlying.Multiplier) with { Curve = curve, CarryCurve = curve, Issue = issue, Fixings = [.. MonthEnds(underlying.Name, issue, expiry)] },
            _ => Named($"LBC-{issued}", 0, underlying.Multiplier) with { Issue = issue },
        });
    }

    /// <summary>The last day of each month on which the factor is quoted, after <paramref name="from"/> and before <paramref name="to"/>.</summary>
    private static IEnumerable<DateOnly> MonthEnds(string factor, DateOnly from, DateOnly to)
    {
        var calendar = Array.Find(World.Factors, f => f.Name == factor)!.Calendar;
        for (var month = new DateOnly(from.Year, from.Month, 1).AddMonths(1); month <= to; month = month.AddMonths(1))
        {
            var last = month.AddDays(-1);
            while (!Calendars.IsOpen(calendar, last)) last = last.AddDays(-1);
            if (last > from) yield return last;
        }
    }

    /// <summary>Struck at the money to four digits, so that it is worth next to nothing when it is agreed.</summary>
    private Instrument Forward(Instrument agreed, double price, int day)
    {
        var years = Valuation.Years(market.Days[day], agreed.Expiry);
        var (rate, carry) = Valuation.RatesOf(market, agreed, day, years);
        var fair = price * Math.Exp((rate - carry) * years);
        return Add(agreed with { Strike = Math.Round(fair, Text.DecimalsFor(fair, 4)) });
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

    private readonly (Chance Trading, Chance Intraday) _first = (new("trading"), new("intraday"));
    private readonly (Chance Trading, Chance Intraday) _added = (new("trading added"), new("intraday added"));
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
        CollectCoupons(before, day);
        foreach (var line in Firm.Lines) Trade(line, day);
        foreach (var book in Firm.Books.Where(b => b.IsLeaf)) Pay(book.Name, book.Currency, book.Intraday * StreamsOf(book.Added).Intraday.FatTailed());

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

    private void CollectCoupons(int before, int day)
    {
        foreach (var line in Firm.Lines)
        {
            var (held, quantity, _) = _holdings[line];
            if (held.Rates is not null) Pay(line.Book, held.Currency, quantity * RateValuation.Paid(held, market.Days[before], market.Days[day]));
        }
    }

    private (Chance Trading, Chance Intraday) StreamsOf(bool added) => added ? _added : _first;

    private void Trade(Line line, int day)
    {
        var trading = StreamsOf(line.Added).Trading;
        var trades = trading.Uniform() < ChanceOfTrade;
        var swing = SwingOfTrade * (2 * trading.Uniform() - 1);

        // What floats may have begun a new period, whose row takes the old one's place.
        var holding = _holdings[line];
        if (holding.Held.Rates is not null) _holdings[line] = holding = holding with { Held = _listing.For(line, day) };
        if (_listing.IsDue(holding.Held, day))
        {
            Buy(line, holding.Held, -holding.Quantity, day);
            Open(line, day);
        }
        else if (trades)
        {
            var aim = InLots(holding.Held, holding.Opened * (1 + swing));
            Buy(line, holding.Held, aim - holding.Quantity, day);
            _holdings[line] = holding with { Quantity = aim };
        }
    }

    private void Open(Line line, int day)
    {
        var held = _listing.For(line, day);
        var quantity = InLots(held, line.Notional * 1000 / (Exposure(held, day) * market.Rate(held.Currency, day)));
        Buy(line, held, quantity, day);
        _holdings[line] = new(held, quantity, quantity);
    }

    /// <summary>Pays the value at the close; the price really dealt at was a little off it, and a fee is due.</summary>
    private void Buy(Line line, Instrument held, double quantity, int day)
    {
        var book = line.Book;
        var value = quantity * Valuation.Value(market, held, day);
        if (held.Kind == Kind.Fx) Pay(book, "EUR", -value * market.Rate(held.Currency, day));
        else Pay(book, held.Currency, -value);

        // Options, forwards and currencies are dealt at tighter prices than shares, measured on what they are written on; bonds and swaps too.
        var tightness = held.Kind is Kind.Spot or Kind.Future ? 1 : held.Rates is null ? 0.1 : 0.05;
        var size = Math.Abs(quantity * Exposure(held, day)) * tightness;
        Pay(book, held.Currency, size * (ExecutionNoise * StreamsOf(line.Added).Intraday.Normal() - FeeRate));
    }

    /// <summary>Cash is kept in whole units.</summary>
    private void Pay(string book, string currency, double amount) =>
        _cash[(book, currency)] = Math.Round(_cash.GetValueOrDefault((book, currency)) + amount);

    private double Exposure(Instrument held, int day) =>
        held.Multiplier * held.Kind switch
        {
            Kind.Fx => 1,
            Kind.DigitalPut => Exotic.Payoff,
            Kind.Bond or Kind.Floater or Kind.Swap => held.Rates!.Notional,
            _ => Valuation.Price(market, held.On, day),
        };

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

    private static readonly string[] s_columns =
    [
        "instrument", "kind", "currency", "multiplier", "factor", "base_currency", "strike", "expiry", "right", "style", "vol", "vol_factor", "curve", "carry", "issuer", "lot", "daily_volume",
        "coupon", "frequency", "day_count", "issue", "maturity", "notional", "spread", "projection", "float_frequency", "float_day_count", "float_spread", "last_fixing", "receive",
        "payoff", "barrier", "barrier_kind", "monitoring", "average", "fixings",
    ];

    public void Write(Market market, House house)
    {
        Table("books.csv", "book,parent,name,currency", Firm.Books.Select(b => $"{b.Name},{b.Parent},{b.Title},{b.Currency}"));
        Table("factors.csv", "factor,class,shock,currency,calendar,curve,tenor_years", Factors());
        Table("holidays.csv", "calendar,date", Calendars.Holidays().Select(h => $"{h.Calendar},{Text.Date(h.Date)}"));
        Table("adjustments.csv", "factor,date,ratio,reason", [$"{World.Split.Factor},{Text.Date(World.Split.Date)},{Text.Short(World.Split.Ratio)},{World.Split.Reason}"]);
        Table("observations.csv", "date,factor,value", market.Quotes.OrderBy(q => q.Day).Select(q => $"{Text.Date(market.Days[q.Day])},{q.Factor},{q.Value}"));
        Table("instruments.csv", string.Join(',', s_columns), house.Instruments.Select(Instrument));
        Table("positions.csv", "as_of,book,instrument,quantity,market_value", Positions(market, house));
        Table("limits.csv", "limit,book,measure,confidence,horizon_days,amount,basis,reference_book,warn_at,valid_from,approver,reason", Firm.Limits.Select(Limit));
        Table("pnl.csv", "date,book,actual", house.Pnl.Select(p => $"{Text.Date(market.Days[p.Day])},{p.Book},{Text.Plain(p.Amount, 0)}"));
    }

    private static IEnumerable<string> Factors() => World.Factors
        .Select(f => $"{f.Name},{f.Class},lognormal,{f.Currency},{f.Calendar},,")
        .Concat(World.Volatilities.Select(v => $"{v.Name},vol,lognormal,,{v.Calendar},,"))
        .Concat(World.Curves.SelectMany(c => ZeroCurve.Tenors.Select(t => $"{c.Factor(t.Name)},rate,normal,{c.Currency},{c.Calendar},{c.Name},{Text.Short(t.Years)}")))
        .Concat(World.Spreads.SelectMany(s => s.Tenors.Select(t => $"{s.Factor(t.Name)},credit,normal,{s.Currency},{s.Calendar}," + (t.Name == "" ? "," : $"{s.Name},{Text.Short(t.Years)}"))));

    private static string Instrument(Instrument i)
    {
        var cells = i.Kind switch
        {
            Kind.Fx => [],
            Kind.Spot or Kind.Future => new() { ["factor"] = i.On },
            _ when i.Rates is { } product => RateTerms(product, i.Fixing),
            _ => DatedTerms(i),
        };
        var (issuer, dailyVolume) = i.Rates is { } rates ? (rates.Issuer, 0) : Firm.Issuers.GetValueOrDefault(i.On, ("", 0));
        (cells["instrument"], cells["kind"], cells["currency"], cells["issuer"]) = (i.Name, Spelling(i.Kind), i.Currency, issuer);
        if (i.Multiplier != 1) cells["multiplier"] = Text.Short(i.Multiplier);
        if (i.Kind != Kind.Fx) cells["lot"] = Text.Short(Listing.Lot(i));
        if (i.Kind == Kind.Spot && dailyVolume > 0) cells["daily_volume"] = Text.Short(dailyVolume);
        return string.Join(',', s_columns.Select(c => cells.GetValueOrDefault(c, "")));
    }

    private static Dictionary<string, string> DatedTerms(Instrument i)
    {
        var underlying = Valuation.Underlying(i.On)!;
        var cells = new Dictionary<string, string>
        {
            [underlying.Base is null ? "factor" : "base_currency"] = underlying.Base ?? i.On,
            ["strike"] = i.Kind == Kind.LookbackCall ? "" : Text.Short(i.Strike),
            ["expiry"] = Text.Date(i.Expiry),
            ["curve"] = i.Curve ?? Text.Short(World.Rates[i.Currency]),
            ["carry"] = i.CarryCurve ?? Text.Short(underlying.Carry),
        };
        if (i.Kind is Kind.Forward or Kind.CurveForward) return cells;
        cells["right"] = i.Kind is Kind.Put or Kind.AmericanPut or Kind.DigitalPut or Kind.UpOutPut ? "put" : "call";
        cells["style"] = i.Kind is Kind.AmericanCall or Kind.AmericanPut ? "american" : "european";
        if (Valuation.FlatVolatility(i) is { } flat) cells["vol"] = Text.Short(flat);
        else cells["vol_factor"] = i.On + ".vol";
        foreach (var (column, text) in ExoticTerms(i)) cells[column] = text;
        return cells;
    }

    private static (string Column, string Text)[] ExoticTerms(Instrument i) => i.Kind switch
    {
        Kind.DigitalPut => [("payoff", "cash"), ("notional", Text.Short(Exotic.Payoff))],
        Kind.DownOutCall => [("barrier", Text.Short(i.Barrier)), ("barrier_kind", "down-out"), ("monitoring", "continuous"), ("issue", Text.Date(i.Issue))],
        Kind.UpOutPut => [("barrier", Text.Short(i.Barrier)), ("barrier_kind", "up-out"), ("monitoring", "daily"), ("issue", Text.Date(i.Issue))],
        Kind.ArithmeticCall => [("average", "arithmetic"), ("fixings", string.Join(';', i.Fixings.Select(Text.Date)))],
        Kind.GeometricCall => [("average", "geometric"), ("fixings", string.Join(';', i.Fixings.Select(Text.Date)))],
        Kind.LookbackCall => [("monitoring", "continuous"), ("issue", Text.Date(i.Issue))],
        _ => [],
    };

    private static Dictionary<string, string> RateTerms(RateProduct product, double fixing)
    {
        var cells = new Dictionary<string, string> { ["issue"] = Text.Date(product.Issue), ["maturity"] = Text.Date(product.Maturity), ["curve"] = product.Curve, ["spread"] = product.Spread };
        if (product.Kind == Kind.Swap) (cells["notional"], cells["receive"]) = (Text.Short(product.Notional), product.ReceivesFixed ? "fixed" : "float");
        if (product.Frequency > 0)
        {
            (cells["coupon"], cells["frequency"]) = (Text.Short(product.Coupon), Text.Short(product.Frequency));
            cells["day_count"] = product.Kind == Kind.Swap || product.Spread != "" ? "30/360" : "ACT/ACT";
        }

        if (product.FloatFrequency > 0)
        {
            (cells["projection"], cells["float_frequency"], cells["float_day_count"]) = (product.Curve, Text.Short(product.FloatFrequency), "ACT/360");
            (cells["float_spread"], cells["last_fixing"]) = (product.FloatSpread == 0 ? "" : Text.Short(product.FloatSpread), Text.Short(fixing));
        }

        return cells;
    }

    private static string Spelling(Kind kind) => kind switch
    {
        Kind.Spot => "spot",
        Kind.Fx => "fx",
        Kind.Future => "future",
        Kind.Forward or Kind.CurveForward => "forward",
        Kind.DigitalPut => "digital",
        Kind.DownOutCall or Kind.UpOutPut => "barrier",
        Kind.ArithmeticCall or Kind.GeometricCall => "asian",
        Kind.LookbackCall => "lookback",
        Kind.Bond => "bond",
        Kind.Floater => "floater",
        Kind.Swap => "swap",
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
