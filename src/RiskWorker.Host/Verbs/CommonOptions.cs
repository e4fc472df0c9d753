using System.CommandLine;
using System.CommandLine.Parsing;
using System.Globalization;
using RiskWorker.Host.Options;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Verbs;

/// <summary>The options that every verb takes, and what they amount to.</summary>
public sealed class CommonOptions
{
    private const int MostThreads = 1_024;

    private readonly Option<string> _config = new("--config")
    {
        Description = "Folder that holds riskworker.json and feed/",
        HelpName = "FOLDER",
        Recursive = true,
        DefaultValueFactory = _ => ".",
    };

    private readonly Option<string> _out = new("--out")
    {
        Description = "Folder for the store and the reports",
        HelpName = "FOLDER",
        Recursive = true,
        DefaultValueFactory = _ => "out",
    };

    private readonly Option<bool> _verbose = new("--verbose") { Description = "More log lines, and where a failure happened", Recursive = true };

    /// <summary>Gives the options to <paramref name="root"/> and to every verb below it.</summary>
    public void AddTo(RootCommand root)
    {
        root.Options.Add(_config);
        root.Options.Add(_out);
        root.Options.Add(_verbose);
    }

    /// <summary>Whether more should be said.</summary>
    public bool IsVerbose(ParseResult parsed) => parsed.GetValue(_verbose);

    /// <summary>The folders as they were typed, as words of a command.</summary>
    public string[] FolderWords(ParseResult parsed) => ["--config", parsed.GetValue(_config)!, "--out", parsed.GetValue(_out)!];

    /// <summary>Reads the settings and resolves the folders.</summary>
    /// <exception cref="SettingsException">The folder or its settings cannot be used.</exception>
    public async Task<(Configuration Configuration, Workspace Workspace)> ReadAsync(ParseResult parsed, CancellationToken cancellationToken)
    {
        var config = Folder(parsed.GetValue(_config)!, "--config");
        var output = Folder(parsed.GetValue(_out)!, "--out");
        if (File.Exists(output)) throw new SettingsException("command line", [new("--out", $"'{Printable.Of(output)}', a file", "a folder, there or yet to be made")]);
        var configuration = await ConfigurationReader.ReadAsync(config, cancellationToken);
        return (configuration, new(config, output, Path.Combine(output, configuration.StorePath)));
    }

    /// <summary>The switch that leaves nothing but JSON on the output; each verb that has a result adds one.</summary>
    public static Option<bool> Json() => new("--json") { Description = "Print the result as JSON on the output, and nothing else there" };

    /// <summary>The number of threads; each verb that computes adds one.</summary>
    public static Option<int?> Threads() => Parsed<int>("--threads", "N", "Threads; they change no figure [default: one a core]", $"a whole number from 1 to {MostThreads}",
        text => int.TryParse(text, NumberStyles.None, CultureInfo.InvariantCulture, out var number) && number is >= 1 and <= MostThreads ? number : null);

    /// <summary>A date.</summary>
    public static Option<DateOnly?> Date(string name, string description) => Parsed<DateOnly>(name, "DATE", description, "a date as yyyy-MM-dd",
        text => DateOnly.TryParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.None, out var date) ? date : null);

    /// <summary>One of a few words.</summary>
    public static Option<T?> Word<T>(string name, string description, IReadOnlyDictionary<string, T> words) where T : struct => Parsed<T>(
        name, "WORD", description, "one of " + string.Join(", ", words.Keys), text => words.TryGetValue(text, out var value) ? value : null);

    /// <summary>An option whose text is read by <paramref name="read"/>, which returns null for what it refuses.</summary>
    public static Option<T?> Parsed<T>(string name, string helpName, string description, string expected, Func<string, T?> read) where T : struct => new(name)
    {
        Description = description,
        HelpName = helpName,
        CustomParser = argument => Read(argument, name, expected, read),
    };

    private static T? Read<T>(ArgumentResult argument, string name, string expected, Func<string, T?> read) where T : struct
    {
        var text = argument.Tokens[0].Value;
        if (read(text) is { } value) return value;
        argument.AddError(new SettingsFault(name, $"'{Printable.Of(text, 60)}'", expected).ToString());
        return null;
    }

    private static string Folder(string path, string option)
    {
        if (path.Length > 0 && !path.Contains('\0')) return Path.GetFullPath(path);
        throw new SettingsException("command line", [new(option, "an empty path", "a folder")]);
    }
}
