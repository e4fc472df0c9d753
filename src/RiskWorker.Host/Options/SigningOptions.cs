namespace RiskWorker.Host.Options;

/// <summary>With what evidence is signed.</summary>
/// <param name="Certificate">Path of a file that holds a certificate with its private key: PFX (PKCS #12), or PEM where it ends in .pem or .crt.</param>
/// <param name="PasswordVariable">The environment variable that holds the password of its private key; null where it has none.</param>
public sealed record SigningOptions(string Certificate, string? PasswordVariable = null)
{
    /// <summary>The same with a path that was relative to <paramref name="folder"/>.</summary>
    public SigningOptions In(string folder) => this with { Certificate = Path.GetFullPath(Certificate, Path.GetFullPath(folder)) };
}
