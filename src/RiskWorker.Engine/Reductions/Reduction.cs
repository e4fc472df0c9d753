using RiskWorker.Engine.Simulation;

namespace RiskWorker.Engine.Reductions;

/// <summary>
/// What is kept of the losses of many blocks. Records merge in any order and any grouping to the same answer, so blocks
/// may be computed anywhere.
/// </summary>
/// <typeparam name="TRecord">The record kept.</typeparam>
public abstract class Reduction<TRecord>
{
    /// <summary>
    /// For each series the loss from which on losses must be those of full revaluation, to the last bit; below it a value by surface will do.
    /// Null where every loss must be.
    /// </summary>
    public virtual double[]? ExactFrom => null;

    /// <summary>A record of no blocks, with room for about <paramref name="blocks"/> of them, so that adding them allocates nothing.</summary>
    public abstract TRecord Empty(int blocks = 0);

    /// <summary>Adds one block to <paramref name="record"/>.</summary>
    public abstract void Accumulate(TRecord record, in LossBlock block);

    /// <summary>Adds the blocks of <paramref name="from"/>, which shares none with <paramref name="record"/>.</summary>
    public abstract void Merge(TRecord record, TRecord from);
}
