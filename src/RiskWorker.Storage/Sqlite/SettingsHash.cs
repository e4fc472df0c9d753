using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite;

/// <summary>The hash of the settings that figures depend on: part of every snapshot.</summary>
public static class SettingsHash
{
    /// <summary>SHA-256 over every field of <paramref name="settings"/>, as 64 lower-case hex digits.</summary>
    public static string Of(RunSettings settings)
    {
        ArgumentNullException.ThrowIfNull(settings);
        var (model, simulation, checks) = (settings.Model, settings.Simulation, settings.Checks);
        var text = new CanonicalText();
        text.Text("model").Text(model.Name).Text(model.Kind).Text(Spelling.Of(model.Covariance)).Number(model.Lambda).Value<int>(model.Window).Text(Spelling.Of(model.Drift)).End();
        foreach (var (factor, drift) in model.Drifts) text.Text("drift").Text(factor).Number(drift).End();
        foreach (var spec in settings.Measures) text.Text("measure").Text(Spelling.Of(spec.Kind)).Value<decimal>(spec.Confidence.Level).Value<int>(spec.Horizon.Days).End();
        text.Text("simulation").Value<int>(simulation.Scenarios).Value<ulong>(simulation.Seed).Value<int>(simulation.Looks).Value<int>(simulation.Cap).Number(simulation.Precision).End();
        text.Text("checks").Value<int>(checks.StaleDays).Number(checks.JumpSigmas).Value<int>(checks.MinimumHistory).Number(checks.ValueTolerance).Number(checks.GrossChange).End();
        foreach (var (code, severity) in checks.Severity) text.Text("severity").Text(code).Text(Spelling.Of(severity)).End();
        text.Text("time-effects").Text(settings.TimeEffectsIncluded ? "included" : "excluded").End();
        return text.Leaf("settings").Hash;
    }
}
