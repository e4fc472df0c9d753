using System.Globalization;

namespace RiskWorker.Storage.Sqlite;

/// <summary>A scheduled run that was stopped before its end; times in UTC.</summary>
/// <param name="Schedule">The schedule that asked for it.</param>
/// <param name="ScheduledFor">When it was due.</param>
/// <param name="Started">When it began.</param>
/// <param name="Interrupted">When it was stopped.</param>
public sealed record Interruption(string Schedule, DateTimeOffset ScheduledFor, DateTimeOffset Started, DateTimeOffset Interrupted);

/// <summary>The scheduled runs that were stopped before their end. Append-only.</summary>
public sealed class InterruptionLog
{
    private readonly RiskStore _store;

    internal InterruptionLog(RiskStore store) => _store = store;

    /// <summary>Records one.</summary>
    /// <exception cref="StoreException">The store cannot be written.</exception>
    public void Append(Interruption interruption) => _store.Write(connection => connection.Run(
        "INSERT INTO interruption (schedule, scheduled_for, started, interrupted) VALUES (?1, ?2, ?3, ?4)",
        interruption.Schedule, Utc(interruption.ScheduledFor), Utc(interruption.Started), Utc(interruption.Interrupted)));

    /// <summary>All of them, oldest first.</summary>
    public IReadOnlyList<Interruption> List() => _store.Use(connection => connection.Query(
        "SELECT schedule, scheduled_for, started, interrupted FROM interruption ORDER BY id",
        r => new Interruption(r.GetString(0), Time(r.GetString(1)), Time(r.GetString(2)), Time(r.GetString(3)))));

    private static string Utc(DateTimeOffset time) => time.UtcDateTime.ToString("O", CultureInfo.InvariantCulture);

    private static DateTimeOffset Time(string text) => DateTimeOffset.Parse(text, CultureInfo.InvariantCulture);
}
