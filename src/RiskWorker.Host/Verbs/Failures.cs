using RiskWorker.Host.Options;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Verbs;

/// <summary>The one place where an exception becomes a message and an exit code.</summary>
public static class Failures
{
    /// <summary>Prints what went wrong on <paramref name="error"/>; where, only when asked for.</summary>
    /// <param name="failure">What was thrown.</param>
    /// <param name="error">Takes the message.</param>
    /// <param name="isVerbose">Whether to print the stack trace too.</param>
    public static ExitCode Report(Exception failure, TextWriter error, bool isVerbose)
    {
        var (code, message) = failure switch
        {
            SettingsException or NotStoredException => (ExitCode.Usage, failure.Message),
            DataRefusedException => (ExitCode.Blocked, failure.Message),
            OperationCanceledException => (ExitCode.Failure, "cancelled before it was done"),
            IOException or UnauthorizedAccessException => (ExitCode.Failure, failure.Message),
            _ => (ExitCode.Failure, $"internal failure: {failure.GetType().Name}: {failure.Message}{(isVerbose ? "" : " (--verbose shows where)")}"),
        };
        error.WriteLine("riskworker: " + string.Join('\n', message.Split('\n').Select(line => Printable.Of(line.TrimEnd('\r')))));
        if (isVerbose) error.WriteLine(failure.ToString());
        return code;
    }
}
