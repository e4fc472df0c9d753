using System.Globalization;
using System.Text;
using SkiaSharp;

namespace RiskWorker.Reporting.Drawing;

/// <summary>
/// Finds characters that the typeface cannot show. Skia would draw nothing readable for them and say nothing; here each
/// is replaced by a visible sign and remembered, so that the document itself can say what was lost.
/// </summary>
internal sealed class MissingGlyphs
{
    private const char Replacement = '\u25CA';
    private readonly SortedSet<int> lost = [];

    public bool Any => lost.Count > 0;

    /// <summary>The text with line ends and tabs as spaces and every character without a glyph replaced.</summary>
    public string Replace(string text, SKFont font)
    {
        if (IsPlain(text))
            return text;

        var clean = new StringBuilder(text.Length);
        foreach (var rune in text.EnumerateRunes())
        {
            if (rune.Value is '\n' or '\r' or '\t')
                clean.Append(' ');
            else if (font.GetGlyph(rune.Value) != 0)
                clean.Append(rune);
            else
                clean.Append(Lost(rune));
        }

        return clean.ToString();
    }

    /// <summary>The sentence that tells the reader.</summary>
    public string Sentence()
    {
        var list = lost.Select(code => "U+" + code.ToString("X4", CultureInfo.InvariantCulture));
        return $"Characters that the embedded typeface lacks were replaced by {Replacement}: {string.Join(", ", list)}.";
    }

    private static bool IsPlain(string text) => !text.AsSpan().ContainsAnyExceptInRange(' ', '~');

    private char Lost(Rune rune)
    {
        lost.Add(rune.Value);
        return Replacement;
    }
}
