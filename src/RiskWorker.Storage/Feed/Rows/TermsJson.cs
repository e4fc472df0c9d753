using System.Text.Json.Serialization;

namespace RiskWorker.Storage.Feed.Rows;

/// <summary>An instrument's terms as JSON, keys in ordinal order.</summary>
[JsonSerializable(typeof(SortedDictionary<string, string>))]
internal sealed partial class TermsJson : JsonSerializerContext;
