using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>
/// Makes tables of numerical prices: polynomials through prices at Chebyshev points of every input that moves (Trefethen, Approximation
/// Theory and Approximation Practice, 2013, ch. 8), split where the value bends.
/// </summary>
/// <remarks>
/// <para>The spot is cut into at most 8 pieces of degree 16 or less. The degree in the deviation is 3, 6 or 12, in rates 2, 4 or 8: the
/// lowest that brings the error between the points below 1e-7 of the spot or half the largest standard error, along each input
/// alone and then, where several move, at 16 points of all. The cap on work is <see cref="MostNodes"/> sets of rates and volatility
/// for the table and as many for its checks. A table that does not reach the tolerance is taken as it is, and says its error.</para>
/// <para>Where rates move through zero an American option has an exercise boundary in some scenarios and none in others; the table
/// then goes across it, and its error is larger.</para>
/// </remarks>
public static class PriceTable
{
    /// <summary>Most sets of rates and volatility under which a table's prices are found.</summary>
    public const int MostNodes = 640;

    private const int CheckPoints = 16;

    private static readonly int[] s_deviationDegrees = [3, 6, 12], s_rateDegrees = [2, 4, 8];

    /// <summary>The table of one option over a box of market points.</summary>
    /// <param name="formula">The option.</param>
    /// <param name="spot0">The level from which log-returns are counted, positive.</param>
    /// <param name="range">The box; deviations below 0 are cut off.</param>
    /// <exception cref="ArgumentOutOfRangeException">The spot is not positive and finite, a range not finite, or that of log-returns empty.</exception>
    /// <exception cref="ArithmeticException">A price in the box is not finite.</exception>
    public static TabulatedFormula Build(NumericFormula formula, double spot0, MarketRange range)
    {
        ArgumentNullException.ThrowIfNull(formula);
        if (!(spot0 > 0) || double.IsInfinity(spot0))
            throw new ArgumentOutOfRangeException(nameof(spot0), spot0, $"spot0 is {spot0}; it must be positive and finite.");
        range = range.Checked();
        var inputs = new MovingInputs(range);
        var sampler = new TableSampler(formula, spot0, inputs);
        // The lowest deviation is the hardest: least smoothed.
        var hardest = new double[inputs.Count];
        if (inputs.Count > 0 && inputs.IsDeviation(0)) hardest[0] = -1;
        var exercise = formula.Exercise;
        TableSection SectionOf(int[] moved, int[] degrees) => new(sampler, range.X, exercise, hardest, moved, degrees);
        // A table that cannot begin at the boundary everywhere begins at it nowhere; its pieces must suit where the boundary lies deepest.
        if (exercise is not null && SectionOf(AllOf(inputs), [.. AllOf(inputs).Select(d => DegreesOf(inputs, d)[0])]) is { Coordinate.Exercise: null } whole)
        {
            exercise = null;
            hardest = whole.Nodes.MinBy(node => sampler.Boundary(node) is { } boundary ? Math.Abs(boundary - range.X.Centre) : double.PositiveInfinity) ?? hardest;
        }

        var spine = SectionOf([], []);
        var layout = new PieceLayout(sampler, spine, KinkOf(formula, spot0, range.X, spine.Coordinate));
        if (inputs.Count == 0) return new(formula, spot0, range, spine.Coordinate, layout.Pieces, layout.Error, sampler.StandardError);

        PieceShape[] shapes = [.. layout.Pieces.Select(piece => piece.Shape)];
        var steps = new int[inputs.Count];
        var (section, error) = (spine, double.PositiveInfinity);
        for (var d = 0; d < steps.Length; d++)
        {
            for (; ; steps[d]++)
            {
                var degree = DegreesOf(inputs, d)[steps[d]];
                section = SectionOf([d], [degree]);
                section.Fit(shapes);
                error = 0;
                foreach (var point in TableSection.Halfway(degree))
                {
                    double[] z = [.. hardest];
                    z[d] = point;
                    error = Math.Max(error, section.ErrorAt(z));
                }
                if (error <= sampler.Tolerance || steps[d] == 2) break;
            }
        }
        if (inputs.Count > 1) (section, error) = Together(inputs, sampler, steps, shapes, SectionOf);
        return new(formula, spot0, range, section.Coordinate, section.Pieces, error, sampler.StandardError);
    }

    /// <summary>The table over all inputs: degrees are raised together until the error is good enough or the cap on work is reached.</summary>
    private static (TableSection Section, double Error) Together(
        MovingInputs inputs, TableSampler sampler, int[] steps, PieceShape[] shapes, Func<int[], int[], TableSection> sectionOf)
    {
        var all = AllOf(inputs);
        int[] Degrees() => [.. all.Select(d => DegreesOf(inputs, d)[steps[d]])];
        while (NodesOf(Degrees()) > MostNodes) steps[Array.IndexOf(steps, steps.Max())]--;
        for (; ; )
        {
            var section = sectionOf(all, Degrees());
            section.Fit(shapes);
            var error = 0.0;
            for (var point = 1; point <= CheckPoints; point++) error = Math.Max(error, section.ErrorAt(Scattered(point, inputs.Count)));
            int[] raised = [.. steps.Select(step => Math.Min(step + 1, 2))];
            if (error <= sampler.Tolerance || raised.SequenceEqual(steps) || NodesOf([.. all.Select(d => DegreesOf(inputs, d)[raised[d]])]) > MostNodes)
                return (section, error);
            steps = raised;
            shapes = [.. shapes.Select(shape => shape with { Degree = PieceLayout.MostDegree })];
        }
    }

    private static int[] AllOf(MovingInputs inputs) => [.. Enumerable.Range(0, inputs.Count)];

    private static int NodesOf(int[] degrees) => degrees.Aggregate(1, (product, degree) => product * (degree + 1));

    private static int[] DegreesOf(MovingInputs inputs, int input) => inputs.IsDeviation(input) ? s_deviationDegrees : s_rateDegrees;

    // Multiples of three irrational numbers without their whole parts fill the cube evenly (Weyl 1916).
    private static double[] Scattered(int point, int count)
    {
        double[] steps = [0.8191725133961645, 0.6710436067037893, 0.5497004779019703];
        return [.. steps.Take(count).Select(step => Math.FusedMultiplyAdd(2, (point * step) - Math.Floor(point * step), -1))];
    }

    private static double? KinkOf(NumericFormula formula, double spot0, InputRange x, SpotCoordinate coordinate)
    {
        if (formula.Kink is not { } spot || !(spot > 0)) return null;
        var at = Logarithm.Of(spot / spot0);
        var u = coordinate.Of(at, []);
        // A sliver at an end is not worth a piece of its own.
        return at > x.Low && at < x.High && Math.Abs(u) < 1 - 1e-6 ? u : null;
    }
}
