namespace RiskWorker.Engine.Reductions;

/// <summary>
/// Sums on a fixed binary tree over blocks: a parent is its left child plus its right one, elementwise. Any split of the
/// blocks and any order of merging give the same bits. Holds the maximal aligned subtrees of the blocks added so far.
/// </summary>
public sealed class SumTree
{
    private readonly Dictionary<(int Level, int Index), double[]> _subtrees = [];

    /// <summary>Adds the sums of one block. The array is kept and may be changed.</summary>
    /// <exception cref="InvalidOperationException">The block, or a subtree that holds it, is there already.</exception>
    public void Add(int block, double[] sums) => Insert(0, block, sums);

    /// <summary>Adds all subtrees of <paramref name="other"/>, which is left as it was.</summary>
    public void Merge(SumTree other)
    {
        foreach (var ((level, index), sums) in other._subtrees) Insert(level, index, (double[])sums.Clone());
    }

    /// <summary>The sums over all blocks: the maximal subtrees added from the right; empty where there is no block.</summary>
    public double[] Total()
    {
        double[]? total = null;
        foreach (var ((_, _), sums) in _subtrees.OrderByDescending(s => (long)s.Key.Index << s.Key.Level))
            total = total is null ? (double[])sums.Clone() : Sum(sums, total);
        return total ?? [];
    }

    private void Insert(int level, int index, double[] sums)
    {
        while (_subtrees.Remove((level, index ^ 1), out var sibling))
        {
            sums = (index & 1) == 0 ? Sum(sums, sibling) : Sum(sibling, sums);
            (level, index) = (level + 1, index >> 1);
        }
        if (!_subtrees.TryAdd((level, index), sums)) throw new InvalidOperationException($"The sums of blocks {(long)index << level} to {(((long)index + 1) << level) - 1} were added twice.");
    }

    // The result overwrites the right operand, which nobody else holds.
    private static double[] Sum(double[] left, double[] right)
    {
        for (var i = 0; i < right.Length; i++) right[i] = left[i] + right[i];
        return right;
    }
}
