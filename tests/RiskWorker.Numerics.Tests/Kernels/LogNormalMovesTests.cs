using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class LogNormalMovesTests
{
    [Fact]
    public void Every_length_equals_the_scalar_form()
    {
        for (int length = 0; length <= 257; length++)
        {
            double[] z = new SeededNumbers(51).Between(-9, 9, length + 3);
            ReadOnlySpan<double> source = z.AsSpan(3);
            var x = new GuardedBuffer<double>(length, -1.5, 1);
            var spots = new GuardedBuffer<double>(length, -1.5, 2);
            var levels = new GuardedBuffer<double>(length, -1.5, 3);
            LogNormalMoves.LogReturns(source, 0.0173, -0.00015, x.Span);
            LogNormalMoves.Spots(x.Span, 87.5, spots.Span);
            LogNormalMoves.Levels(source, 0.0006, 0.00001, 0.031, levels.Span);
            for (int s = 0; s < length; s++)
            {
                BitAssert.Equal(LogNormalMoves.LogReturn(source[s], 0.0173, -0.00015), x.Span[s]);
                BitAssert.Equal(LogNormalMoves.Spot(x.Span[s], 87.5), spots.Span[s]);
                BitAssert.Equal(LogNormalMoves.Level(source[s], 0.0006, 0.00001, 0.031), levels.Span[s]);
            }

            x.AssertIntact();
            spots.AssertIntact();
            levels.AssertIntact();
        }
    }

    [Fact]
    public void LogReturn_rounds_once()
    {
        // (1 + 2^-52)(1 - 2^-52) - 1 = -2^-104 exactly; with the product rounded first it would be 0.
        Assert.Equal(-Math.ScaleB(1, -104), LogNormalMoves.LogReturn(1 + Math.ScaleB(1, -52), 1 - Math.ScaleB(1, -52), -1));
    }

    [Fact]
    public void Spots_no_move_is_the_level_today()
    {
        double[] spots = new double[11];
        LogNormalMoves.Spots(new double[11], 123.456, spots);
        Assert.All(spots, spot => BitAssert.Equal(123.456, spot));
    }

    [Fact]
    public void Faulty_spans_are_refused()
    {
        double[] memory = new double[20];
        Assert.Throws<ArgumentException>(() => LogNormalMoves.Spots(memory.AsSpan(0, 8), 1, memory.AsSpan(10, 9)));
        Assert.Throws<ArgumentException>(() => LogNormalMoves.LogReturns(memory.AsSpan(0, 8), 1, 0, memory.AsSpan(1, 8)));
        Assert.Throws<ArgumentException>(() => LogNormalMoves.Levels(memory.AsSpan(0, 8), 1, 0, 1, memory.AsSpan(1, 8)));
    }
}
