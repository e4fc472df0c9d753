using System.Globalization;
using RiskWorker.Host.Options;

namespace RiskWorker.Host.Jobs;

/// <summary>
/// Keeps a second service off a store. The lock is the system's on a file beside the store, so it ends with the process however
/// that ends; the file itself stays, since removing it would race with the next holder. Who holds it stands in a second file:
/// the first cannot be read while it is locked.
/// </summary>
public sealed class StoreLock : IDisposable
{
    private readonly FileStream _lock;
    private readonly string _holderFile;

    private StoreLock(FileStream locked, string holderFile) => (_lock, _holderFile) = (locked, holderFile);

    /// <summary>Takes the lock beside <paramref name="storeFile"/>, whose folder exists.</summary>
    /// <exception cref="SettingsException">Another service holds it.</exception>
    public static StoreLock Take(string storeFile, TimeProvider clock)
    {
        var holderFile = storeFile + ".holder";
        FileStream locked;
        try
        {
            locked = new(storeFile + ".lock", FileMode.OpenOrCreate, FileAccess.ReadWrite, FileShare.None);
        }
        catch (IOException) when (File.Exists(storeFile + ".lock"))
        {
            throw new SettingsException("serve", [new("--out", $"a store that a service works on already ({Holder(holderFile)})", "a store of its own for each service: stop the other, or choose another folder")]);
        }
        File.WriteAllText(holderFile, string.Create(CultureInfo.InvariantCulture, $"process {Environment.ProcessId}, since {clock.GetUtcNow():yyyy-MM-dd'T'HH:mm:ss'Z'}"));
        return new(locked, holderFile);
    }

    /// <summary>Lets another service have the store.</summary>
    public void Dispose()
    {
        File.Delete(_holderFile);
        _lock.Dispose();
    }

    private static string Holder(string file)
    {
        try
        {
            return Printable.Of(File.ReadAllText(file), 80);
        }
        catch (IOException)
        {
            return "process unknown";
        }
    }
}
