using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.UseCases;

/// <summary>Keeps what is written to explain an exception. Nothing is changed: a later explanation corrects an earlier one.</summary>
public sealed class KeepExplanation(TimeProvider clock)
{
    private const int Longest = 4_000;

    /// <summary>Keeps it; reports how many there are now for that date and book.</summary>
    /// <exception cref="NotStoredException">There is no such book or date, or the text is empty or too long.</exception>
    public Task<int> RunAsync(ExplainRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken) => Task.Run(() => Run(request), cancellationToken);

    private int Run(ExplainRequest request)
    {
        if (string.IsNullOrWhiteSpace(request.Text) || request.Text.Length > Longest) throw new NotStoredException($"The text has {request.Text.Trim().Length:N0} characters; it must have 1 to {Longest:N0}.");
        if (string.IsNullOrWhiteSpace(request.Author)) throw new NotStoredException("The author is missing: give --author NAME.");
        using var store = RiskStore.Open(request.Workspace.StoreFile);
        var reader = new SnapshotReader(store);
        if (!reader.Books.Contains(request.Book, StringComparer.Ordinal)) throw new NotStoredException($"There is no book '{request.Book}'; there are {string.Join(", ", reader.Books)}.");
        if (!reader.ObservationDates.Contains(request.Date)) throw new NotStoredException($"{request.Date:yyyy-MM-dd} is no day with observations, so it has no exception.");
        store.Explanations.Append(request.Date, request.Book, new(request.Cause, request.Text.Trim(), request.Author.Trim(), clock.GetUtcNow()));
        return store.Explanations.All()[(request.Date, request.Book)].Count();
    }
}
