using RiskWorker.Domain.Instruments;

namespace RiskWorker.Engine.Pricing;

/// <summary>How a kind of instrument is valued, and where that should not be trusted.</summary>
/// <param name="Kind">The kind as reports and the README name it: the feed's word, and the term that tells two methods apart.</param>
/// <param name="Model">What is assumed of the market.</param>
/// <param name="Method">How the value is computed, with the error measured where one was.</param>
/// <param name="Source">Paper or rule that the formula is from.</param>
/// <param name="Caution">Where it should not be trusted: clauses separated by semicolons.</param>
/// <param name="Covers">Whether it speaks of an instrument.</param>
public sealed record PricingMethod(string Kind, string Model, string Method, string Source, string Caution, Func<Instrument, bool> Covers);
