using RiskWorker.Domain.Market;

namespace RiskWorker.Host.Options;

/// <summary>Reads <c>curves</c>: what a curve is between two tenors.</summary>
public static class CurvesSection
{
    private static readonly Dictionary<string, CurveInterpolation> s_interpolations = new(StringComparer.Ordinal)
    {
        ["linear-zero"] = CurveInterpolation.LinearZero,
        ["log-linear-discount"] = CurveInterpolation.LogLinearDiscount,
    };

    /// <summary>Reads the section; absent means zero rates linear in time.</summary>
    public static CurveInterpolation Read(SettingsValue? value) =>
        value?.Section("interpolation")?["interpolation"]?.Choice(s_interpolations) ?? CurveInterpolation.LinearZero;
}
