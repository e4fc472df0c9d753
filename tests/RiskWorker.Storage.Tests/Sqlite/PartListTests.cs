using RiskWorker.Storage.Feed.Rows;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Tests.Sqlite;

public sealed class PartListTests
{
    [Fact]
    public void Unpack_gives_what_was_packed_whatever_its_order()
    {
        (string Path, long Part)[] parts =
        [
            ("books", 7), ("observations/2026-11-27", 3), ("observations/2026-11-26", long.MaxValue), ("observations/0001-01-01", 1), ("as-of", 9), ("pnl/9999-12-31", 7), ("observations", 2),
        ];

        Assert.Equal(parts.Order(), PartList.Unpack(PartList.Pack(parts)).Order());
    }

    [Fact]
    public void Pack_of_a_year_stored_day_by_day_takes_less_than_a_byte_a_day()
    {
        var days = Enumerable.Range(0, 2_000).Select(i => new DateOnly(2020, 1, 1).AddDays(i)).Where(d => d.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday)).ToArray();

        Assert.InRange(PartList.Pack(days.Select((d, i) => ("observations/" + Iso.Of(d), i + 1L))).Length, 1, days.Length / 2);
    }

    [Fact]
    public void Unpack_of_damaged_bytes_says_so()
    {
        var packed = PartList.Pack([("books", 1), ("observations/2026-11-27", 300)]);
        var whole = Zlib.Unpack(packed);

        Assert.Throws<InvalidDataException>(() => PartList.Unpack(packed[..^6]));
        for (var length = 1; length < whole.Length; length++)
        {
            if (length == "books".Length + 4) continue; // The list of the first file alone is a list.
            Assert.Throws<InvalidDataException>(() => PartList.Unpack(Zlib.Pack(whole.AsSpan(0, length))));
        }
        Assert.Throws<InvalidDataException>(() => PartList.Unpack(Zlib.Pack([1, (byte)'a', 1, 0xff, 0xff, 0xff, 0xff, 0x07, 1])));
    }
}
