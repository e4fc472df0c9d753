using System.Globalization;
using System.Reflection;
using Microsoft.Data.Sqlite;

namespace RiskWorker.Storage.Sqlite;

/// <summary>Brings a store to the newest schema by the numbered scripts in <c>Sqlite/Migrations</c>.</summary>
internal static class Schema
{
    /// <summary>'RWKR': marks a file as ours, so that another program's database is never changed.</summary>
    private const long ApplicationId = 0x52574B52;

    private static readonly (int Number, string Script)[] s_migrations = [.. Scripts()];

    /// <summary>Number of the newest migration.</summary>
    public static int Newest => s_migrations[^1].Number;

    /// <summary>Applies what is missing, all in one transaction; a store that is up to date is only read.</summary>
    public static void Migrate(SqliteConnection connection, string path)
    {
        if (Version(connection, path) == Newest) return;
        connection.Run("PRAGMA journal_mode = WAL");
        using var transaction = connection.BeginTransaction(deferred: false);
        var version = Version(connection, path);
        foreach (var (number, script) in s_migrations.Where(m => m.Number > version)) connection.Run(script);
        connection.Run(string.Create(CultureInfo.InvariantCulture, $"PRAGMA application_id = {ApplicationId}"));
        connection.Run(string.Create(CultureInfo.InvariantCulture, $"PRAGMA user_version = {Newest}"));
        transaction.Commit();
    }

    private static int Version(SqliteConnection connection, string path)
    {
        var version = Convert.ToInt32(connection.Scalar("PRAGMA user_version"), CultureInfo.InvariantCulture);
        var owner = Convert.ToInt64(connection.Scalar("PRAGMA application_id"), CultureInfo.InvariantCulture);
        var isEmpty = version == 0 && owner == 0 && connection.Scalar("SELECT 1 FROM sqlite_master LIMIT 1") is null;
        if (!isEmpty && owner != ApplicationId)
            throw new StoreException(StoreFault.Refused, $"The file '{path}' is a database of another program. Name another file for the store.");
        if (version > Newest)
            throw new StoreException(StoreFault.Newer, $"The store '{path}' has schema {version}; this version of the program knows schemas up to {Newest}. Use the newer version that wrote it.");
        return version;
    }

    private static IEnumerable<(int, string)> Scripts()
    {
        const string folder = ".Sqlite.Migrations.";
        var assembly = Assembly.GetExecutingAssembly();
        foreach (var name in assembly.GetManifestResourceNames().Where(n => n.Contains(folder, StringComparison.Ordinal)).Order(StringComparer.Ordinal))
        {
            using var reader = new StreamReader(assembly.GetManifestResourceStream(name)!);
            var file = name[(name.IndexOf(folder, StringComparison.Ordinal) + folder.Length)..];
            yield return (int.Parse(file[..4], CultureInfo.InvariantCulture), reader.ReadToEnd());
        }
    }
}
