namespace RiskWorker.Host.UseCases;

/// <summary>How far a piece of work has come.</summary>
/// <param name="Phase">What is being done, in a word or two.</param>
/// <param name="Fraction">Share of the phase that is done, from 0 to 1.</param>
/// <param name="Detail">What is worth adding, or null.</param>
public readonly record struct WorkProgress(string Phase, double Fraction, string? Detail = null);

/// <summary>One use case: a request in, a report out.</summary>
public delegate Task<TReport> UseCase<in TRequest, TReport>(TRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken);

/// <summary>Data that cannot be used: a refused file of the feed, or nothing to run on. Ends in exit code 2.</summary>
/// <param name="message">All that a person needs to mend it; may have several lines.</param>
public sealed class DataRefusedException(string message) : Exception(message);

/// <summary>Asks for a run or date that is not there. Ends in exit code 3.</summary>
/// <param name="message">What was asked for and what there is.</param>
public sealed class NotStoredException(string message) : Exception(message);
