namespace RiskWorker.Engine.Reductions;

/// <summary>
/// Sums on a fixed binary tree over blocks: a parent is its left child plus its right one, elementwise. Any split of the
/// blocks and any order of merging give the same bits. Holds the maximal aligned subtrees of the blocks added so far, in
/// one array whose places are used again as subtrees merge.
/// </summary>
public sealed class SumTree
{
    private readonly Dictionary<(int Level, int Index), int> _subtrees;
    private readonly Stack<int> _free;
    private readonly int _room;
    private double[] _slab = [];
    private int _width;
    private int _used;

    /// <summary>A tree with room for <paramref name="blocks"/> blocks that do not merge; more are taken, at the cost of an allocation.</summary>
    public SumTree(int blocks = 0) => (_subtrees, _free, _room) = (new(blocks), new(blocks), blocks);

    /// <summary>Forgets every block; the memory stays, and the next block may have another number of sums.</summary>
    internal void Clear()
    {
        _subtrees.Clear();
        _free.Clear();
        (_width, _used) = (0, 0);
    }

    /// <summary>Adds the sums of one block; all blocks have the same number of sums.</summary>
    /// <exception cref="InvalidOperationException">The block, or a subtree that holds it, is there already.</exception>
    public void Add(int block, ReadOnlySpan<double> sums) => Insert(0, block, sums);

    /// <summary>Adds all subtrees of <paramref name="other"/>, which is left as it was.</summary>
    public void Merge(SumTree other)
    {
        foreach (var ((level, index), place) in other._subtrees) Insert(level, index, other.At(place));
    }

    /// <summary>The sums over all blocks: the maximal subtrees added from the right; empty where there is no block.</summary>
    public double[] Total()
    {
        double[]? total = null;
        foreach (var (_, place) in _subtrees.OrderByDescending(s => (long)s.Key.Index << s.Key.Level))
        {
            if (total is null) total = At(place).ToArray();
            else AddTo(total, At(place));
        }
        return total ?? [];
    }

    private Span<double> At(int place) => _slab.AsSpan(place * _width, _width);

    private void Insert(int level, int index, ReadOnlySpan<double> sums)
    {
        var place = Rent(sums);
        while (_subtrees.Remove((level, index ^ 1), out var sibling))
        {
            var (left, right) = (index & 1) == 0 ? (place, sibling) : (sibling, place);
            AddTo(At(right), At(left));
            _free.Push(left);
            (place, level, index) = (right, level + 1, index >> 1);
        }
        if (!_subtrees.TryAdd((level, index), place)) throw new InvalidOperationException($"The sums of blocks {(long)index << level} to {(((long)index + 1) << level) - 1} were added twice.");
    }

    private int Rent(ReadOnlySpan<double> sums)
    {
        if (_width == 0)
        {
            _width = sums.Length;
            var room = _width * Math.Max(_room, 8);
            if (_slab.Length < room) _slab = new double[room];
        }
        if (!_free.TryPop(out var place))
        {
            place = _used++;
            if (_used * _width > _slab.Length) Array.Resize(ref _slab, 2 * _slab.Length);
        }
        sums.CopyTo(At(place));
        return place;
    }

    // The right operand is overwritten with left plus right.
    private static void AddTo(Span<double> right, ReadOnlySpan<double> left)
    {
        for (var i = 0; i < right.Length; i++) right[i] = left[i] + right[i];
    }
}
