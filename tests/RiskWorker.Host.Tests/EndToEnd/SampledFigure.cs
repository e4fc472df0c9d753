using System.Text.Json;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>A measure as a run reports it, with the standard error that its interval stands for.</summary>
internal sealed record SampledFigure(double Value, double Error)
{
    /// <summary>The measure of a book in a <c>results.json</c>.</summary>
    public static SampledFigure Of(JsonElement results, string book, string measure)
    {
        var node = results.GetProperty("nodes").EnumerateArray().Single(n => n.GetProperty("book").GetString() == book);
        var found = node.GetProperty("measures").EnumerateArray().Single(m => m.GetProperty("measure").GetString() == measure);
        double Number(string name) => found.GetProperty(name).GetDouble();
        // An interval at level c is the value plus and minus the standard error times the (1 + c)/2 quantile of the normal distribution.
        return new(Number("value"), (Number("high") - Number("low")) / 2 / InverseNormal.Of((1 + Number("level")) / 2));
    }

    /// <summary>Fails where <paramref name="expected"/> lies beyond four standard errors of the difference.</summary>
    /// <param name="expected">The same figure from other draws.</param>
    /// <param name="ratio">Scenarios here over scenarios there: variances of two samples add.</param>
    /// <param name="what">What a message calls it.</param>
    public void AssertAgrees(double expected, double ratio, string what)
    {
        var error = Error * Math.Sqrt(1 + ratio);
        Assert.True(error < 0.005 * expected, $"{what}: a standard error of {error:N0} would let anything pass.");
        Assert.True(Math.Abs(Value - expected) < 4 * error, $"{what}: {Value:N0} against {expected:N0}, {(Value - expected) / error:N1} standard errors apart.");
    }
}
