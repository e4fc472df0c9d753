namespace RiskWorker.Domain.Instruments;

/// <summary>A term that cannot be read: which, what stands there, and what was expected.</summary>
public readonly record struct TermFault(string Term, string Found, string Expected);

/// <summary>One row of <c>instruments.csv</c> as text: the terms that are not empty, by column.</summary>
public sealed record InstrumentRow(string Name, string Kind, string Currency, IReadOnlyDictionary<string, string> Terms, string? Issuer = null, double? Lot = null, double? DailyVolume = null);

/// <summary>Turns the text of an instrument's row into a typed <see cref="Instrument"/>, or says every term that is wrong.</summary>
public static class InstrumentReader
{
    /// <summary>Reads <paramref name="row"/>.</summary>
    /// <returns>The instrument and no faults, or null and at least one fault.</returns>
    public static (Instrument? Instrument, IReadOnlyList<TermFault> Faults) Read(InstrumentRow row)
    {
        var terms = new TermReader(row.Terms);
        Instrument? read = row.Kind switch
        {
            InstrumentKinds.Spot => new Spot(terms.Text("factor")) { Name = row.Name, Currency = row.Currency },
            InstrumentKinds.Cash => new Cash { Name = row.Name, Currency = row.Currency },
            InstrumentKinds.Future => new Future(terms.Text("factor")) { Name = row.Name, Currency = row.Currency },
            InstrumentKinds.Forward => new Forward(terms.Underlying(), terms.Positive("strike"), terms.Date("expiry"), terms.Rate("curve"), terms.Rate("carry"), terms.OptionalText("settlement_currency"))
            { Name = row.Name, Currency = row.Currency },
            InstrumentKinds.Option => new Option(terms.Underlying(), terms.Positive("strike"), terms.Date("expiry"),
                terms.Choice<OptionRight>("right"), terms.Choice<ExerciseStyle>("style"), terms.Volatility(), terms.Rate("curve"), terms.Rate("carry"))
            { Name = row.Name, Currency = row.Currency },
            InstrumentKinds.Bond => RateProductReader.Bond(row, terms),
            InstrumentKinds.Floater => RateProductReader.Floater(row, terms),
            InstrumentKinds.Swap => RateProductReader.Swap(row, terms),
            InstrumentKinds.Digital => ExoticReader.Digital(terms, row),
            InstrumentKinds.Barrier => ExoticReader.Barrier(terms, row),
            InstrumentKinds.Asian => ExoticReader.Asian(terms, row),
            InstrumentKinds.Lookback => ExoticReader.Lookback(terms, row),
            _ when InstrumentKinds.TermsByKind.ContainsKey(row.Kind) => new UnmodelledInstrument(row.Kind, row.Terms) { Name = row.Name, Currency = row.Currency },
            _ => null,
        };
        if (read is null) return (null, [new("kind", row.Kind, "one of " + string.Join(", ", InstrumentKinds.TermsByKind.Keys))]);
        var multiplier = terms.Multiplier();
        if (terms.Faults.Count > 0) return (null, terms.Faults);
        return (read with { Multiplier = multiplier, Issuer = row.Issuer, Lot = row.Lot, DailyVolume = row.DailyVolume }, terms.Faults);
    }

    /// <summary>
    /// Reads a row that an earlier version accepted. Where this one finds a term wrong the instrument is kept unmodelled, so that a run
    /// names it instead of failing over all the others.
    /// </summary>
    public static Instrument ReadAccepted(InstrumentRow row)
    {
        var (instrument, faults) = Read(row);
        if (instrument is not null) return instrument;
        var multiplier = new TermReader(row.Terms).Multiplier();
        return new UnmodelledInstrument(row.Kind, row.Terms)
        {
            Name = row.Name,
            Currency = row.Currency,
            Multiplier = multiplier == 0 ? 1 : multiplier,
            Issuer = row.Issuer,
            Lot = row.Lot,
            DailyVolume = row.DailyVolume,
            Fault = Clause(faults),
        };
    }

    private static string Clause(IReadOnlyList<TermFault> faults)
    {
        var (term, found, expected) = faults[0];
        var others = faults.Count == 1 ? "" : $" ({faults.Count - 1} more of its terms at fault)";
        return $"its {term} {(found.Length == 0 ? "is missing" : $"is '{found}'")}, expected {expected}{others}";
    }
}
