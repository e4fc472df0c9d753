namespace RiskWorker.Host.Options;

/// <summary>Finds the key that a mistyped one was meant to be.</summary>
public static class NearestKey
{
    /// <summary>The key with the fewest edits from <paramref name="typed"/>, or null where none is within a third of its length.</summary>
    public static string? Of(string typed, IEnumerable<string> keys)
    {
        var best = keys.Select(k => (Key: k, Edits: Edits(typed.ToUpperInvariant(), k.ToUpperInvariant()))).OrderBy(c => c.Edits).FirstOrDefault();
        return best.Key is not null && best.Edits <= Math.Max(1, best.Key.Length / 3) ? best.Key : null;
    }

    /// <summary>Insertions, deletions, replacements and swaps of neighbours that turn one text into the other (optimal string alignment).</summary>
    private static int Edits(string a, string b)
    {
        var table = new int[a.Length + 1, b.Length + 1];
        for (var i = 0; i <= a.Length; i++) table[i, 0] = i;
        for (var j = 0; j <= b.Length; j++) table[0, j] = j;
        for (var i = 1; i <= a.Length; i++)
        {
            for (var j = 1; j <= b.Length; j++)
            {
                var replace = table[i - 1, j - 1] + (a[i - 1] == b[j - 1] ? 0 : 1);
                table[i, j] = Math.Min(replace, Math.Min(table[i - 1, j], table[i, j - 1]) + 1);
                if (i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1]) table[i, j] = Math.Min(table[i, j], table[i - 2, j - 2] + 1);
            }
        }
        return table[a.Length, b.Length];
    }
}
