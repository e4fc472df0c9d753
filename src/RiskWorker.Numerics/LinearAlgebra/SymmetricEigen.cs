using System.Numerics;
using MathNet.Numerics.Providers.LinearAlgebra;

namespace RiskWorker.Numerics.LinearAlgebra;

/// <summary>
/// Eigenvalues, ascending, and eigenvectors of a symmetric matrix by MathNet's managed provider (Householder reduction and QL,
/// one thread, square roots but no exponential or logarithm). The provider is called on an instance of its own: the process-wide
/// MathNet control is neither read nor changed.
/// </summary>
internal sealed class SymmetricEigen
{
    private static readonly ManagedLinearAlgebraProvider Provider = new();

    private SymmetricEigen(double[] values, double[] vectors)
    {
        Values = values;
        Vectors = vectors;
    }

    /// <summary>Eigenvalues, ascending.</summary>
    public double[] Values { get; }

    /// <summary>Row k holds the unit eigenvector of value k: n × n, row-major.</summary>
    public double[] Vectors { get; }

    /// <summary>Decomposes a symmetric n × n matrix, which it leaves unchanged.</summary>
    public static SymmetricEigen Of(double[] matrix, int n)
    {
        var vectors = new double[n * n]; // column-major, so that each eigenvector is contiguous
        var values = new Complex[n];
        Provider.EigenDecomp(isSymmetric: true, n, (double[])matrix.Clone(), vectors, values, new double[n * n]);
        return new([.. values.Select(v => v.Real)], vectors);
    }
}
