namespace RiskWorker.Engine.Pricing.Curves;

/// <summary>The factors of one curve with their tenors in years, ascending and distinct; at least one.</summary>
internal sealed class TenorPoints(double[] tenors, int[] places)
{
    /// <summary>The two points around <paramref name="years"/> and how far it is from the first to the second, in [0, 1]; beyond an end, the end twice and 0.</summary>
    public (Point Before, Point After, double Weight) Around(double years)
    {
        if (!(years >= 0 && double.IsFinite(years))) throw new ArgumentOutOfRangeException(nameof(years), years, "A time on a curve is a number of years from 0 on.");
        var next = Array.BinarySearch(tenors, years);
        if (next >= 0) return End(next);
        next = ~next;
        if (next == 0) return End(0);
        if (next == tenors.Length) return End(next - 1);
        return (At(next - 1), At(next), (years - tenors[next - 1]) / (tenors[next] - tenors[next - 1]));
    }

    private (Point, Point, double) End(int index) => (At(index), At(index), 0);

    private Point At(int index) => new(tenors[index], places[index]);

    /// <summary>One factor of the curve.</summary>
    public readonly record struct Point(double Tenor, int Place);
}
