namespace RiskWorker.Engine.Pricing;

/// <summary>Closing levels of the past, for options that look back; in the terms of the valuation date, splits and rolls undone.</summary>
public interface IPastLevels
{
    /// <summary>The close of <paramref name="underlying"/> on <paramref name="date"/>, in the terms of <paramref name="basis"/>; NaN where it was not observed on that very date.</summary>
    double On(UnderlyingKey underlying, DateOnly date, DateOnly basis);

    /// <summary>Every date observed from <paramref name="from"/> to <paramref name="to"/>, both included, ascending.</summary>
    IEnumerable<DateOnly> Dates(DateOnly from, DateOnly to);
}
