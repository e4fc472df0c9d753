using RiskWorker.Engine.Checks;

namespace RiskWorker.Host.Tests.Architecture;

/// <summary>The codes of findings are one table in the code and in the README.</summary>
public sealed class FindingTableTests
{
    [Fact]
    public void Readme_lists_every_finding_as_the_code_has_it()
    {
        var readme = File.ReadAllLines(Path.Combine(Repository.Root, "README.md"));
        var listed = readme.SkipWhile(l => l != "| code | by default | what | mend |").Skip(2).TakeWhile(l => l.StartsWith('|'));
        var expected = FindingCodes.All.Select(c =>
            $"| `{c.Code}` | {c.Severity.ToString().ToLowerInvariant()}{(c.IsFixed ? ", always" : "")} | {c.Meaning} | {c.Mend} |");
        Assert.Equal(expected, listed);
    }
}
