using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Models;

/// <summary>
/// Normal shocks and compound Poisson jumps with normal sizes (Merton 1976): jumps of each factor's own, and jumps that come at one time for
/// several. The drift gives up what jumps are expected to add, so that it stays the expected return.
/// </summary>
/// <param name="CommonPerDay">Expected common jumps a day.</param>
/// <param name="Common">How each moving factor, in the order of the plan's rows, moves in one.</param>
/// <param name="OwnPerDay">Expected jumps of its own a day.</param>
/// <param name="Own">Their size.</param>
/// <param name="IsGiven">Whether they were given; otherwise they were found in the history.</param>
/// <param name="Notes">What could not be told of a factor's jumps; null where all could.</param>
public sealed record JumpLaw(double CommonPerDay, JumpSize[] Common, double[] OwnPerDay, JumpSize[] Own, bool IsGiven, string?[] Notes) : ScenarioLaw
{
    private const double DaysPerYear = 252;

    // Far out a single jump rules: a normal law's reach beyond its mean.
    private const double JumpReach = 4;

    /// <inheritdoc/>
    public override bool GivesShocks => true;

    /// <summary>Largest move of a jump worth a table, in the unit of the factor's deviation.</summary>
    public required double FurthestJump { get; init; }

    /// <summary>The furthest jump that tables should hold, in units of the diffusion's deviation.</summary>
    /// <param name="common">Common jumps.</param>
    /// <param name="own">Own jumps.</param>
    /// <param name="deviations">The diffusion's deviation of each row.</param>
    internal static double FurthestOf(JumpSize[] common, JumpSize[] own, double[] deviations)
    {
        var furthest = 0.0;
        for (var row = 0; row < deviations.Length; row++)
            furthest = Math.Max(furthest, Math.Max(Far(common[row]), Far(own[row])) / deviations[row]);
        return furthest;
    }

    /// <inheritdoc/>
    public override double Reach(int days) => Ordinary + (FurthestJump / Math.Sqrt(days));

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() =>
        [4, CommonPerDay, .. Common.SelectMany(s => new[] { s.Mean, s.Deviation }), .. OwnPerDay, .. Own.SelectMany(s => new[] { s.Mean, s.Deviation })];

    /// <inheritdoc/>
    public override IEnumerable<ModelParameter> Parameters(CalibratedModel model)
    {
        if (CommonPerDay > 0) yield return new("common jumps a year", CommonPerDay * DaysPerYear, Note: IsGiven ? "given" : "days on which at least half of the factors jump");
        for (var row = 0; row < Own.Length; row++)
        {
            var name = model.Factors[model.Moving[row]].Name;
            if (CommonPerDay > 0 && Common[row] != default) yield return new($"mean of {name} in a common jump", Common[row].Mean, Note: $"standard deviation {Common[row].Deviation:g3}");
            if (OwnPerDay[row] > 0) yield return new($"own jumps of {name} a year", OwnPerDay[row] * DaysPerYear, Note: $"mean {Own[row].Mean:g3}, standard deviation {Own[row].Deviation:g3}{(Notes[row] is { } note ? "; " + note : "")}");
        }
    }

    private static double Far(JumpSize size) => Math.Abs(size.Mean) + (JumpReach * size.Deviation);
}
