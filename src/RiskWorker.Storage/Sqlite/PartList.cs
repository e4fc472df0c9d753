using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite;

/// <summary>
/// Which stored part stands at which path of a snapshot. A run reads thousands of dates, so the list is kept as differences from one date and
/// part to the next: dates that were stored one after the other take next to nothing.
/// </summary>
internal static class PartList
{
    /// <summary>Paths are <c>file</c> or <c>file/yyyy-MM-dd</c>.</summary>
    public static byte[] Pack(IEnumerable<(string Path, long Part)> parts)
    {
        using var bytes = new MemoryStream();
        using var writer = new BinaryWriter(bytes);
        foreach (var file in parts.GroupBy(p => FileOf(p.Path), StringComparer.Ordinal))
        {
            var entries = file.Select(p => (Day: DayOf(p.Path), p.Part)).Order().ToArray();
            writer.Write(file.Key);
            writer.Write7BitEncodedInt(entries.Length);
            var (day, part) = (0, 0L);
            foreach (var entry in entries)
            {
                writer.Write7BitEncodedInt(entry.Day - day);
                writer.Write7BitEncodedInt64(entry.Part - part);
                (day, part) = entry;
            }
        }
        writer.Flush();
        return Zlib.Pack(bytes.ToArray());
    }

    /// <summary>Undoes <see cref="Pack"/>.</summary>
    /// <exception cref="InvalidDataException">The bytes are damaged.</exception>
    public static List<(string Path, long Part)> Unpack(byte[] packed)
    {
        var bytes = Zlib.Unpack(packed);
        using var reader = new BinaryReader(new MemoryStream(bytes));
        var parts = new List<(string, long)>();
        try
        {
            while (reader.BaseStream.Position < bytes.Length) Read(reader, parts);
        }
        catch (Exception error) when (error is EndOfStreamException or FormatException or ArgumentOutOfRangeException)
        {
            throw new InvalidDataException("The list of parts is damaged.", error);
        }
        return parts;
    }

    private static void Read(BinaryReader reader, List<(string Path, long Part)> parts)
    {
        var (file, count) = (reader.ReadString(), reader.Read7BitEncodedInt());
        var (day, part) = (0, 0L);
        for (var i = 0; i < count; i++)
        {
            day += reader.Read7BitEncodedInt();
            part += reader.Read7BitEncodedInt64();
            parts.Add((day == 0 ? file : file + "/" + Iso.Of(DateOnly.FromDayNumber(day - 1)), part));
        }
    }

    private static string FileOf(string path) => path.IndexOf('/') is var slash and >= 0 ? path[..slash] : path;

    /// <summary>One more than the day's number; 0 for a file without dates.</summary>
    private static int DayOf(string path) => path.IndexOf('/') is var slash and >= 0 ? Iso.Date(path[(slash + 1)..]).DayNumber + 1 : 0;
}
