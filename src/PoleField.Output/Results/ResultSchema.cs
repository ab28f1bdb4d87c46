using System.ComponentModel;
using System.Reflection;
using System.Text.Json.Nodes;
using System.Text.Json.Schema;

namespace PoleField.Output.Results;

/// <summary>The JSON Schema (2020-12) of the result file, made from the types that write it.</summary>
public static class ResultSchema
{
    /// <summary>Identifier of the schema.</summary>
    public const string Id = "urn:polefield:result:1";

    /// <summary>The schema as indented text ending in a line feed; the published file holds exactly this.</summary>
    public static string Json => Node().ToJsonString(ResultJson.Options) + "\n";

    private static JsonObject Node()
    {
        JsonSchemaExporterOptions exporter = new() { TreatNullObliviousAsNonNullable = true, TransformSchemaNode = Describe };
        JsonObject body = ResultJson.Options.GetJsonSchemaAsNode(typeof(ResultFile), exporter).AsObject();
        JsonObject schema = new()
        {
            ["$schema"] = "https://json-schema.org/draft/2020-12/schema",
            ["$id"] = Id,
            ["title"] = ResultJson.Format,
            ["description"] = "Result of a PoleField solve. Lengths in mm, everything else SI; the unit stands in each key.",
        };
        foreach ((string key, JsonNode? value) in body.ToArray())
        {
            body.Remove(key);
            schema[key] = value;
        }

        return schema;
    }

    private static JsonNode Describe(JsonSchemaExporterContext context, JsonNode schema)
    {
        if (schema is not JsonObject node || context.PropertyInfo is not { } property)
        {
            return schema;
        }

        if (property.AttributeProvider is MemberInfo member && member.GetCustomAttribute<DescriptionAttribute>() is { } text)
        {
            node.Insert(0, "description", text.Description);
        }

        switch (property.Name)
        {
            case "format":
                node["const"] = ResultJson.Format;
                break;
            case "case_sha256" or "sketch_sha256":
                node["pattern"] = "^[0-9a-f]{64}$";
                break;
            case "kind":
                node["enum"] = new JsonArray("iron", "coil", "magnet", "air");
                break;
            case "field_max_at_mm" or "force_N_per_m":
                node["minItems"] = 2;
                node["maxItems"] = 2;
                break;
            default:
                break;
        }

        return node;
    }
}
