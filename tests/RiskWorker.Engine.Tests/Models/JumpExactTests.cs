using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Estimation;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>
/// Jump-diffusions with given jumps within four standard errors of exact values: Merton's mixture of normals (<see cref="MertonReturn"/>, held
/// by tests of its own) for one factor's own jumps, and Data/models/exact.csv by SciPy for two factors with common jumps.
/// </summary>
public sealed class JumpExactTests
{
    private const double Value = 1_000_000, PerYear = 20, Mean = -0.03, Deviation = 0.02, Mu = 0.08;

    // A day's diffusion and its drift, which gives up half the variance and what jumps are expected to add.
    private static readonly double s_sigma = 0.25 / Math.Sqrt(252);
    private static readonly double s_drift = (Mu / 252) - (s_sigma * s_sigma / 2) - (PerYear / 252 * (Math.Exp(Mean + (Deviation * Deviation / 2)) - 1));

    [Theory]
    [InlineData(1)]
    [InlineData(10)]
    public void Long_position_meets_the_mixture(int days)
    {
        var law = new MertonReturn(s_drift, s_sigma, PerYear / 252, Mean, Deviation, days);
        var (var, es) = Book(days).Measured();
        FourErrors.Hold(Value * law.LongLoss(0.01).ValueAtRisk, var);
        FourErrors.Hold(Value * law.LongLoss(0.025).Shortfall, es);
    }

    [Theory]
    [InlineData(1)]
    [InlineData(10)]
    public void Short_position_meets_the_mixture(int days)
    {
        var law = new MertonReturn(s_drift, s_sigma, PerYear / 252, Mean, Deviation, days);
        var (var, es) = (Book(days) with { Values = [-Value] }).Measured();
        FourErrors.Hold(Value * law.ShortLoss(0.01).ValueAtRisk, var);
        FourErrors.Hold(Value * law.ShortLoss(0.025).Shortfall, es);
    }

    // A factor of normal shocks moves by the jump's size, and gives up its mean.
    [Theory]
    [InlineData(1)]
    [InlineData(10)]
    public void Factor_of_normal_shocks_meets_the_mixture(int days)
    {
        var law = new MertonReturn((Mu / 252) - (PerYear / 252 * Mean), s_sigma, PerYear / 252, Mean, Deviation, days);
        var (var, es) = (Book(days) with { Shock = ShockKind.Normal }).Measured();
        FourErrors.Hold(Value * law.ReturnLoss(0.01).ValueAtRisk, var);
        FourErrors.Hold(Value * law.ReturnLoss(0.025).Shortfall, es);
    }

    [Theory]
    [InlineData("J2-1-0.5", 1, 0.5)]
    [InlineData("J2-10-0.5", 10, 0.5)]
    [InlineData("J2-10--0.3", 10, -0.3)]
    public void Two_positions_that_jump_together_and_alone_meet_the_mixture(string name, int days, double correlation)
    {
        var book = new SpotBook(
            Model(new()
            {
                CommonPerYear = 6,
                Common = new Dictionary<string, JumpSize> { ["X"] = new(-0.04, 0.02), ["Y"] = new(-0.05, 0.03) },
                Own = new Dictionary<string, OwnJumps> { ["X"] = new(12, new(0.01, 0.03)), ["Y"] = new(3, new(-0.06, 0.01)) },
            }, 0), days)
        { Volatilities = [0.15, 0.2], Values = [600_000, 400_000], Correlation = correlation };
        var (exact, (var, es)) = (ExactValues.Of(name), book.Measured());
        FourErrors.Hold(exact.Var, var);
        FourErrors.Hold(exact.Es!.Value, es);
    }

    private static SpotBook Book(int days) => new(Model(new() { Own = new Dictionary<string, OwnJumps> { ["X"] = new(PerYear, new(Mean, Deviation)) } }, Mu), days);

    private static ModelSettings Model(JumpSettings jumps, double mu) => new()
    {
        Kind = ModelKind.JumpDiffusion,
        Jumps = jumps,
        Drift = DriftKind.Explicit,
        Drifts = new Dictionary<string, double> { ["X"] = mu },
    };
}
