using RiskWorker.Numerics.Random;

namespace RiskWorker.Numerics.Tests.Random;

public sealed class DrawStreamTests
{
    [Fact]
    public void New_sub_index_beyond_24_bits_is_refused()
    {
        var error = Assert.Throws<ArgumentOutOfRangeException>(() => new DrawStream(1, DrawPurpose.Jumps, 1u << 24));
        Assert.Contains("16777216", error.Message, StringComparison.Ordinal);
        Assert.Equal(DrawStream.MaxSubIndex, new DrawStream(1, DrawPurpose.Jumps, (1u << 24) - 1).SubIndex);
    }

    // The layout that stored runs depend on, spelt out word by word.
    [Fact]
    public void At_counter_and_key_follow_the_layout()
    {
        var stream = new DrawStream(0xA1A2A3A4_B1B2B3B4, DrawPurpose.PathSteps, 0x00C0FFEE);
        const ulong scenario = 0x00000007_00000009;
        (uint w0, uint w1, uint w2, uint w3) = Philox4x32.Block((9, 7, 5, 0x04C0FFEE), (0xB1B2B3B4, 0xA1A2A3A4));
        Assert.Equal(FromWord(w1, w0), UniformDraws.At(stream, scenario, 10));
        Assert.Equal(FromWord(w3, w2), UniformDraws.At(stream, scenario, 11));
    }

    [Fact]
    public void Purposes_keep_their_numbers()
    {
        DrawPurpose[] table =
        [
            DrawPurpose.FactorMoves, DrawPurpose.MixingVariable, DrawPurpose.Jumps,
            DrawPurpose.ResidualDays, DrawPurpose.PathSteps, DrawPurpose.PricerPilot, DrawPurpose.NullSeries, DrawPurpose.StepPosition,
        ];
        Assert.Equal(table, Enum.GetValues<DrawPurpose>());
        Assert.Equal([0, 1, 2, 3, 4, 5, 6, 7], table.Select(purpose => (int)purpose));
    }

    // Exact in decimal: (m + 1/2) / 2^52 has at most 53 significant bits.
    private static double FromWord(uint high, uint low) =>
        (double)((decimal)((((ulong)high << 32) | low) >> 12) + 0.5m) / 4503599627370496.0;
}
