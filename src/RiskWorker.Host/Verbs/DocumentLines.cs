using RiskWorker.Host.Options;
using Spectre.Console;

namespace RiskWorker.Host.Verbs;

/// <summary>Where documents lie: a path a line, never folded, so that a reader can copy it and a script can read it.</summary>
public static class DocumentLines
{
    /// <summary>Prints <paramref name="documents"/> past the console's own folding at its width.</summary>
    public static void Write(IEnumerable<string> documents, IAnsiConsole console)
    {
        foreach (var document in documents) console.Profile.Out.Writer.WriteLine(Printable.Of(document));
    }
}
