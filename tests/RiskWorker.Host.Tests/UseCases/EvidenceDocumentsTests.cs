using System.ComponentModel;
using System.Diagnostics;
using System.Security.Cryptography;
using System.Security.Cryptography.Pkcs;
using System.Security.Cryptography.X509Certificates;
using System.Text.Json;
using RiskWorker.Domain.Evidence;
using RiskWorker.Host.Options;
using RiskWorker.Host.UseCases;
using RiskWorker.TestKit;

namespace RiskWorker.Host.Tests.UseCases;

public sealed class EvidenceDocumentsTests : IDisposable
{
    private const string Variable = "RISKWORKER_TEST_EVIDENCE_PASSWORD";
    private const string Password = "not a secret";
    private static readonly BacktestEvidence s_evidence = new SampleEvidence { Books = 1, Days = 130 }.Build();
    private readonly TemporaryFolder _folder = new();

    public EvidenceDocumentsTests() => Environment.SetEnvironmentVariable(Variable, Password);

    public void Dispose() => _folder.Dispose();

    [Fact]
    public void Write_makes_every_file_and_a_manifest_of_their_hashes_by_name()
    {
        var written = EvidenceDocuments.Write(s_evidence, _folder.Path, null);
        string[] names = ["backtest-days.csv", "backtest.json", "backtest.xlsx", "evidence-report.pdf", "exceptions.csv"];
        Assert.Equal([.. names, "manifest.json"], written.Hashes.Select(file => file.Name));
        Assert.Equal(written.Paths.Order(StringComparer.Ordinal), Directory.GetFiles(Out).Order(StringComparer.Ordinal));
        using var manifest = JsonDocument.Parse(File.ReadAllBytes(Path.Combine(Out, "manifest.json")));
        var listed = manifest.RootElement.GetProperty("files").EnumerateArray().ToDictionary(file => file.GetProperty("name").GetString()!, file => file.GetProperty("sha256").GetString()!);
        Assert.Equal(names, listed.Keys);
        Assert.All(listed, file => Assert.Equal(Convert.ToHexStringLower(SHA256.HashData(File.ReadAllBytes(Path.Combine(Out, file.Key)))), file.Value));
        Assert.Equal(File.ReadAllText(Path.Combine(Out, "backtest.json")), written.Json);
    }

    [Fact]
    public void Write_replaces_an_earlier_folder_whole_and_leaves_nothing_beside()
    {
        Directory.CreateDirectory(Out);
        File.WriteAllText(Path.Combine(Out, "manifest.json.p7s"), "of an earlier one");
        var first = EvidenceDocuments.Write(s_evidence, _folder.Path, null);
        var second = EvidenceDocuments.Write(s_evidence, _folder.Path + Path.DirectorySeparatorChar, null);
        Assert.Equal(first.Hashes, second.Hashes);
        Assert.Equal(6, Directory.GetFiles(Out).Length);
        Assert.Equal([Out], Directory.GetFileSystemEntries(Path.GetDirectoryName(Out)!));
    }

    [Fact]
    public void Write_leaves_alone_what_is_not_its_own()
    {
        var store = _folder.Write("riskworker.db", "the store");
        var written = EvidenceDocuments.Write(s_evidence, _folder.Path, null);
        Assert.Equal(Out, written.Folder);
        Assert.Equal("the store", File.ReadAllText(store));

        File.WriteAllText(Path.Combine(Out, "notes.txt"), "mine");
        var refusal = Assert.Throws<IOException>(() => EvidenceDocuments.Write(s_evidence, _folder.Path, null));
        Assert.Contains("holds 'notes.txt', which is no document of backtest evidence; it is not replaced.", refusal.Message, StringComparison.Ordinal);
        Assert.Equal("mine", File.ReadAllText(Path.Combine(Out, "notes.txt")));
        Assert.Equal([Out], Directory.GetFileSystemEntries(Path.GetDirectoryName(Out)!));
    }

    [Fact]
    public void Write_of_another_moment_or_kind_has_a_folder_of_its_own()
    {
        var first = EvidenceDocuments.Write(s_evidence, _folder.Path, null).Folder;
        var second = EvidenceDocuments.Write(s_evidence with { Made = s_evidence.Made.AddDays(1) }, _folder.Path, null).Folder;
        Assert.NotEqual(first, second);
        Assert.True(Directory.Exists(first));
        Assert.EndsWith("walk-forward-20261130T061203Z", EvidenceDocuments.FolderOf(s_evidence with { Kind = BacktestKind.WalkForward }, "out"), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("pfx")]
    [InlineData("pem")]
    public void Write_signs_the_manifest_so_that_another_program_can_verify_it(string kind)
    {
        var written = EvidenceDocuments.Write(s_evidence, _folder.Path, Certificate(kind));
        Assert.Equal(["manifest.json", "manifest.json.p7s"], written.Hashes.Skip(5).Select(file => file.Name));
        var (code, said) = Verify();
        Assert.True(code == 0, said);

        File.AppendAllText(Path.Combine(Out, "manifest.json"), " ");
        Assert.NotEqual(0, Verify().Code);
    }

    [Fact]
    public void Write_signature_is_detached_holds_the_moment_and_fails_after_tampering()
    {
        EvidenceDocuments.Write(s_evidence, _folder.Path, Certificate("pfx"));
        var manifest = File.ReadAllBytes(Path.Combine(Out, "manifest.json"));
        var signed = Read(manifest);
        signed.CheckSignature(verifySignatureOnly: true);
        Assert.True(signed.Detached);
        var time = Assert.Single(signed.SignerInfos[0].SignedAttributes.Cast<CryptographicAttributeObject>().SelectMany(one => one.Values.Cast<AsnEncodedData>()).OfType<Pkcs9SigningTime>());
        Assert.Equal(s_evidence.Made.UtcDateTime, time.SigningTime.ToUniversalTime());

        manifest[^5] ^= 1;
        Assert.Throws<CryptographicException>(() => Read(manifest).CheckSignature(verifySignatureOnly: true));

        SignedCms Read(byte[] content)
        {
            var cms = new SignedCms(new ContentInfo(content), detached: true);
            cms.Decode(File.ReadAllBytes(Path.Combine(Out, "manifest.json.p7s")));
            return cms;
        }
    }

    [Fact]
    public void Write_with_a_certificate_that_cannot_be_used_says_why_and_writes_nothing()
    {
        var good = Certificate("pfx");
        Refused(good with { Certificate = Path.Combine(_folder.Path, "none.pfx") }, "none.pfx', which cannot be read");
        Refused(good with { PasswordVariable = null }, "which cannot be read");
        Refused(good with { PasswordVariable = "RISKWORKER_TEST_UNSET" }, "evidence.passwordVariable: found 'RISKWORKER_TEST_UNSET', which is not set");
        Refused(new(Path.Combine(_folder.Path, "certificate.pem")), "without a private key");
        var late = Assert.Throws<SettingsException>(() => EvidenceDocuments.Write(s_evidence with { Made = new(2200, 1, 1, 0, 0, 0, TimeSpan.Zero) }, _folder.Path, good));
        Assert.Contains("expected a certificate that is valid at 2200-01-01 00:00:00 UTC", late.Message, StringComparison.Ordinal);

        void Refused(SigningOptions signing, string message)
        {
            var refusal = Assert.Throws<SettingsException>(() => EvidenceDocuments.Write(s_evidence, _folder.Path, signing));
            Assert.Contains(message, refusal.Message, StringComparison.Ordinal);
            Assert.DoesNotContain(Password, refusal.Message, StringComparison.Ordinal);
            Assert.False(Directory.Exists(Out));
        }
    }

    private string Out => Path.Combine(_folder.Path, "backtest", "2026-11-27", "recorded-20261130T061203Z");

    private SigningOptions Certificate(string kind)
    {
        using var key = RSA.Create(2048);
        var request = new CertificateRequest("CN=Throw-away", key, HashAlgorithmName.SHA256, RSASignaturePadding.Pkcs1);
        using var certificate = request.CreateSelfSigned(new(2020, 1, 1, 0, 0, 0, TimeSpan.Zero), new(2120, 1, 1, 0, 0, 0, TimeSpan.Zero));
        File.WriteAllText(Path.Combine(Directory.CreateDirectory(Path.Combine(_folder.Path)).FullName, "certificate.pem"), certificate.ExportCertificatePem());
        var file = Path.Combine(_folder.Path, "signer." + kind);
        if (kind == "pfx") File.WriteAllBytes(file, certificate.Export(X509ContentType.Pkcs12, Password));
        else File.WriteAllText(file, $"{certificate.ExportCertificatePem()}\n{key.ExportEncryptedPkcs8PrivateKeyPem(Password, new(PbeEncryptionAlgorithm.Aes256Cbc, HashAlgorithmName.SHA256, 1000))}\n");
        return new(file, Variable);
    }

    private (int Code, string Said) Verify()
    {
        string[] arguments =
        [
            "cms", "-verify", "-binary", "-inform", "DER", "-in", Path.Combine(Out, "manifest.json.p7s"), "-content", Path.Combine(Out, "manifest.json"),
            "-CAfile", Path.Combine(_folder.Path, "certificate.pem"), "-purpose", "any", "-no_check_time", "-out", Path.Combine(_folder.Path, "verified"),
        ];
        try
        {
            using var openssl = Process.Start(new ProcessStartInfo("openssl", arguments) { RedirectStandardError = true, RedirectStandardOutput = true })!;
            var said = openssl.StandardError.ReadToEnd();
            openssl.WaitForExit();
            return (openssl.ExitCode, said);
        }
        catch (Win32Exception missing)
        {
            Assert.Skip($"openssl cannot be started, so no other program verifies the signature: {missing.Message}");
            throw;
        }
    }
}
