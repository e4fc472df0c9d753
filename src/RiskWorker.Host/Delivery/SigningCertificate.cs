using System.Security.Cryptography;
using System.Security.Cryptography.X509Certificates;
using RiskWorker.Host.Options;

namespace RiskWorker.Host.Delivery;

/// <summary>A certificate with its private key, read from a file, and those that stand beside it there.</summary>
public sealed class SigningCertificate : IDisposable
{
    private readonly X509Certificate2Collection _all;

    private SigningCertificate(X509Certificate2Collection all, X509Certificate2 own) => (_all, Own) = (all, own);

    /// <summary>The certificate that signs.</summary>
    public X509Certificate2 Own { get; }

    /// <summary>The others of the file: those that vouch for it.</summary>
    public IEnumerable<X509Certificate2> Others => _all.Where(one => !ReferenceEquals(one, Own));

    /// <summary>Reads the certificate that signs at <paramref name="moment"/>.</summary>
    /// <exception cref="SettingsException">The file or its password cannot be used, it holds no private key, or it is not valid at that moment.</exception>
    public static SigningCertificate Open(SigningOptions options, DateTimeOffset moment)
    {
        var password = Password(options);
        var all = Read(options, password);
        var own = all.FirstOrDefault(one => one.HasPrivateKey);
        try
        {
            if (own is null) throw Refused("evidence.certificate", $"'{Printable.Of(options.Certificate)}', without a private key", "a certificate with its private key");
            var (from, to) = (own.NotBefore.ToUniversalTime(), own.NotAfter.ToUniversalTime());
            if (moment.UtcDateTime < from || moment.UtcDateTime > to)
                throw Refused("evidence.certificate", $"'{Printable.Of(options.Certificate)}', valid from {from:yyyy-MM-dd HH:mm:ss} to {to:yyyy-MM-dd HH:mm:ss} UTC", $"a certificate that is valid at {moment.UtcDateTime:yyyy-MM-dd HH:mm:ss} UTC");
            return new(all, own);
        }
        catch
        {
            foreach (var one in all) one.Dispose();
            throw;
        }
    }

    /// <summary>Forgets the keys.</summary>
    public void Dispose()
    {
        foreach (var one in _all) one.Dispose();
    }

    private static string? Password(SigningOptions options) => options.PasswordVariable is not { } variable ? null
        : Environment.GetEnvironmentVariable(variable)
            ?? throw Refused("evidence.passwordVariable", $"'{variable}', which is not set", "the name of an environment variable that holds the certificate's password");

    private static X509Certificate2Collection Read(SigningOptions options, string? password)
    {
        try
        {
            if (!IsPem(options.Certificate)) return X509CertificateLoader.LoadPkcs12CollectionFromFile(options.Certificate, password, Storage());
            var text = File.ReadAllText(options.Certificate);
            var all = new X509Certificate2Collection();
            all.ImportFromPem(text);
            // The first certificate of a file is the one that its key belongs to.
            var own = text.Contains("PRIVATE KEY-----", StringComparison.Ordinal)
                ? password is null ? X509Certificate2.CreateFromPem(text, text) : X509Certificate2.CreateFromEncryptedPem(text, text, password)
                : null;
            if (own is not null && all.Count > 0) all[0] = own;
            return all;
        }
        catch (Exception refusal) when (refusal is IOException or UnauthorizedAccessException or CryptographicException)
        {
            throw Refused("evidence.certificate", $"'{Printable.Of(options.Certificate)}', which cannot be read ({refusal.Message})", "a PFX or PEM file, and its password in the variable that evidence.passwordVariable names");
        }
    }

    private static bool IsPem(string file) => Path.GetExtension(file).ToLowerInvariant() is ".pem" or ".crt" or ".cer";

    // Keys stay in memory where the system can do that.
    private static X509KeyStorageFlags Storage() => OperatingSystem.IsMacOS() ? X509KeyStorageFlags.DefaultKeySet : X509KeyStorageFlags.EphemeralKeySet;

    private static SettingsException Refused(string path, string found, string expected) => new("signature of the evidence", [new(path, found, expected)]);
}
