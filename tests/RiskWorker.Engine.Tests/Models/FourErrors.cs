using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>An exact figure against a simulated one, by the interval that stands beside it.</summary>
internal static class FourErrors
{
    // Four standard errors are 2.04 half-widths of a 95% interval; the two ends of a quantile's interval differ, so each side has its own.
    private const double HalfWidths = 4 / 1.959963984540054;

    public static void Hold(double expected, MeasureResult measure)
    {
        var side = expected < measure.Value ? measure.Value - measure.Low!.Value : measure.High!.Value - measure.Value;
        Assert.True(Math.Abs(measure.Value - expected) <= HalfWidths * side,
            $"{measure.Spec}: {measure.Value:r} lies {Math.Abs(measure.Value - expected) / side * 1.96:f1} standard errors from {expected:r}");
        // Wide bounds would hold anything: at these sizes of sample an error is below two per cent.
        Assert.True(side < 0.03 * Math.Abs(expected), $"{measure.Spec}: the interval reaches {side:g3} from {measure.Value:r}");
    }
}
