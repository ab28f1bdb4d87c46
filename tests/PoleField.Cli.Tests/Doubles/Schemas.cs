using System.Text.Json;
using Json.Schema;
using PoleField.Cli.Files;

namespace PoleField.Cli.Tests.Doubles;

/// <summary>Holds JSON against the published schema of the format it names, as another implementation (JsonSchema.Net) reads it.</summary>
internal static class Schemas
{
    private static readonly Dictionary<string, JsonSchema> Known = PublishedFormats.All.ToDictionary(f => f.Name, f => JsonSchema.FromText(f.Schema));

    /// <summary>What breaks the schema; empty when nothing does, or when the text is no JSON that names a format.</summary>
    public static string Faults(string text)
    {
        if (!text.StartsWith('{'))
        {
            return string.Empty;
        }

        using JsonDocument document = JsonDocument.Parse(text);
        if (!document.RootElement.TryGetProperty("format", out JsonElement format))
        {
            return string.Empty;
        }

        if (!Known.TryGetValue(format.GetString()!, out JsonSchema? schema))
        {
            return $"no schema is published for {format}";
        }

        EvaluationResults found = schema.Evaluate(document.RootElement, new EvaluationOptions { OutputFormat = OutputFormat.List });
        return found.IsValid
            ? string.Empty
            : string.Join("; ", found.Details!.Where(d => d.Errors is not null).Select(d => $"{d.InstanceLocation}: {string.Join(", ", d.Errors!.Values)}"));
    }
}
