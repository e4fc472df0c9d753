using System.Buffers;
using System.Buffers.Binary;
using System.Security.Cryptography;
using System.Text;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite.Writers;

/// <summary>
/// Digest of the positions of each date, whatever the order of their rows: the sum modulo 2^128 of a hash of each row.
/// It tells accidents, not forgeries, apart: what a run has read is hashed from the stored rows again.
/// </summary>
internal sealed class PositionDigests
{
    private readonly Dictionary<DateOnly, (long Rows, UInt128 Sum)> _byDate = [];

    /// <summary>Rows and digest by date.</summary>
    public IReadOnlyDictionary<DateOnly, (long Rows, UInt128 Sum)> ByDate => _byDate;

    public void Add(in PositionRow row)
    {
        var (rows, sum) = _byDate.GetValueOrDefault(row.AsOf);
        _byDate[row.AsOf] = (rows + 1, unchecked(sum + Hash(row)));
    }

    private static UInt128 Hash(in PositionRow row)
    {
        var length = 3 * sizeof(int) + 2 * sizeof(long) + Encoding.UTF8.GetMaxByteCount(row.Book.Length + row.Instrument.Length + (row.Trade?.Length ?? 0));
        byte[]? rented = null;
        var buffer = length <= 1024 ? stackalloc byte[1024] : rented = ArrayPool<byte>.Shared.Rent(length);
        var at = Text(buffer, 0, row.Book);
        at = Text(buffer, at, row.Instrument);
        at = Text(buffer, at, row.Trade ?? "");
        at = Bits(buffer, at, row.Quantity.Value);
        at = Bits(buffer, at, row.MarketValue?.Value ?? double.NaN);
        Span<byte> hash = stackalloc byte[SHA256.HashSizeInBytes];
        SHA256.HashData(buffer[..at], hash);
        if (rented is not null) ArrayPool<byte>.Shared.Return(rented);
        return BinaryPrimitives.ReadUInt128LittleEndian(hash);
    }

    private static int Text(Span<byte> buffer, int at, string text)
    {
        var written = Encoding.UTF8.GetBytes(text, buffer[(at + sizeof(int))..]);
        BinaryPrimitives.WriteInt32LittleEndian(buffer[at..], written);
        return at + sizeof(int) + written;
    }

    private static int Bits(Span<byte> buffer, int at, double value)
    {
        BinaryPrimitives.WriteInt64LittleEndian(buffer[at..], BitConverter.DoubleToInt64Bits(value));
        return at + sizeof(long);
    }
}
