using System.CommandLine;
using System.CommandLine.Help;
using System.CommandLine.Invocation;

namespace RiskWorker.Host.Verbs;

/// <summary>Help with worked examples below the options.</summary>
/// <param name="help">The help of the library.</param>
/// <param name="examples">Lines to add, by command.</param>
public sealed class ExampleHelp(HelpAction help, IReadOnlyDictionary<Command, string[]> examples) : SynchronousCommandLineAction
{
    /// <inheritdoc/>
    public override bool ClearsParseErrors => true;

    /// <inheritdoc/>
    public override int Invoke(ParseResult parseResult)
    {
        var code = help.Invoke(parseResult);
        if (!examples.TryGetValue(parseResult.CommandResult.Command, out var lines)) return code;
        foreach (var line in lines) parseResult.InvocationConfiguration.Output.WriteLine(line);
        return code;
    }
}
