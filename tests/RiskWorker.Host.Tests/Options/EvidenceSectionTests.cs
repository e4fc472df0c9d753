using System.Text;
using RiskWorker.Host.Options;

namespace RiskWorker.Host.Tests.Options;

public sealed class EvidenceSectionTests
{
    [Theory]
    [InlineData("{}", null, null)]
    [InlineData("""{ "evidence": { "certificate": "keys/evidence.pfx", "passwordVariable": "EVIDENCE_PASSWORD" } }""", "keys/evidence.pfx", "EVIDENCE_PASSWORD")]
    [InlineData("""{ "evidence": { "certificate": "evidence.pem" } }""", "evidence.pem", null)]
    public void Read_takes_certificate_and_variable(string json, string? certificate, string? variable)
    {
        var signing = Read(json).Signing;
        Assert.Equal((certificate, variable), (signing?.Certificate, signing?.PasswordVariable));
    }

    [Theory]
    [InlineData("""{ "evidence": {} }""", "evidence.certificate: found nothing, expected the path of a certificate")]
    [InlineData("""{ "evidence": { "certificate": 3 } }""", "evidence.certificate: found 3, expected the path of a certificate")]
    [InlineData("""{ "evidence": { "certificat": "a" } }""", "did you mean 'certificate'?")]
    [InlineData("""{ "evidence": { "certificate": "a", "passwordVariable": "hunter 2" } }""", "evidence.passwordVariable: found text that is not shown, since it may be a password, expected the name of an environment variable")]
    public void Read_says_what_is_wrong_and_prints_no_password(string json, string message)
    {
        var fault = Assert.Throws<SettingsException>(() => Read(json));
        Assert.Contains(message, fault.Message, StringComparison.Ordinal);
        Assert.DoesNotContain("hunter", fault.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Certificate_lies_relative_to_the_folder_of_the_settings()
    {
        var root = Path.GetFullPath("/");
        Assert.Equal(Path.Combine(root, "config", "evidence.pfx"), new SigningOptions("evidence.pfx").In(Path.Combine(root, "config")).Certificate);
        Assert.Equal(Path.Combine(root, "keys", "evidence.pfx"), new SigningOptions(Path.Combine(root, "keys", "evidence.pfx")).In(Path.Combine(root, "config")).Certificate);
    }

    private static Configuration Read(string json) => ConfigurationReader.Read(Encoding.UTF8.GetBytes(json), "riskworker.json");
}
