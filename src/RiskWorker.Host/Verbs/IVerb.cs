using System.CommandLine;

namespace RiskWorker.Host.Verbs;

/// <summary>A verb of the command line: parses, calls one use case, prints, and says how it ended.</summary>
public interface IVerb
{
    /// <summary>Its command, with its options and its action.</summary>
    Command Command { get; }

    /// <summary>Worked examples for its help.</summary>
    string[] Examples { get; }
}
