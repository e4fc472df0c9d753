using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Plans;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Sensitivities;

/// <summary>Two small moves of one factor, as far up as down, from which its sensitivity follows.</summary>
/// <param name="Measure">The sensitivity.</param>
/// <param name="Down">The shock down: a log-return of a log-normal factor, a difference of a normal one.</param>
/// <param name="Up">The shock up.</param>
/// <param name="Scale">The nominal move over the one used: 1, except at levels that the nominal one would take to 0 or below.</param>
internal readonly record struct FactorBump(SensitivityMeasure Measure, double Down, double Up, double Scale)
{
    private const double Percent = 0.01;
    private const double BasisPoint = 0.0001;
    private const double VolatilityPoint = 0.01;

    /// <summary>The moves of <paramref name="factor"/>, whose level and kind of shock are those of <paramref name="law"/>.</summary>
    public static FactorBump Of(Factor factor, in FactorLaw law) => factor.Class switch
    {
        FactorClass.Rate => By(BasisPoint, SensitivityMeasure.Dv01, law, mustStayPositive: false),
        FactorClass.Credit => By(BasisPoint, SensitivityMeasure.Cs01, law, mustStayPositive: false),
        FactorClass.Vol => By(VolatilityPoint, SensitivityMeasure.Vega, law, mustStayPositive: true),
        _ => ByPercent(law),
    };

    /// <summary>Half of what lies between the profits at the two moves; times <see cref="Scale"/> it is the sensitivity.</summary>
    public double Half(double down, double up)
    {
        var change = Measure is SensitivityMeasure.Dv01 or SensitivityMeasure.Cs01 ? down - up : up - down;
        return 0.5 * change;
    }

    /// <summary>How much a delta grows from one move to the next, where profit unmoved is <paramref name="still"/>.</summary>
    public double? Gamma(double down, double still, double up) => Measure == SensitivityMeasure.Delta ? up - still - (still - down) : null;

    private static FactorBump ByPercent(in FactorLaw law) => law.IsLognormal
        ? new(SensitivityMeasure.Delta, Logarithm.Of(1 - Percent), Logarithm.Of(1 + Percent), 1)
        : new(SensitivityMeasure.Delta, -Percent * law.Level, Percent * law.Level, 1);

    private static FactorBump By(double step, SensitivityMeasure measure, in FactorLaw law, bool mustStayPositive)
    {
        var used = (law.IsLognormal || mustStayPositive) && law.Level > 0 ? Math.Min(step, law.Level / 2) : step;
        return law.IsLognormal
            ? new(measure, Logarithm.Of((law.Level - used) / law.Level), Logarithm.Of((law.Level + used) / law.Level), step / used)
            : new(measure, -used, used, step / used);
    }
}
