using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Models;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>Jumps found in a seeded history in which they were planted.</summary>
public sealed class JumpEstimationTests
{
    private const int Days = 500;

    private static readonly int[] s_common = [60, 170, 333, 420], s_ownOfA = [100, 250, 300], s_ownOfB = [20, 390];
    private static readonly double[][] s_shocks = Shocks();

    [Fact]
    public void Planted_jumps_are_found_and_told_apart()
    {
        var law = Law(Found);
        Assert.Equal(4.0 / Days, law.CommonPerDay, 1e-15);
        Assert.Equal([3.0 / Days, 2.0 / Days, 0], InOrder(law.OwnPerDay, Found));
        Assert.False(law.IsGiven);
    }

    [Theory]
    [InlineData(1, 0)]
    [InlineData(2, 4)]
    public void Jump_of_one_factor_alone_is_its_own_however_few_there_are(int factors, int common)
    {
        var law = (JumpLaw)new HistoryBook(Found, s_shocks[..factors]).Compiled().Model.Law;
        Assert.Equal(common, law.CommonPerDay * Days, 1e-12);
        Assert.Equal(factors == 1 ? [7.0] : [2.0, 3.0], law.OwnPerDay.Select(rate => Math.Round(rate * Days, 9)).Order());
    }

    // What jumps add and what is left of the diffusion are the mean square of the history.
    [Fact]
    public void Found_jumps_and_the_diffusion_keep_the_total_variance()
    {
        var model = new HistoryBook(Found, s_shocks).Compiled().Model;
        var law = (JumpLaw)model.Law;
        for (var row = 0; row < 3; row++)
        {
            var factor = model.Moving[row];
            double Square(JumpSize size) => (size.Mean * size.Mean) + (size.Deviation * size.Deviation);
            var total = (model.Deviations[factor] * model.Deviations[factor]) + (law.CommonPerDay * Square(law.Common[row])) + (law.OwnPerDay[row] * Square(law.Own[row]));
            // Where moves on common days vary less than the diffusion, as C's may, their deviation is 0 and the identity is off by that.
            Assert.Equal(1, total / s_shocks[factor].Average(x => x * x), factor == 2 ? 4.0 / Days : 1e-12);
            Assert.True(model.Deviations[factor] < 0.0075, $"{model.Deviations[factor]}: the jumps are still in the diffusion");
        }
    }

    [Fact]
    public void Given_jumps_are_a_year_of_252_days_and_leave_the_covariance_alone()
    {
        var given = new ModelSettings
        {
            Kind = ModelKind.JumpDiffusion,
            Covariance = CovarianceEstimator.Equal,
            Window = Days,
            Jumps = new() { CommonPerYear = 6, Common = new Dictionary<string, JumpSize> { ["B"] = new(-0.1, 0.02) }, Own = new Dictionary<string, OwnJumps> { ["A"] = new(12, new(0.01, 0.03)) } },
        };
        var (model, plain) = (new HistoryBook(given, s_shocks).Compiled().Model, new HistoryBook(new() { Covariance = CovarianceEstimator.Equal, Window = Days }, s_shocks).Compiled().Model);
        var law = (JumpLaw)model.Law;
        Assert.Equal(plain.Deviations, model.Deviations);
        Assert.Equal(6.0 / 252, law.CommonPerDay);
        Assert.Equal([12.0 / 252, 0, 0], InOrder(law.OwnPerDay, given));
        Assert.Equal([default, new(-0.1, 0.02), default], InOrder(law.Common, given));
    }

    [Fact]
    public void Given_jumps_of_a_factor_that_is_not_there_are_refused() =>
        Assert.StartsWith("D: ", Assert.Throws<CalibrationException>(() => Law(new() { Kind = ModelKind.JumpDiffusion, Jumps = new() { Own = new Dictionary<string, OwnJumps> { ["D"] = new(1, new(0, 0.1)) } } })).Message, StringComparison.Ordinal);

    // The covariance of paired days holds the jumps; to find them besides would count them twice.
    [Fact]
    public void Jumps_found_in_paired_days_are_refused() =>
        Assert.Contains("missingDays: complete", Assert.Throws<CalibrationException>(() => Law(Found with { MissingDays = MissingDays.Pairwise })).Message, StringComparison.Ordinal);

    // A given covariance is that of the shocks, jumps included.
    [Fact]
    public void Jumps_found_beside_a_given_covariance_are_refused()
    {
        var snapshot = new HistoryBook(Found with { Covariance = CovarianceEstimator.Given }, s_shocks).Snapshot() with
        {
            Covariance = [new("A", "A", 1e-4), new("B", "B", 1e-4), new("C", "C", 1e-4), new("A", "B", 0), new("A", "C", 0), new("B", "C", 0)],
        };
        Assert.Contains("give the jumps", Assert.Throws<CalibrationException>(() => Calibrator.Calibrate(snapshot)).Message, StringComparison.Ordinal);
    }

    // A Poisson count of a mean beyond 20 has no table.
    [Fact]
    public void More_jumps_within_the_longest_horizon_than_can_be_drawn_are_refused()
    {
        var often = new ModelSettings { Kind = ModelKind.JumpDiffusion, Window = Days, Jumps = new() { Own = new Dictionary<string, OwnJumps> { ["A"] = new(252, new(0, 0.01)) } } };
        var book = new HistoryBook(often, s_shocks) { Horizons = [1, 25] };
        Assert.Contains("25 jumps", Assert.Throws<CalibrationException>(() => Calibrator.Calibrate(book.Snapshot())).Message, StringComparison.Ordinal);
    }

    private static ModelSettings Found => new() { Kind = ModelKind.JumpDiffusion, Covariance = CovarianceEstimator.Equal, Window = Days };

    private static JumpLaw Law(ModelSettings model) => (JumpLaw)new HistoryBook(model, s_shocks).Compiled().Model.Law;

    // Rows stand in pivot order.
    private static T[] InOrder<T>(T[] rows, ModelSettings model)
    {
        var moving = new HistoryBook(model, s_shocks).Compiled().Model.Moving;
        return [.. moving.Zip(rows).OrderBy(p => p.First).Select(p => p.Second)];
    }

    private static double[][] Shocks()
    {
        double[][] shocks = [.. new[] { 0.007, 0.006, 0.004 }.Select((deviation, j) => HistoryBook.Normals(Days, 71 + j).Select(z => deviation * Math.Clamp(z, -2.5, 2.5)).ToArray())];
        // Two of three factors jump together; the third keeps still, and its move on those days is small.
        foreach (var (i, t) in s_common.Index()) (shocks[0][t], shocks[1][t]) = (-0.05 - (0.01 * i), -0.09 + (0.02 * i));
        foreach (var (i, t) in s_ownOfA.Index()) shocks[0][t] = 0.06 + (0.02 * i);
        foreach (var (i, t) in s_ownOfB.Index()) shocks[1][t] = -0.04 - (0.05 * i);
        return shocks;
    }
}
