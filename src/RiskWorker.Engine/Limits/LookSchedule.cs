using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Limits;

/// <summary>
/// The sample sizes at which a run may look at its figures and stop: N0·2^j for j &lt; J, each look at confidence
/// 1 - 0.05/J, so that a run decides wrongly in at most 5% of cases however many looks it takes (Bonferroni). J is fixed
/// before the first draw; stopping whenever the figures happen to look decided would break the promise.
/// </summary>
public sealed class LookSchedule
{
    private const decimal Error = 0.05m;

    /// <summary>The looks of a run.</summary>
    /// <param name="settings">Scenarios, looks and cap.</param>
    /// <param name="decides">Whether anything waits for a decision: a valid limit, or a precision asked for. Otherwise one look at 95%.</param>
    public LookSchedule(SimulationSettings settings, bool decides)
    {
        var planned = 1;
        if (decides)
        {
            while (planned < settings.Looks && (long)settings.Scenarios << planned <= settings.Cap) planned++;
        }
        Scenarios = [.. Enumerable.Range(0, planned).Select(j => settings.Scenarios << j)];
        Level = 1 - (Error / planned);
    }

    /// <summary>Sample size of each look.</summary>
    public IReadOnlyList<int> Scenarios { get; }

    /// <summary>Level of every interval at every look.</summary>
    public decimal Level { get; }
}
