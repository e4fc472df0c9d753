namespace RiskWorker.Host.Options;

/// <summary>Writes a command so that it can be typed again.</summary>
public static class ShellText
{
    /// <summary>The words joined by spaces, those that a shell would split or expand in single quotes.</summary>
    public static string Of(IEnumerable<string> words) => string.Join(' ', words.Select(Quoted));

    private static string Quoted(string word)
    {
        var plain = word.Length > 0 && word.All(c => char.IsAsciiLetterOrDigit(c) || "-_./:=@%+,".Contains(c));
        return plain ? word : $"'{word.Replace("'", "'\\''", StringComparison.Ordinal)}'";
    }
}
