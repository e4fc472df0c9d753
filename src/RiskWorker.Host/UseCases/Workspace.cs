namespace RiskWorker.Host.UseCases;

/// <summary>The folders that a verb works on, as absolute paths.</summary>
/// <param name="ConfigFolder">Holds <c>riskworker.json</c> and <c>feed/</c>.</param>
/// <param name="OutFolder">Holds the store and the reports.</param>
/// <param name="StoreFile">The store's file, below <paramref name="OutFolder"/>.</param>
public sealed record Workspace(string ConfigFolder, string OutFolder, string StoreFile)
{
    /// <summary>The feed of the settings' folder.</summary>
    public string FeedFolder => Path.Combine(ConfigFolder, "feed");
}
