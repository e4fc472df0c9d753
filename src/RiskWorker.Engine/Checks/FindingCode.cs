using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Checks;

/// <summary>A kind of finding.</summary>
/// <param name="Code">Stable name, as settings and <c>results.json</c> spell it.</param>
/// <param name="Severity">What it does to a run unless the settings say otherwise.</param>
/// <param name="Meaning">What is wrong, in a line.</param>
/// <param name="Mend">What to do about it: a clause in the imperative, which ends the finding's sentence.</param>
/// <param name="IsFixed">Whether the settings may not change it: nothing could be computed past this finding.</param>
public sealed record FindingCode(string Code, FindingSeverity Severity, string Meaning, string Mend, bool IsFixed = false)
{
    /// <summary>Its severity under <paramref name="settings"/>.</summary>
    public FindingSeverity SeverityUnder(CheckSettings settings) => IsFixed ? Severity : settings.Severity.GetValueOrDefault(Code, Severity);

    /// <summary>A finding of this kind, at its severity under <paramref name="settings"/>.</summary>
    public Finding Found(CheckSettings settings, string subject, string message) => new(SeverityUnder(settings), Code, subject, message);
}
