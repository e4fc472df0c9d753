using RiskWorker.Engine.Pricing;

namespace RiskWorker.Host.Tests.Architecture;

/// <summary>What is priced how is one table in the code and in the README.</summary>
public sealed class MethodTableTests
{
    [Fact]
    public void Readme_lists_every_method_as_the_code_has_it()
    {
        var readme = File.ReadAllLines(Path.Combine(Repository.Root, "README.md"));
        var listed = readme.SkipWhile(l => l != "| kind | model | method | source | not to be trusted: what it leaves out |").Skip(2).TakeWhile(l => l.StartsWith('|'));
        Assert.Equal(PricingMethods.All.Select(m => $"| {m.Kind} | {m.Model} | {m.Method} | {m.Source} | {m.Caution} |"), listed);
    }
}
