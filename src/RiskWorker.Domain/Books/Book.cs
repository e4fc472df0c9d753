namespace RiskWorker.Domain.Books;

/// <summary>A node of the firm's tree: one row of <c>books.csv</c>.</summary>
/// <param name="Name">Identifies the book.</param>
/// <param name="Parent">The book above it; null for the root.</param>
/// <param name="DisplayName">What reports call it.</param>
/// <param name="Currency">Currency of its value, measures and limits; the root's is the reporting currency.</param>
public sealed record Book(string Name, string? Parent, string DisplayName, string Currency);
