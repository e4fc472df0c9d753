using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite;

/// <summary>The settings that figures depend on, every field of them, as the text of a snapshot's part.</summary>
internal static class SettingsText
{
    public static SnapshotLeaf Leaf(RunSettings settings)
    {
        var (model, simulation, checks) = (settings.Model, settings.Simulation, settings.Checks);
        var text = new CanonicalText();
        text.Text("model").Text(model.Name).Text(model.Kind).Text(Spelling.Of(model.Covariance)).Number(model.Lambda).Value<int>(model.Window).Text(Spelling.Of(model.Drift)).End();
        foreach (var (factor, drift) in model.Drifts) text.Text("drift").Text(factor).Number(drift).End();
        if (model.Ageing != AgeingKind.None) text.Text("ageing").Text(Spelling.Of(model.Ageing)).End();
        foreach (var spec in settings.Measures) text.Text("measure").Text(Spelling.Of(spec.Kind)).Value<decimal>(spec.Confidence.Level).Value<int>(spec.Horizon.Days).End();
        text.Text("simulation").Value<int>(simulation.Scenarios).Value<ulong>(simulation.Seed).Value<int>(simulation.Looks).Value<int>(simulation.Cap).Number(simulation.Precision).End();
        if (simulation is not { Revaluation: RevaluationKind.Surface, SurfaceError: 1e-7, ExactTail: true })
            text.Text("revaluation").Text(Spelling.Of(simulation.Revaluation)).Number(simulation.SurfaceError).Text(simulation.ExactTail ? "exact" : "surface").End();
        text.Text("checks").Value<int>(checks.StaleDays).Number(checks.JumpSigmas).Value<int>(checks.MinimumHistory).Number(checks.ValueTolerance).Number(checks.GrossChange).End();
        foreach (var (code, severity) in checks.Severity) text.Text("severity").Text(code).Text(Spelling.Of(severity)).End();
        if (settings.CurveInterpolation != CurveInterpolation.LinearZero) text.Text("curves").Text(Spelling.Of(settings.CurveInterpolation)).End();
        text.Text("time-effects").Text(settings.TimeEffectsIncluded ? "included" : "excluded").End();
        return text.Leaf("settings");
    }

    /// <summary>Reads the text of <see cref="Leaf"/>; measures come back in their order, whichever they were written in.</summary>
    public static RunSettings Read(string text)
    {
        var rows = CanonicalRow.Of(text).ToLookup(row => row.Name(), StringComparer.Ordinal);
        return new()
        {
            Model = Model(rows["model"].Single()) with
            {
                Drifts = Sorted(rows["drift"], row => row.Amount()),
                Ageing = rows["ageing"].SingleOrDefault()?.Choice<AgeingKind>() ?? AgeingKind.None, // stands only where it is not the usual one
            },
            Measures = [.. rows["measure"].Select(LeafText.Measure).Order()],
            Simulation = Simulation(rows["simulation"].Single(), rows["revaluation"].SingleOrDefault()),
            Checks = Checks(rows["checks"].Single()) with { Severity = Sorted(rows["severity"], row => row.Choice<FindingSeverity>()) },
            TimeEffectsIncluded = rows["time-effects"].Single().Name() == "included",
            CurveInterpolation = rows["curves"].SingleOrDefault()?.Choice<CurveInterpolation>() ?? CurveInterpolation.LinearZero, // stands only where it is not the usual one
        };
    }

    private static ModelSettings Model(CanonicalRow row) => new()
    {
        Name = row.Name(),
        Kind = row.Name(),
        Covariance = row.Choice<CovarianceEstimator>(),
        Lambda = row.Amount(),
        Window = row.Whole<int>(),
        Drift = row.Choice<DriftKind>(),
    };

    // The row on revaluation stands only where it is not the usual one.
    private static SimulationSettings Simulation(CanonicalRow row, CanonicalRow? revaluation)
    {
        var settings = new SimulationSettings
        {
            Scenarios = row.Whole<int>(),
            Seed = row.Whole<ulong>(),
            Looks = row.Whole<int>(),
            Cap = row.Whole<int>(),
            Precision = row.Number(),
        };
        if (revaluation is null) return settings;
        return settings with { Revaluation = revaluation.Choice<RevaluationKind>(), SurfaceError = revaluation.Amount(), ExactTail = revaluation.Name() == "exact" };
    }

    private static CheckSettings Checks(CanonicalRow row) => new()
    {
        StaleDays = row.Whole<int>(),
        JumpSigmas = row.Amount(),
        MinimumHistory = row.Whole<int>(),
        ValueTolerance = row.Amount(),
        GrossChange = row.Amount(),
    };

    private static SortedDictionary<string, T> Sorted<T>(IEnumerable<CanonicalRow> rows, Func<CanonicalRow, T> value)
    {
        var sorted = new SortedDictionary<string, T>(StringComparer.Ordinal);
        foreach (var row in rows) sorted.Add(row.Name(), value(row));
        return sorted;
    }
}
