using System.Security.Cryptography;
using System.Security.Cryptography.Pkcs;
using System.Security.Cryptography.X509Certificates;

namespace RiskWorker.Host.Delivery;

/// <summary>Signs a manifest: a detached CMS signature (RFC 5652), so that the manifest itself stays readable.</summary>
public static class ManifestSignature
{
    /// <summary>The signature of <paramref name="manifest"/> in DER: SHA-256, with the certificate and those that vouch for it.</summary>
    /// <param name="manifest">The bytes of the manifest.</param>
    /// <param name="certificate">Who signs.</param>
    /// <param name="moment">When it says that it was signed. It is the signer's word; a time stamp of a third party is not sought.</param>
    public static byte[] Of(byte[] manifest, SigningCertificate certificate, DateTimeOffset moment)
    {
        ArgumentNullException.ThrowIfNull(manifest);
        ArgumentNullException.ThrowIfNull(certificate);
        var signed = new SignedCms(new ContentInfo(manifest), detached: true);
        var signer = new CmsSigner(SubjectIdentifierType.IssuerAndSerialNumber, certificate.Own)
        {
            DigestAlgorithm = new Oid("2.16.840.1.101.3.4.2.1", "SHA256"),
            IncludeOption = X509IncludeOption.EndCertOnly,
        };
        signer.SignedAttributes.Add(new Pkcs9SigningTime(moment.UtcDateTime));
        foreach (var other in certificate.Others) signer.Certificates.Add(other);
        signed.ComputeSignature(signer, silent: true);
        return signed.Encode();
    }
}
