using RiskWorker.Engine.Pricing.Ageing;
using RiskWorker.Engine.Pricing.Curves;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Plans;

/// <summary>Gathers rates that are fixed inside a horizon, and the amounts that grow by them and are paid after it.</summary>
internal sealed class FixingBuilder(double[] levels)
{
    private readonly SortedDictionary<(int Day, LinearForm Growth), SortedDictionary<LinearForm, SortedDictionary<int, double>>> _amounts = [];

    /// <summary>Number of fixings.</summary>
    public int Count => _amounts.Count;

    /// <summary>What is valued at the horizon's close.</summary>
    public IReadOnlyList<FixedBatch> Fixed =>
    [
        .. _amounts.Index().SelectMany(f => f.Item.Value.Select(d => new FixedBatch(f.Index, d.Key,
            Exponential.Of(-(f.Item.Key.Growth.At(levels) + d.Key.At(levels))), [.. d.Value.Select(a => new LinearHolding(a.Key, a.Value))]))),
    ];

    /// <summary>The rates fixed at the close of <paramref name="day"/>.</summary>
    public IReadOnlyList<RateFixing> FixedOn(int day) => [.. _amounts.Index().Where(f => f.Item.Key.Day == day).Select(f => new RateFixing(f.Index, f.Item.Key.Growth))];

    /// <summary>Adds a rate that is fixed inside and paid later, or known today; returns what it is worth at unmoved levels.</summary>
    /// <param name="cell">The cell.</param>
    /// <param name="quantity">Units held.</param>
    /// <param name="reset">The rate.</param>
    /// <param name="last">The horizon's close, which takes what is known.</param>
    public double Add(int cell, double quantity, in RateReset reset, CloseBuilder last)
    {
        var amount = quantity * reset.Amount;
        if (reset.Day == 0)
        {
            var grown = amount * Exponential.Of(-reset.Growth.At(levels));
            return reset.Discount is null ? grown : last.Add(cell, grown, reset.Discount);
        }
        var key = (reset.Day, reset.Growth);
        if (!_amounts.TryGetValue(key, out var byDiscount)) _amounts[key] = byDiscount = [];
        if (!byDiscount.TryGetValue(reset.Discount!, out var byCell)) byDiscount[reset.Discount!] = byCell = [];
        byCell[cell] = byCell.GetValueOrDefault(cell) + amount;
        return amount * Exponential.Of(-(reset.Growth.At(levels) + reset.Discount!.At(levels)));
    }
}
