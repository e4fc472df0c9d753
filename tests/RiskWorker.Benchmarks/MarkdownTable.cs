using System.Text;

namespace RiskWorker.Benchmarks;

/// <summary>A table of text cells, the first column left and the others right.</summary>
internal sealed class MarkdownTable(params string[] columns)
{
    private readonly List<string[]> _rows = [];

    public void Add(params string[] cells) => _rows.Add(cells);

    public override string ToString()
    {
        var text = new StringBuilder();
        Append(text, columns);
        Append(text, [.. columns.Select((_, c) => c == 0 ? "---" : "---:")]);
        foreach (var row in _rows) Append(text, row);
        return text.ToString();
    }

    private static void Append(StringBuilder text, string[] cells) => text.Append("| ").AppendJoin(" | ", cells).Append(" |\n");
}
