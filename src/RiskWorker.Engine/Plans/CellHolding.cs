using RiskWorker.Engine.Pricing;

namespace RiskWorker.Engine.Plans;

/// <summary>What a cell holds of one instrument.</summary>
/// <param name="Cell">The cell.</param>
/// <param name="Instrument">The instrument's name.</param>
/// <param name="Bound">The instrument as of today.</param>
/// <param name="Quantity">Units held.</param>
/// <param name="Value">Value today in the cell's currency.</param>
internal readonly record struct CellHolding(int Cell, string Instrument, BoundInstrument Bound, double Quantity, double Value);
