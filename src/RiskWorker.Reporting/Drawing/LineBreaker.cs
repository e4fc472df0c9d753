using System.Buffers;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Drawing;

/// <summary>Breaks text into lines at spaces; a word wider than a line is broken inside, after a separator if it can.</summary>
internal sealed class LineBreaker(Typesetter typesetter, TextStyle style, float width)
{
    // Rounding of single-precision widths must not push a column's own widest word onto a second line.
    private const float Slack = 0.05f;
    private static readonly SearchValues<char> Separators = SearchValues.Create("_-/.:,;|");

    private readonly List<TextLine> lines = [];
    private readonly List<TextRun> current = [];
    private float used;

    public IReadOnlyList<TextLine> Break(RichText text)
    {
        foreach (var word in Words(text))
            Add(word);

        Flush();
        return lines;
    }

    /// <summary>The words of a text, each as the runs it is made of.</summary>
    public static IEnumerable<IReadOnlyList<TextRun>> Words(RichText text)
    {
        var word = new List<TextRun>();
        foreach (var run in text.Runs)
        {
            var parts = run.Text.Split(' ');
            for (var i = 0; i < parts.Length; i++)
            {
                if (i > 0 && word.Count > 0)
                {
                    yield return word;
                    word = [];
                }

                if (parts[i].Length > 0)
                    word.Add(run with { Text = parts[i] });
            }
        }

        if (word.Count > 0)
            yield return word;
    }

    private void Add(IReadOnlyList<TextRun> word)
    {
        var size = word.Sum(Measure);
        var space = current.Count > 0 ? Measure(new TextRun(" ", current[^1].Strong)) : 0;
        if (used + space + size > width + Slack && current.Count > 0)
        {
            Flush();
            space = 0;
        }

        if (size > width + Slack)
        {
            AddPieces(word);
            return;
        }

        if (space > 0)
            Append(new TextRun(" ", current[^1].Strong));
        foreach (var run in word)
            Append(run);
    }

    private void AddPieces(IReadOnlyList<TextRun> word)
    {
        foreach (var run in word)
        {
            var rest = run.Text;
            while (used + Measure(run with { Text = rest }) > width + Slack)
            {
                var length = Prefix(rest, run.Strong);
                Append(run with { Text = rest[..length] });
                Flush();
                rest = rest[length..];
            }

            if (rest.Length > 0)
                Append(run with { Text = rest });
        }
    }

    // At least one character, so that a column narrower than a letter still ends; at most what fits.
    private int Prefix(string text, bool strong)
    {
        var length = 0;
        foreach (var rune in text.EnumerateRunes())
        {
            var next = length + rune.Utf16SequenceLength;
            if (length > 0 && used + Measure(new TextRun(text[..next], strong)) > width + Slack)
                break;

            length = next;
        }

        var separator = text.AsSpan(0, length).LastIndexOfAny(Separators);
        return separator >= length / 2 ? separator + 1 : length;
    }

    private float Measure(TextRun run) => typesetter.Width(run.Text, style with { Strong = style.Strong || run.Strong });

    private void Append(TextRun run)
    {
        used += Measure(run);
        if (current.Count > 0 && current[^1].Strong == run.Strong)
            current[^1] = run with { Text = current[^1].Text + run.Text };
        else
            current.Add(run);
    }

    private void Flush()
    {
        if (current.Count == 0)
            return;

        var spans = new List<TextSpan>(current.Count);
        var x = 0f;
        foreach (var run in current)
        {
            spans.Add(new TextSpan(run.Text, style.Strong || run.Strong, x));
            x += Measure(run);
        }

        lines.Add(new TextLine(spans, x));
        current.Clear();
        used = 0;
    }
}
