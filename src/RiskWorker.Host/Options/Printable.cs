using System.Text;

namespace RiskWorker.Host.Options;

/// <summary>Text from outside made safe to print: no control characters, so nothing in it can steer a terminal or forge a line.</summary>
public static class Printable
{
    /// <summary><paramref name="text"/> with control and line-separating characters replaced by '?', shortened to <paramref name="length"/> characters.</summary>
    public static string Of(string text, int length = int.MaxValue)
    {
        var safe = new StringBuilder(Math.Min(text.Length, length));
        foreach (var rune in text.EnumerateRunes())
        {
            if (safe.Length >= length) return safe.Append('…').ToString();
            if (Steers(rune)) safe.Append('?');
            else safe.Append(rune.ToString());
        }
        return safe.ToString();
    }

    private static bool Steers(Rune rune) => Rune.GetUnicodeCategory(rune) is
        System.Globalization.UnicodeCategory.Control or
        System.Globalization.UnicodeCategory.Format or
        System.Globalization.UnicodeCategory.LineSeparator or
        System.Globalization.UnicodeCategory.ParagraphSeparator;
}
