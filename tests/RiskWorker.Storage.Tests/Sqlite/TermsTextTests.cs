using System.Text.Json;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Tests.Sqlite;

public sealed class TermsTextTests
{
    [Fact]
    public void Read_gives_what_was_written_names_of_other_versions_and_escapes_included()
    {
        var terms = new Dictionary<string, string>(StringComparer.Ordinal)
        {
            ["curve"] = "EUR",
            ["factor"] = "\"é\u20AC\U0001F600\\\n<&",
            ["not a term"] = "",
            [new string('t', 80)] = new string('v', 4000),
        };

        Assert.Equal(terms, TermsText.Read(JsonSerializer.Serialize(terms)));
        Assert.Empty(TermsText.Read("{}"));
    }

    [Theory]
    [InlineData("[]")]
    [InlineData("{\"curve\":1}")]
    [InlineData("{\"curve\":\"EUR\"")]
    [InlineData("{} {}")]
    [InlineData("")]
    public void Read_anything_but_an_object_of_texts_is_refused(string json) => Assert.ThrowsAny<JsonException>(() => TermsText.Read(json));
}
