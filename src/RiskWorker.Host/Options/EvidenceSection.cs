namespace RiskWorker.Host.Options;

/// <summary>Reads <c>evidence</c>: the certificate that its manifest is signed with, and where its password is.</summary>
public static class EvidenceSection
{
    private const string File = "the path of a certificate with its private key, such as 'evidence.pfx'";
    private const string Variable = "the name of an environment variable (letters, digits and underscores), such as 'EVIDENCE_PASSWORD'";

    /// <summary>Reads the section; null where it is absent: then nothing is signed.</summary>
    public static SigningOptions? Read(SettingsValue? value)
    {
        if (value?.Section("certificate", "passwordVariable") is not { } section) return null;
        var certificate = section.Required("certificate", File)?.Text(File);
        var variable = section["passwordVariable"] is { } named ? Name(named) : null;
        return certificate is null ? null : new(certificate, variable);
    }

    // A password that was put here by mistake must not be printed.
    private static string? Name(SettingsValue value)
    {
        if (value.Text(Variable) is not { } name) return null;
        if (!char.IsAsciiDigit(name[0]) && name.All(c => char.IsAsciiLetterOrDigit(c) || c == '_')) return name;
        value.Fault(Variable, "text that is not shown, since it may be a password");
        return null;
    }
}
