namespace RiskWorker.Engine.Pricing.Ageing;

/// <summary>Closes of the past as they stand on one date, for instruments bound at a later one: nothing after it is known, and no split after it is undone.</summary>
internal sealed class KnownCloses(IPastLevels past, DateOnly asOf) : IPastLevels
{
    /// <inheritdoc/>
    public double On(UnderlyingKey underlying, DateOnly date, DateOnly basis) => date > asOf ? double.NaN : past.On(underlying, date, Earlier(basis));

    /// <inheritdoc/>
    public IEnumerable<DateOnly> Dates(DateOnly from, DateOnly to) => past.Dates(from, Earlier(to));

    private DateOnly Earlier(DateOnly date) => date < asOf ? date : asOf;
}
