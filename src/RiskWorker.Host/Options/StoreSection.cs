namespace RiskWorker.Host.Options;

/// <summary>Reads <c>store</c>: where the store lies under OUT.</summary>
public static class StoreSection
{
    private const string Form = "a path below the out folder, such as 'riskworker.db'";

    /// <summary>Path of the store, relative to OUT, where the settings give none.</summary>
    public const string DefaultPath = "riskworker.db";

    /// <summary>Reads the section; absent means the default.</summary>
    public static string Read(SettingsValue? value)
    {
        if (value?.Section("path")?["path"] is not { } path || path.Text(Form) is not { } text) return DefaultPath;
        if (IsBelow(text)) return text;
        path.Fault(Form);
        return DefaultPath;
    }

    private static bool IsBelow(string path) =>
        !Path.IsPathRooted(path) && !path.Contains('\0') && !path.EndsWith('/') && !path.Split('/', '\\').Any(p => p is ".." or "." or "");
}
