using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Options;

/// <summary>
/// Kim's integral equation (1990) for the exercise boundary of a put of strike 1, solved by collocation and fixed-point
/// iteration (Andersen, Lake and Offengenden 2016).
/// </summary>
/// <remarks>
/// With time left τ, B(τ) = N/D in two forms with one solution. In probabilities N = e^(-rτ) Φ(d₋(τ, B(τ))) + r ∫ e^(-r(τ-u))
/// Φ(d₋(τ-u, B(τ)/B(u))) du over [0, τ], D the same with the carry yield for r and d₊ for d₋: it settles wherever there is one
/// boundary, in 15 to 70 steps. In densities, the derivatives of both sides by the spot: ten steps, but no rest where the
/// drift (r - q)√T outweighs the volatility; it is tried first below half of it. The unknown is y = ln(B/B(0)), whose square
/// is close to a polynomial in √τ; both stop when no y moves by more than 1e-9, to which a value answers in second order.
/// </remarks>
internal sealed class ExerciseEquation
{
    private const int MostSteps = 200;
    private const int MostStepsInDensities = 25;
    private const double MostDriftInDensities = 0.5;
    private const double Tolerance = 1e-9;

    private readonly ExerciseGrid grid = ExerciseGrid.OfEquation;
    private readonly ExerciseTerms terms;
    private readonly double volatility;
    private readonly double rate;
    private readonly double carryYield;
    private readonly double rootYears;
    private readonly double logStart;
    private readonly double[] y = new double[ExerciseGrid.Nodes];
    private readonly double[] lower = new double[ExerciseGrid.OfEquation.Back.Length];
    private readonly double[] upper = new double[ExerciseGrid.OfEquation.Back.Length];
    private readonly double[] density = new double[ExerciseGrid.OfEquation.Back.Length];

    public ExerciseEquation(double years, double volatility, double rate, double carryYield, double logStart)
    {
        (this.volatility, this.rate, this.carryYield, this.logStart) = (volatility, rate, carryYield, logStart);
        rootYears = Math.Sqrt(years);
        terms = new ExerciseTerms(grid, years, volatility, rate, carryYield);
        bool isGentle = (rate - carryYield) * rootYears < MostDriftInDensities * volatility;
        IsSolved = (isGentle && Settles(inDensities: true, MostStepsInDensities)) || Settles(inDensities: false, MostSteps);
    }

    /// <summary>Whether the iteration settled; it does wherever the volatility is not lost beside the drift, 1 in 10^5.</summary>
    public bool IsSolved { get; }

    /// <summary>ln(B/B(0)) at the nodes, the whole life first.</summary>
    public ReadOnlySpan<double> Logarithms => y;

    /// <summary>ln(B/B(0)) at every point of a grid: minus the root of the polynomial through the squares.</summary>
    public void Interpolate(ExerciseGrid to, double[] at)
    {
        Span<double> squares = stackalloc double[ExerciseGrid.Nodes];
        for (int k = 0; k < squares.Length; k++)
            squares[k] = y[k] * y[k];
        to.Interpolate(squares, at);
        for (int j = 0; j < at.Length; j++)
            at[j] = -Math.Sqrt(Math.Max(at[j], 0.0));
    }

    private bool Settles(bool inDensities, int most)
    {
        for (int i = 0; i < y.Length; i++)
            y[i] = -0.5 * volatility * rootYears * grid.RootTime[i];
        for (int step = 0; step < most; step++)
        {
            double move = Step(inDensities);
            if (move <= Tolerance)
                return true;
            if (double.IsNaN(move))
                return false;
        }

        return false;
    }

    /// <summary>One step of the iteration; the largest move of any y.</summary>
    private double Step(bool inDensities)
    {
        Interpolate(grid, upper);
        for (int i = 0, at = 0; i < y.Length; i++)
        {
            for (int end = at + grid.Points; at < end; at++)
            {
                lower[at] = Math.FusedMultiplyAdd(y[i] - upper[at], terms.Inverse[at], terms.Drift[at]);
                upper[at] = lower[at] + terms.Deviation[at];
            }
        }

        if (inDensities)
            NormalDensity.Of(upper, density);
        NormalCdf.Of(upper, upper);
        if (inDensities)
            NormalDensity.Of(lower, lower);
        else
            NormalCdf.Of(lower, lower);
        double largest = 0.0;
        for (int i = 0; i < y.Length; i++)
        {
            double next = Math.Min((inDensities ? LogRatioOfDensities(i) : LogRatioOfProbabilities(i)) - logStart, 0.0);
            largest = Math.Max(largest, Math.Abs(next - y[i]));
            y[i] = next;
        }

        return largest;
    }

    private double LogRatioOfProbabilities(int i)
    {
        (double time, double deviation, double d) = AtNode(i);
        double top = Exponential.Of(-rate * time) * NormalCdf.Of(d - (0.5 * deviation));
        double bottom = Exponential.Of(-carryYield * time) * NormalCdf.Of(d + (0.5 * deviation));
        for (int at = i * grid.Points; at < (i + 1) * grid.Points; at++)
        {
            top = Math.FusedMultiplyAdd(terms.Interest[at], lower[at], top);
            bottom = Math.FusedMultiplyAdd(terms.Yield[at], upper[at], bottom);
        }

        return Logarithm.Of(top / bottom);
    }

    private double LogRatioOfDensities(int i)
    {
        (double time, double deviation, double d) = AtNode(i);
        double above = d + (0.5 * deviation);
        double top = Exponential.Of(-rate * time) * NormalDensity.Of(d - (0.5 * deviation)) / deviation;
        double bottom = Exponential.Of(-carryYield * time) * ((NormalDensity.Of(above) / deviation) + NormalCdf.Of(above));
        for (int at = i * grid.Points; at < (i + 1) * grid.Points; at++)
        {
            top = Math.FusedMultiplyAdd(terms.Interest[at] * terms.Inverse[at], lower[at], top);
            double both = Math.FusedMultiplyAdd(terms.Inverse[at], density[at], upper[at]);
            bottom = Math.FusedMultiplyAdd(terms.Yield[at], both, bottom);
        }

        return Logarithm.Of(top / bottom);
    }

    /// <summary>τ, v√τ and (d₋ + d₊)/2 of a node's own boundary.</summary>
    private (double Time, double Deviation, double D) AtNode(int i)
    {
        double root = rootYears * grid.RootTime[i], deviation = volatility * root;
        return (root * root, deviation, Math.FusedMultiplyAdd(rate - carryYield, root * root, y[i] + logStart) / deviation);
    }
}
