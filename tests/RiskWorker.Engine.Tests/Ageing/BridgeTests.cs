using RiskWorker.Domain.Instruments;
using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Simulation;
using RiskWorker.Engine.Tests.Plans;
using RiskWorker.TestKit;

namespace RiskWorker.Engine.Tests.Ageing;

/// <summary>
/// Levels inside a horizon, read off forwards that expire there. A random walk has Cov(B_j, B_k) = min(j, k); an average of N products of two normals
/// has the standard error √((Var x Var y + Cov²)/N), and each estimate must lie within four of them.
/// </summary>
public sealed class BridgeTests
{
    private const string Pinned = "fb96ca4182ce652d840f4344b536002b1f090ce00def959a80a9c7b09f563c8d"; // may change only together with the numerics epoch
    private const int N = 200_000;
    private static readonly int[] s_days = [1, 2, 3, 4, 5, 6, 7, 8, 9];

    [Theory]
    [InlineData(10)]
    [InlineData(7)]
    public void Levels_inside_have_the_covariance_of_a_random_walk_pinned_at_its_end(int horizon)
    {
        var book = new AgedMarket { Drift = 0.5 }.Showing("S", 1, 3, 6, horizon).Showing("T", 1, 3, 6, horizon).Compile(horizon);
        var losses = book.Losses(N);
        var returns = new[] { "S", "T" }.SelectMany(f => new[] { 1, 3, 6, horizon }.Select(d => (Factor: f, Day: d, X: Returns(book, losses, f, d, horizon)))).ToList();
        foreach (var one in returns)
        {
            var deviation = Math.Sqrt(one.Day) * Deviation(one.Factor);
            Assert.InRange(one.X.Average() / (deviation / Math.Sqrt(N)), -4, 4);
            foreach (var other in returns)
            {
                var covariance = Math.Min(one.Day, other.Day) * Deviation(one.Factor) * Deviation(other.Factor) * (one.Factor == other.Factor ? 1 : AgedMarket.Correlation);
                var variances = one.Day * Math.Pow(Deviation(one.Factor), 2) * other.Day * Math.Pow(Deviation(other.Factor), 2);
                var error = Math.Sqrt((variances + (covariance * covariance)) / N);
                Assert.InRange((one.X.Zip(other.X, (x, y) => x * y).Average() - covariance) / error, -4, 4);
            }
        }
    }

    // The bridge ends where the model without ageing does: what only stands at the horizon has the losses that it had.
    [Fact]
    public void Level_at_the_end_is_that_of_an_instantaneous_shock()
    {
        var spot = new Spot("S") { Name = "SPOT", Currency = "EUR" };
        var aged = new AgedMarket().Holding(spot).Showing("S", 3).Compile(1, 10);
        var still = new AgedMarket { Ageing = RiskWorker.Domain.Runs.AgeingKind.None }.Holding(spot).Compile(1, 10);
        var (after, before) = (aged.Losses(500), still.Losses(500));
        foreach (var horizon in new[] { 1, 10 }) BitAssert.Equal(before[still.RowOf("SPOT", horizon)], after[aged.RowOf("SPOT", horizon)]);
    }

    // Drawn date upon date, the level of day 6 would hang on whether the book has anything on day 3.
    [Fact]
    public void Level_of_a_day_does_not_depend_on_what_else_a_book_holds()
    {
        var crowded = new AgedMarket().Showing("S", s_days).Compile(3, 10, 12);
        var losses = crowded.Losses(300);
        foreach (var day in s_days)
        {
            var alone = new AgedMarket().Showing("S", day).Compile(10);
            BitAssert.Equal(alone.Losses(300)[alone.RowOf($"S@{day:00}", 10)], losses[crowded.RowOf($"S@{day:00}", 10)], $"day {day}:");
        }
    }

    [Theory]
    [InlineData(1)]
    [InlineData(7)]
    [InlineData(61)]
    [InlineData(ScenarioTile.Width)]
    public void Evaluate_width_of_a_tile_and_its_place_change_no_bit(int width)
    {
        var book = AgedKinds.All().Compile(1, 3, 10);
        const int Count = 300;
        var expected = book.Losses(Count);
        var tile = new ScenarioTile(book.Plan);
        var losses = new double[book.Plan.Rows.Count * Count];
        for (var first = (Count - 1) / width * width; first >= 0; first -= width) tile.Evaluate(first, Math.Min(width, Count - first), losses, first, Count);
        for (var row = 0; row < expected.Length; row++) BitAssert.Equal(expected[row], losses.AsSpan(row * Count, Count), $"width {width}, row {row}:");
    }

    [Fact]
    public void Threads_change_no_bit()
    {
        var book = AgedKinds.All().Compile(10);
        LossSample Of(int threads) => new BlockEvaluator(book.Plan, threads).Evaluate(BlockRange.From(0, 9_000), new LossSampleReduction(book.Plan.Rows.Count, 9_000), null, CancellationToken.None);
        var (one, three) = (Of(1), Of(3));
        for (var row = 0; row < one.Rows; row++) BitAssert.Equal(one.Row(row), three.Row(row), $"row {row}:");
    }

    [Fact]
    public void Tile_of_an_aged_book_is_valued_without_an_allocation()
    {
        var plan = AgedKinds.All().Compile(1, 10).Plan;
        var (tile, losses, next) = (new ScenarioTile(plan), new double[plan.Rows.Count * ScenarioTile.Width], 0L);
        Assert.Equal(0, Allocations.FewestOf(() => tile.Evaluate(next += ScenarioTile.Width, ScenarioTile.Width, losses, 0, ScenarioTile.Width)));
    }

    // Pinned when the bridge was written, after the covariances above held.
    [Fact]
    public void Levels_inside_keep_their_bits()
    {
        var book = new AgedMarket().Showing("S", 1, 5, 9).Compile(10);
        var losses = book.Losses(2);
        ulong[] found = [.. new[] { 1, 5, 9 }.SelectMany(d => losses[book.RowOf($"S@{d:00}", 10)]).Select(BitConverter.DoubleToUInt64Bits)];
        Assert.Equal([0xBFE7C86BEBC6D200, 0x40031F34F6BD8C60, 0xBFFCB4402C83D680, 0x3FFD0F3422B87240, 0xBF8DC9800F6CE000, 0xC00442B85AE1EC20], found);
    }

    // The same for every kind that ages: one hash over the bits of all losses.
    [Fact]
    public void Losses_of_every_kind_keep_their_bits()
    {
        var market = AgedKinds.All().Holding(AgedKinds.Asian(AverageKind.Arithmetic, AgedKinds.Later, OptionRight.Put, 101, new(AgedMarket.Close(3), null), new(AgedKinds.Later, null)) with { Name = "ARITHMETIC" },
            AgedKinds.Lookback(99, AgedKinds.Later, OptionRight.Put, Monitoring.Continuous) with { Name = "LOWEST" });
        var bytes = market.Compile(10).Losses(500).SelectMany(row => row).SelectMany(BitConverter.GetBytes).ToArray();
        var hash = Convert.ToHexStringLower(System.Security.Cryptography.SHA256.HashData(bytes));
        Assert.True(hash == Pinned, $"expected {Pinned}, found {hash}");
    }

    [Fact]
    public void Hash_of_a_plan_tells_aged_books_apart()
    {
        string[] hashes =
        [
            AgedKinds.All().Compile(10).Plan.Hash, AgedKinds.All().Compile(9).Plan.Hash, AgedKinds.All().Showing("T", 2).Compile(10).Plan.Hash,
            new AgedMarket().Holding(AgedKinds.Call(AgedMarket.Close(3))).Compile(10).Plan.Hash, new AgedMarket().Holding(AgedKinds.Call(AgedMarket.Close(4))).Compile(10).Plan.Hash,
            new AgedMarket { Ageing = RiskWorker.Domain.Runs.AgeingKind.None }.Holding(AgedKinds.Call(AgedMarket.Close(4))).Compile(10).Plan.Hash,
            new AgedMarket().Holding(AgedKinds.Barrier(BarrierKind.DownOut, 95, AgedKinds.Later, Monitoring.Daily)).Compile(10).Plan.Hash,
            new AgedMarket().Holding(AgedKinds.Barrier(BarrierKind.DownOut, 95, AgedKinds.Later, Monitoring.Continuous)).Compile(10).Plan.Hash,
        ];
        Assert.Equal(hashes.Length, hashes.Distinct(StringComparer.Ordinal).Count());
        Assert.Equal(hashes[0], AgedKinds.All().Compile(10).Plan.Hash);
    }

    private static double Deviation(string factor) => factor == "S" ? AgedMarket.Sigma : AgedMarket.Tau;

    // ln(S_k/S_0) less its drift, which is linear in days: 0.5/252 a day of arithmetic return for S, none for T.
    private static double[] Returns(CompiledBook book, double[][] losses, string factor, int day, int horizon)
    {
        var (today, drift) = factor == "S" ? (AgedMarket.S0, 0.5 / 252) : (AgedMarket.T0, 0);
        var mean = day * (drift - (Deviation(factor) * Deviation(factor) / 2));
        return [.. AgedMarket.Levels(book, losses, factor, day, horizon).Select(level => Math.Log(level / today) - mean)];
    }
}
