using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Tests.Simulation;

namespace RiskWorker.Engine.Tests.Plans;

public sealed class PlanCompilerTests
{
    [Fact]
    public void Rows_of_one_node_and_instrument_add_up()
    {
        var split = CompiledBook.Of(MixedBook.Holding([.. Names.SelectMany(n => new Position[] { new("EUROPE", n, 5, "t1"), new("EUROPE", n, -2, "t2") })]).Build(), 1, 10);
        var single = CompiledBook.Of(MixedBook.Holding([.. Names.Select(n => new Position("EUROPE", n, 3))]).Build(), 1, 10);
        Assert.Equal(single.Plan.Groups.Sum(g => g.Options.Sum(o => o.Items.Length)), split.Plan.Groups.Sum(g => g.Options.Sum(o => o.Items.Length)));
        var (expected, actual) = (single.Losses(500), split.Losses(500));
        var tolerance = Math.ScaleB(1, -53) * new HandRevaluation(split, 0, 1).Gross;
        for (var row = 0; row < expected.Length; row++)
        {
            // Units add up exactly here; only today's values, 5v - 2v against 3v, may round otherwise.
            for (var i = 0; i < 500; i++) Assert.Equal(expected[row][i], actual[row][i], tolerance);
        }
    }

    [Fact]
    public void Same_instrument_in_two_nodes_stays_two_positions()
    {
        var plan = CompiledBook.Of(MixedBook.Holding(new("AMERICA", "EQ-CALL", 1), new("EUROPE", "EQ-CALL", 2)).Build(), 1).Plan;
        Assert.Equal([1.0, 2.0], plan.Groups.Single().Options.Single().Items.Select(o => o.Quantity));
        Assert.Equal(2, plan.Cells.Count);
    }

    [Fact]
    public void Hash_does_not_depend_on_the_order_of_positions()
    {
        var snapshot = MixedBook.Whole().Build();
        // Five rows of a node and instrument, of sizes apart: added in another order they would round to another sum.
        Position[] rows = [.. snapshot.Positions.SelectMany((p, i) => new[] { 1, 0.1, -1e5, 1.0 / 3, 1e-7 }.Select(scale => p with { Quantity = p.Quantity * scale * (i + 0.1) }))];
        var expected = CompiledBook.Of(snapshot with { Positions = rows }, 1, 10).Plan.Hash;
        for (var seed = 0; seed < 20; seed++)
        {
            var shuffled = rows.ToArray();
            new Random(seed).Shuffle(shuffled);
            Assert.Equal(expected, CompiledBook.Of(snapshot with { Positions = shuffled }, 10, 1, 10).Plan.Hash);
        }
    }

    private static readonly Dictionary<string, Func<SnapshotBuilder, Snapshot>> s_changes = new()
    {
        ["seed"] = b => b.Build() is var s ? s with { Settings = s.Settings with { Simulation = s.Settings.Simulation with { Seed = 2 } } } : s,
        ["high half of the seed"] = b => b.Build() is var s ? s with { Settings = s.Settings with { Simulation = s.Settings.Simulation with { Seed = (1UL << 40) + 1 } } } : s,
        ["quantity"] = b => WithPosition(b, "EQ-CALL", p => p with { Quantity = Math.BitIncrement(p.Quantity) }),
        ["cash"] = b => WithPosition(b, "EUR-CASH", p => p with { Quantity = Math.BitIncrement(p.Quantity) }),
        ["node"] = b => WithPosition(b, "OIL-CALL", p => p with { Book = "ALL" }),
        ["multiplier of a spot"] = b => With<Spot>(b, "EQU-UNIT", i => i with { Multiplier = 2.5 }),
        ["multiplier of a future"] = b => With<Future>(b, "OIL-FUTURE", i => i with { Multiplier = 11 }),
        ["multiplier of an option"] = b => With<Option>(b, "EQ-CALL", i => i with { Multiplier = -1 }),
        ["factor of a spot"] = b => With<Spot>(b, "EQ-UNIT", i => i with { Factor = "STILL" }),
        ["strike of a forward"] = b => With<Forward>(b, "EQ-FORWARD", i => i with { Strike = 102 }),
        ["expiry of a forward"] = b => With<Forward>(b, "EQ-FORWARD", i => i with { Expiry = i.Expiry.AddDays(1) }),
        ["curve of a forward"] = b => With<Forward>(b, "EQ-FORWARD", i => i with { Curve = RateTerm.Of(0.031) }),
        ["carry of a forward"] = b => With<Forward>(b, "EQ-FORWARD", i => i with { Carry = null }),
        ["base currency"] = b => With<Forward>(b, "GBPUSD-FORWARD", i => i with { Underlying = new(null, "EUR") }),
        ["strike of an option"] = b => With<Option>(b, "EQ-CALL", i => i with { Strike = Math.BitIncrement(i.Strike) }),
        ["expiry of an option"] = b => With<Option>(b, "EQ-CALL", i => i with { Expiry = i.Expiry.AddDays(1) }),
        ["right"] = b => With<Option>(b, "EQ-CALL", i => i with { Right = OptionRight.Put }),
        ["volatility"] = b => With<Option>(b, "EQ-CALL", i => i with { Volatility = new(0.26, null) }),
        ["volatility factor"] = b => With<Option>(b, "EQ-CALL", i => i with { Volatility = new(null, "VOL") }),
        ["curve of an option"] = b => With<Option>(b, "EQ-PUT", i => i with { Curve = RateTerm.Of(0.02) }),
        ["carry of an option"] = b => With<Option>(b, "EQ-PUT", i => i with { Carry = RateTerm.Of(0.001) }),
        ["level"] = b => WithLevel(b, "EQ", 100.5),
        ["level of a currency"] = b => WithLevel(b, "GBP", 1.16),
        ["level of a volatility"] = b => WithLevel(b, "VOL", 0.21),
        ["variance"] = b => WithCovariance(b, "OIL", "OIL", 0.0007),
        ["correlation"] = b => WithCovariance(b, "EQ", "USD", 1e-6),
        ["drift"] = b => b.Build() is var s ? s with { Settings = s.Settings with { Model = s.Settings.Model with { Drift = DriftKind.Zero } } } : s,
        ["shock"] = b => b.Build() is var s ? s with { Factors = [.. s.Factors.Select(f => f.Name == "STILL" ? f with { Shock = ShockKind.Normal } : f)] } : s,
        ["currency of a book"] = b => b.Build() is var s ? s with { Books = [.. s.Books.Select(k => k.Name == "LONDON" ? k with { Currency = "USD" } : k)] } : s,
        ["parent of a book"] = b => b.Build() is var s ? s with { Books = [.. s.Books.Select(k => k.Name == "LONDON" ? k with { Parent = "ALL" } : k)] } : s,
        ["date"] = b => b.Build() is var s ? s with { AsOf = s.AsOf.AddDays(-1), Observations = ObservationHistory.From(s.Factors.Select(f => f.Name), [.. s.Factors.Select((f, j) => new Observation(s.AsOf.AddDays(-1), f.Name, s.Observations.Column(j)[0]))]) } : s,
    };

    public static TheoryData<string> Changed => [.. s_changes.Keys];

    [Theory]
    [MemberData(nameof(Changed))]
    public void Hash_changes_with_any_term(string changed) =>
        Assert.NotEqual(CompiledBook.Of(MixedBook.Whole().Build(), 1, 10).Plan.Hash, CompiledBook.Of(s_changes[changed](MixedBook.Whole()), 1, 10).Plan.Hash);

    [Fact]
    public void Hash_changes_with_the_horizons() =>
        Assert.Equal(3, new int[][] { [1], [10], [1, 10] }.Select(h => CompiledBook.Of(MixedBook.Whole().Build(), h).Plan.Hash).Distinct().Count());

    // The names of what is held are not part of the plan: what is held is.
    [Fact]
    public void Hash_is_that_of_the_content_alone()
    {
        var snapshot = MixedBook.Holding(new Position("EUROPE", "EQ-CALL", 2)).Build();
        var renamed = MixedBook.Holding(new Position("EUROPE", "OTHER", 2)).Build();
        var option = (Option)snapshot.Instruments["EQ-CALL"];
        renamed = renamed with { Instruments = new Dictionary<string, Instrument> { ["OTHER"] = option with { Name = "OTHER" } } };
        Assert.Equal(CompiledBook.Of(snapshot, 1).Plan.Hash, CompiledBook.Of(renamed, 1).Plan.Hash);
    }

    [Fact]
    public void Values_of_nodes_are_their_own_positions_and_their_childrens()
    {
        var plan = CompiledBook.Of(MixedBook.Holding(new("ALL", "EUR-CASH", 100), new("AMERICA", "USD-CASH", 10), new("LONDON", "GBP-CASH", 1), new("EUROPE", "OIL-FUTURE", 9)).Build(), 1).Plan;
        var values = plan.Nodes.ToDictionary(n => n.Book, n => n.ValueRoot);
        Assert.Equal(100 + (10 * 0.9) + (100 * 1.15), values["ALL"], 1e-12);
        Assert.Equal((10 * 0.9) + (100 * 1.15), values["AMERICA"], 1e-12);
        Assert.Equal(100 * 1.15, values["LONDON"], 1e-12);
        Assert.Equal(0, values["EUROPE"]);
    }

    private static IEnumerable<string> Names => MixedBook.Instruments.Select(i => i.Name);

    private static Snapshot WithPosition(SnapshotBuilder builder, string instrument, Func<Position, Position> change)
    {
        var snapshot = builder.Build();
        return snapshot with { Positions = [.. snapshot.Positions.Select(p => p.Instrument == instrument ? change(p) : p)] };
    }

    private static Snapshot With<T>(SnapshotBuilder builder, string name, Func<T, Instrument> change) where T : Instrument
    {
        var snapshot = builder.Build();
        return snapshot with { Instruments = snapshot.Instruments.Values.ToDictionary(i => i.Name, i => i.Name == name ? change((T)i) : i) };
    }

    private static Snapshot WithLevel(SnapshotBuilder builder, string factor, double level)
    {
        builder.Observations[builder.Observations.FindIndex(o => o.Factor == factor)] = new(MixedBook.AsOf, factor, level);
        return builder.Build();
    }

    private static Snapshot WithCovariance(SnapshotBuilder builder, string factor, string other, double value)
    {
        var place = builder.Covariance.FindIndex(c => (c.Factor == factor && c.Other == other) || (c.Factor == other && c.Other == factor));
        builder.Covariance[place] = new(factor, other, value);
        return builder.Build();
    }
}
