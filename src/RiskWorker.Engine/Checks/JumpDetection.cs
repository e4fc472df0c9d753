namespace RiskWorker.Engine.Checks;

/// <summary>Finds moves that are large against all the others.</summary>
internal static class JumpDetection
{
    /// <summary>
    /// The shocks whose size exceeds <paramref name="sigmas"/> root mean squares of the other shocks (zero mean, divisor n, as the
    /// covariance is estimated), with their multiple; NaN is no shock. The others' squares are added from both ends, so that a huge
    /// shock cancels nothing.
    /// </summary>
    public static IEnumerable<(int Row, double Sigmas)> Of(ReadOnlySpan<double> shocks, double sigmas)
    {
        var after = new double[shocks.Length + 1];
        var count = 0;
        for (var i = shocks.Length - 1; i >= 0; i--)
        {
            var isShock = !double.IsNaN(shocks[i]);
            after[i] = after[i + 1] + (isShock ? shocks[i] * shocks[i] : 0);
            if (isShock) count++;
        }
        var found = new List<(int, double)>();
        if (count < 2) return found;
        var before = 0.0;
        for (var i = 0; i < shocks.Length; i++)
        {
            if (double.IsNaN(shocks[i])) continue;
            var others = Math.Sqrt((before + after[i + 1]) / (count - 1));
            if (Math.Abs(shocks[i]) > sigmas * others) found.Add((i, Math.Abs(shocks[i]) / others));
            before += shocks[i] * shocks[i];
        }
        return found;
    }
}
