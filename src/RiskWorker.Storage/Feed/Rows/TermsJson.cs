using System.Text.Json.Serialization;

namespace RiskWorker.Storage.Feed.Rows;

/// <summary>An instrument's terms as JSON, in the order in which they were added.</summary>
[JsonSerializable(typeof(Dictionary<string, string>))]
internal sealed partial class TermsJson : JsonSerializerContext;
