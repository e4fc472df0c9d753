using System.Text;

namespace RiskWorker.Host.Tests.Architecture;

/// <summary>C# source with comments and the text of literals blanked, so that a rule about code does not trip over prose.</summary>
internal static class SourceText
{
    public static string CodeOf(string source)
    {
        var code = new StringBuilder(source.Length);
        for (var i = 0; i < source.Length;)
        {
            var end = SkipFrom(source, i);
            if (end > i) code.Append(' ');
            else code.Append(source[end++]);
            i = end;
        }
        return code.ToString();
    }

    /// <summary>End of the comment or literal that begins at <paramref name="i"/>, or <paramref name="i"/> where none does.</summary>
    private static int SkipFrom(string s, int i)
    {
        if (At(s, i, "//")) return End(s, "\n", i + 2) - 1;
        if (At(s, i, "/*")) return End(s, "*/", i + 2);
        if (At(s, i, "\"\"\"")) return End(s, "\"\"\"", i + 3);
        if (At(s, i, "@\"")) return Quoted(s, i + 2, '"', '\0');
        if (At(s, i, "\"")) return Quoted(s, i + 1, '"', '\\');
        return At(s, i, "'") ? Quoted(s, i + 1, '\'', '\\') : i;
    }

    private static int Quoted(string s, int i, char quote, char escape)
    {
        for (; i < s.Length && s[i] != quote && s[i] != '\n'; i++)
        {
            if (s[i] == escape) i++;
        }
        return Math.Min(i + 1, s.Length);
    }

    private static bool At(string s, int i, string text) => string.CompareOrdinal(s, i, text, 0, text.Length) == 0;

    private static int End(string s, string text, int from)
    {
        var at = s.IndexOf(text, from, StringComparison.Ordinal);
        return at < 0 ? s.Length : at + text.Length;
    }
}
