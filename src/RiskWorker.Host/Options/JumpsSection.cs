using RiskWorker.Domain.Runs;

namespace RiskWorker.Host.Options;

/// <summary>Reads <c>jumps</c> of a jump-diffusion: a threshold by which they are found in the history, or rates and sizes.</summary>
internal static class JumpsSection
{
    private const double MostPerYear = 252;
    private const double LargestJump = 2;
    private const double LowestThreshold = 2.5;

    /// <summary>Reads the object.</summary>
    public static JumpSettings Read(SettingsValue value)
    {
        var defaults = new JumpSettings();
        if (value.Section("threshold", "common", "own") is not { } section) return defaults;
        var jumps = defaults with { Own = Own(section["own"]) };
        if (section["common"]?.Section("perYear", "moves") is { } common)
        {
            jumps = jumps with
            {
                CommonPerYear = Rate(common.Required("perYear", Rates)) ?? 0,
                Common = Sizes(common.Required("moves", "an object of factors, each with mean and deviation")),
            };
        }
        if (section["threshold"] is not { } threshold) return jumps;
        if (jumps.AreGiven) threshold.Fault("no threshold where jumps are given: it is used to find them in the history");
        return jumps with { Threshold = threshold.Number(t => t is >= LowestThreshold and <= 20, $"a number of standard deviations from {LowestThreshold} to 20") ?? defaults.Threshold };
    }

    private const string Rates = "jumps a year, above 0 and at most 252";

    private static double? Rate(SettingsValue? value) => value?.Number(r => r is > 0 and <= MostPerYear, Rates);

    private static SortedDictionary<string, OwnJumps> Own(SettingsValue? value)
    {
        var own = new SortedDictionary<string, OwnJumps>(StringComparer.Ordinal);
        foreach (var (factor, item) in value?.Named() ?? [])
        {
            if (item.Section("perYear", "mean", "deviation") is not { } section) continue;
            own[factor] = new(Rate(section.Required("perYear", Rates)) ?? 0, Size(section));
        }
        return own;
    }

    private static SortedDictionary<string, JumpSize> Sizes(SettingsValue? value)
    {
        var sizes = new SortedDictionary<string, JumpSize>(StringComparer.Ordinal);
        foreach (var (factor, item) in value?.Named() ?? [])
        {
            if (item.Section("mean", "deviation") is { } section) sizes[factor] = Size(section);
        }
        return sizes;
    }

    private static JumpSize Size(SettingsSection section)
    {
        var mean = section.Required("mean", "the mean size of a jump")?.Number(m => Math.Abs(m) <= LargestJump, $"a size from -{LargestJump} to {LargestJump}");
        var deviation = section.Required("deviation", "the standard deviation of a jump's size")?.Number(d => d is >= 0 and <= LargestJump, $"a number from 0 to {LargestJump}");
        return new(mean ?? 0, deviation ?? 0);
    }
}
