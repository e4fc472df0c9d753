using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite;

/// <summary>A model's settings as rows of a snapshot's part. A row for what only some kinds use stands only where it is not the usual.</summary>
internal static class ModelText
{
    /// <summary>Where the model of record stands.</summary>
    public const string Record = "model";

    /// <summary>Where challenger number <paramref name="i"/> stands.</summary>
    public static string Challenger(int i) => $"challenger/{i}";

    public static void Write(CanonicalText text, string place, ModelSettings model)
    {
        text.Text(place).Text(model.Name).Text(ModelKinds.NameOf(model.Kind)).Text(Spelling.Of(model.Covariance)).Number(model.Lambda).Value<int>(model.Window).Text(Spelling.Of(model.Drift)).End();
        foreach (var (factor, drift) in model.Drifts) text.Text(DriftsOf(place)).Text(factor).Number(drift).End();
        if (model.MissingDays != MissingDays.Complete) text.Text(place + "/missing").Text(Spelling.Of(model.MissingDays)).End();
        if (model.Ageing != AgeingKind.None) text.Text(place + "/ageing").Text(Spelling.Of(model.Ageing)).End();
        switch (model.Kind)
        {
            case ModelKind.StudentT:
                text.Text(place + "/student").Number(model.DegreesOfFreedom).Text(Spelling.Of(model.Margins)).End();
                break;
            case ModelKind.Historical:
                text.Text(place + "/historical").Number(model.AgeWeight).End();
                break;
            case ModelKind.FilteredHistorical:
                text.Text(place + "/filtered").Text(Spelling.Of(model.Volatility)).End();
                break;
            case ModelKind.JumpDiffusion:
                Write(text, place, model.Jumps);
                break;
            case ModelKind.Stressed:
                text.Text(place + "/stressed").Value<int>(model.Span).End();
                Write(text, place + "/of", model.Stressed!);
                break;
        }
    }

    public static ModelSettings Read(ILookup<string, CanonicalRow> rows, string place)
    {
        var row = rows[place].Single();
        var model = new ModelSettings
        {
            Name = row.Name(),
            Kind = ModelKinds.ByName[row.Name()],
            Covariance = row.Choice<CovarianceEstimator>(),
            Lambda = row.Amount(),
            Window = row.Whole<int>(),
            Drift = row.Choice<DriftKind>(),
            Drifts = Sorted(rows[DriftsOf(place)], drift => drift.Amount()),
            MissingDays = rows[place + "/missing"].SingleOrDefault()?.Choice<MissingDays>() ?? MissingDays.Complete,
            Ageing = rows[place + "/ageing"].SingleOrDefault()?.Choice<AgeingKind>() ?? AgeingKind.None,
        };
        return model.Kind switch
        {
            ModelKind.StudentT when rows[place + "/student"].Single() is var law => model with { DegreesOfFreedom = law.Number(), Margins = law.Choice<StudentMargins>() },
            ModelKind.Historical => model with { AgeWeight = rows[place + "/historical"].Single().Number() },
            ModelKind.FilteredHistorical => model with { Volatility = rows[place + "/filtered"].Single().Choice<VolatilityFilter>() },
            ModelKind.JumpDiffusion => model with { Jumps = Jumps(rows, place) },
            ModelKind.Stressed => model with { Span = rows[place + "/stressed"].Single().Whole<int>(), Stressed = Read(rows, place + "/of") },
            _ => model,
        };
    }

    public static SortedDictionary<string, T> Sorted<T>(IEnumerable<CanonicalRow> rows, Func<CanonicalRow, T> value)
    {
        var sorted = new SortedDictionary<string, T>(StringComparer.Ordinal);
        foreach (var row in rows) sorted.Add(row.Name(), value(row));
        return sorted;
    }

    // Older texts know no other model's drifts.
    private static string DriftsOf(string place) => place == Record ? "drift" : place + "/drift";

    private static void Write(CanonicalText text, string place, JumpSettings jumps)
    {
        text.Text(place + "/jumps").Number(jumps.Threshold).Number(jumps.CommonPerYear).End();
        foreach (var (factor, size) in jumps.Common) text.Text(place + "/jumps/common").Text(factor).Number(size.Mean).Number(size.Deviation).End();
        foreach (var (factor, own) in jumps.Own) text.Text(place + "/jumps/own").Text(factor).Number(own.PerYear).Number(own.Size.Mean).Number(own.Size.Deviation).End();
    }

    private static JumpSettings Jumps(ILookup<string, CanonicalRow> rows, string place)
    {
        var row = rows[place + "/jumps"].Single();
        return new()
        {
            Threshold = row.Amount(),
            CommonPerYear = row.Number(),
            Common = Sorted(rows[place + "/jumps/common"], Size),
            Own = Sorted(rows[place + "/jumps/own"], own => new OwnJumps(own.Amount(), Size(own))),
        };
    }

    private static JumpSize Size(CanonicalRow row) => new(row.Amount(), row.Amount());
}
