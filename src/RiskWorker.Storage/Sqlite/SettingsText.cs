using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite;

/// <summary>The settings that figures depend on, every field of them, as the text of a snapshot's part.</summary>
internal static class SettingsText
{
    public static SnapshotLeaf Leaf(RunSettings settings)
    {
        var (simulation, checks) = (settings.Simulation, settings.Checks);
        var text = new CanonicalText();
        ModelText.Write(text, ModelText.Record, settings.Model);
        foreach (var (i, challenger) in settings.Challengers.Index()) ModelText.Write(text, ModelText.Challenger(i), challenger);
        foreach (var rule in settings.Rules) text.Text("rule").Text(rule.Set).Text(rule.Book).Text(rule.ReferenceBook).End();
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
            Model = ModelText.Read(rows, ModelText.Record),
            Challengers = [.. Enumerable.Range(0, int.MaxValue).Select(ModelText.Challenger).TakeWhile(rows.Contains).Select(place => ModelText.Read(rows, place))],
            Rules = [.. rows["rule"].Select(row => new RuleChoice(row.Name(), row.Text(), row.Text()))],
            Measures = [.. rows["measure"].Select(LeafText.Measure).Order()],
            Simulation = Simulation(rows["simulation"].Single(), rows["revaluation"].SingleOrDefault()),
            Checks = Checks(rows["checks"].Single()) with { Severity = ModelText.Sorted(rows["severity"], row => row.Choice<FindingSeverity>()) },
            TimeEffectsIncluded = rows["time-effects"].Single().Name() == "included",
            CurveInterpolation = rows["curves"].SingleOrDefault()?.Choice<CurveInterpolation>() ?? CurveInterpolation.LinearZero, // stands only where it is not the usual one
        };
    }

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
}
