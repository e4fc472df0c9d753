using System.Globalization;

namespace RiskWorker.Numerics.Tests;

/// <summary>A small CSV file of the Data folder: no field holds a line break.</summary>
internal static class Table
{
    public static IEnumerable<string[]> Rows(string file) =>
        File.ReadLines(Path.Combine(AppContext.BaseDirectory, "Data", file)).Skip(1).Select(Split);

    public static double Number(string text) => double.Parse(text, NumberStyles.Float, CultureInfo.InvariantCulture);

    private static string[] Split(string line)
    {
        var fields = new List<string>();
        int start = 0;
        bool quoted = false;
        for (int i = 0; i <= line.Length; i++)
        {
            if (i < line.Length && line[i] == '"')
                quoted = !quoted;
            if (i < line.Length && (line[i] != ',' || quoted))
                continue;
            fields.Add(line[start..i].Trim('"'));
            start = i + 1;
        }

        return [.. fields];
    }
}
