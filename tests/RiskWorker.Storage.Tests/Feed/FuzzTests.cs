using CsCheck;
using RiskWorker.Storage.Feed;

namespace RiskWorker.Storage.Tests.Feed;

public sealed class FuzzTests
{
    private static readonly byte[][] s_splices =
    [
        [0], [0xFF], "\""u8.ToArray(), ","u8.ToArray(), "\n"u8.ToArray(), "\r"u8.ToArray(), "1e400"u8.ToArray(), "NaN"u8.ToArray(), "0001-01-01"u8.ToArray(), "9999-12-31"u8.ToArray(),
        "=cmd"u8.ToArray(), "\uFEFF"u8.ToArray(), [0xED, 0xA0, 0x80], new byte[5000], "\"\"\n\"\""u8.ToArray(), "-"u8.ToArray(), "999999999999999999999"u8.ToArray(),
    ];

    private static readonly string[] s_files = ["books.csv", "factors.csv", "observations.csv", "instruments.csv", "positions.csv", "limits.csv", "pnl.csv"];

    private static readonly Gen<(int File, (int Kind, double At, int Splice)[] Edits)> s_damage = Gen.Select(
        Gen.Int[0, s_files.Length - 1], Gen.Select(Gen.Int[0, 3], Gen.Double[0, 1], Gen.Int[0, s_splices.Length - 1]).Array[1, 4]);

    [Fact]
    public void Load_damaged_file_is_refused_by_line_or_loaded_whole_and_never_in_part()
    {
        using var fixture = new FeedFixture();
        fixture.Load();
        var pristine = s_files.Select(f => File.ReadAllBytes(Path.Combine(fixture.Folder, f))).ToArray();
        var before = fixture.StoreBytes();

        s_damage.Sample(damage =>
        {
            fixture.Bytes(s_files[damage.File], damage.Edits.Aggregate(pristine[damage.File], Damaged));
            FeedOutcome outcome;
            using (var store = fixture.Open()) outcome = fixture.Load(store);
            if (outcome.Faults.Count == 0 && !outcome.AlreadyLoaded)
            {
                File.WriteAllBytes(fixture.StorePath, before);
            }
            else
            {
                Assert.Equal(before, fixture.StoreBytes());
                Assert.All(outcome.Faults, f => Assert.True(f.File == s_files[damage.File] && (f.Line > 0 || f.Found == "no row below the header"), f.ToString()));
            }
            fixture.Bytes(s_files[damage.File], pristine[damage.File]);
        }, iter: 400, threads: 1, seed: "0000KOIPe036");
    }

    private static byte[] Damaged(byte[] bytes, (int Kind, double At, int Splice) edit)
    {
        var at = (int)(edit.At * bytes.Length);
        var splice = s_splices[edit.Splice];
        return edit.Kind switch
        {
            0 => bytes[..at],
            1 => [.. bytes[..at], .. splice, .. bytes[at..]],
            2 => [.. bytes[..at], .. splice, .. bytes[Math.Min(bytes.Length, at + splice.Length)..]],
            _ => [.. bytes[at..], .. bytes[..at]],
        };
    }
}
