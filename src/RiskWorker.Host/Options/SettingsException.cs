namespace RiskWorker.Host.Options;

/// <summary>Settings that cannot be used: every fault of one source in one message. Ends in exit code 3.</summary>
/// <param name="source">The file or the part of the command line that the faults are in.</param>
/// <param name="faults">At least one fault, in the order of the source.</param>
public sealed class SettingsException(string source, IReadOnlyList<SettingsFault> faults) : Exception(Sentence(source, faults))
{
    /// <summary>The faults, in the order of the source.</summary>
    public IReadOnlyList<SettingsFault> Faults { get; } = faults;

    private static string Sentence(string source, IReadOnlyList<SettingsFault> faults) =>
        $"{source}: {(faults.Count == 1 ? "1 fault" : $"{faults.Count} faults")}\n{string.Join('\n', faults.Select(f => "  " + f))}";
}
