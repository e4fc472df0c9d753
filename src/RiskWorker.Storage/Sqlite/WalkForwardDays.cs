using System.Text.Json;
using RiskWorker.Domain.Evidence;

namespace RiskWorker.Storage.Sqlite;

/// <summary>The days of walk-forwards that are computed already. A day's key is a hash of everything that it depends on.</summary>
public sealed class WalkForwardDays
{
    private readonly RiskStore _store;

    internal WalkForwardDays(RiskStore store) => _store = store;

    /// <summary>The day of <paramref name="key"/>, or null where it is not there or cannot be read: then it is computed again.</summary>
    public DayForecast? Find(string key)
    {
        var packed = _store.Use(connection => connection.Query("SELECT content FROM walk_forward_day WHERE key = ?1", r => r.GetFieldValue<byte[]>(0), key)).FirstOrDefault();
        if (packed is null) return null;
        try
        {
            return JsonSerializer.Deserialize(Zlib.Unpack(packed), RecordContext.Default.DayForecast);
        }
        catch (Exception damage) when (damage is InvalidDataException or JsonException)
        {
            return null;
        }
    }

    /// <summary>Keeps days, all or none.</summary>
    /// <exception cref="StoreException">The store cannot be written.</exception>
    public void Keep(IReadOnlyCollection<(string Key, DayForecast Day)> days)
    {
        ArgumentNullException.ThrowIfNull(days);
        _store.Write(connection =>
        {
            foreach (var (key, day) in days)
                connection.Run("INSERT OR REPLACE INTO walk_forward_day (key, content) VALUES (?1, ?2)", key, Zlib.Pack(JsonSerializer.SerializeToUtf8Bytes(day, RecordContext.Default.DayForecast)));
            return 0;
        });
    }
}
