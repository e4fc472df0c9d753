using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Drawing;

namespace RiskWorker.Reporting.Pdf;

/// <summary>Names and values, one pair a row; the names' column is as wide as its widest name, up to a third.</summary>
internal static class FactsLayout
{
    private const float Gap = 10;
    private static readonly TextStyle Name = TextStyle.Cell with { Color = Palette.Grey };

    public static IEnumerable<Fragment> Layout(Typesetter typesetter, Facts facts, float width)
    {
        if (facts.Items.Count == 0)
            yield break;

        var widest = facts.Items.Max(item => typesetter.Width(typesetter.Clean(item.Name), Name));
        var names = Math.Min(widest, width * 0.36f);
        var values = width - names - Gap;
        for (var i = 0; i < facts.Items.Count; i++)
        {
            var name = typesetter.Break(facts.Items[i].Name, Name, names);
            var value = typesetter.Break(facts.Items[i].Value, TextStyle.Cell, values);
            var lines = Math.Max(name.Count, value.Count);
            yield return new Fragment(lines * TextStyle.Cell.Leading, (canvas, at) =>
            {
                typesetter.Draw(canvas, name, Name, at, names, Alignment.Left);
                typesetter.Draw(canvas, value, TextStyle.Cell, new(at.X + names + Gap, at.Y), values, Alignment.Left);
            })
            {
                SpaceBefore = i == 0 ? 6 : 2,
                KeepWithNext = i == 0 && facts.Items.Count > 1,
            };
        }
    }
}
