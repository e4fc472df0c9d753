namespace RiskWorker.Host.Options;

/// <summary>One thing that is wrong with the settings.</summary>
/// <param name="Path">Where: a JSON path such as <c>models.fast.lambda</c> or <c>measures[0].confidence</c>, or an option of the command line.</param>
/// <param name="Found">What stands there, as typed and shortened.</param>
/// <param name="Expected">What may stand there, with its range.</param>
public sealed record SettingsFault(string Path, string Found, string Expected)
{
    /// <summary>As in 'simulation.looks: found 0, expected a whole number from 1 to 20'.</summary>
    public override string ToString() => $"{Path}: found {Found}, expected {Expected}";
}
