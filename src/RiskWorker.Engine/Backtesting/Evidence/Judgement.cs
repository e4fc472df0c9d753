using System.Globalization;
using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Distributions;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>Makes results of one test: rounds, and says what could not be assessed.</summary>
internal readonly record struct Judgement(string Name, string Source)
{
    /// <summary>A statistic and its p-value.</summary>
    public StatisticalTest Of(double statistic, double pValue, PValueMethod method, string note = "") => new()
    {
        Name = Name,
        Statistic = Significant.Of(statistic),
        PValue = Significant.Of(Math.Clamp(pValue, 0, 1)),
        Method = method,
        Source = Source,
        Note = note,
    };

    /// <summary>A statistic held against its law under the model.</summary>
    public StatisticalTest Of(double statistic, double extremity, NullLaw law, string note = "") =>
        Of(statistic, law.AtLeast(extremity), law.IsExact ? PValueMethod.Exact : PValueMethod.Simulated, note);

    /// <summary>No result, or a statistic without a p-value.</summary>
    public StatisticalTest NotAssessed(string why, double? statistic = null) =>
        new() { Name = Name, Statistic = statistic is { } s ? Significant.Of(s) : null, Source = Source, Note = why };

    /// <summary>The p-value of the chi-square law that a likelihood ratio tends to.</summary>
    public static double ChiSquareTail(double ratio, double freedom) => ChiSquare.UpperTail(freedom, ratio);

    /// <summary>A figure as a note shows it.</summary>
    public static string Text(double value) => value.ToString("G4", CultureInfo.InvariantCulture);
}
