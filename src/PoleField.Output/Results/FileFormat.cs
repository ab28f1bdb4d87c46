using System.ComponentModel;
using System.Reflection;
using System.Text.Json.Nodes;
using System.Text.Json.Schema;
using System.Text.Json.Serialization.Metadata;

namespace PoleField.Output.Results;

/// <summary>A format of JSON files; its schema is made from the type that writes it.</summary>
/// <param name="Name">Name and version, "polefield-result/1": the value of the key <c>format</c>. A new version when a key changes its meaning or goes.</param>
/// <param name="Holds">What the file holds, one sentence.</param>
/// <param name="Shape">Type whose members are the keys; their Description attributes become the schema's texts.</param>
public sealed record FileFormat(string Name, string Holds, Type Shape)
{
    // Keys whose values are one of few words, or hold a fixed number of numbers, wherever they stand.
    private static readonly Dictionary<string, string[]> Words = new(StringComparer.Ordinal)
    {
        ["kind"] = ["iron", "coil", "magnet", "air"],
    };

    private static readonly Dictionary<string, int> Lengths = new(StringComparer.Ordinal)
    {
        ["field_max_at_mm"] = 2,
        ["force_N_per_m"] = 2,
        ["force_other_way_N_per_m"] = 2,
        ["midpoint_mm"] = 2,
        ["centre_mm"] = 2,
        ["from_mm"] = 2,
        ["to_mm"] = 2,
        ["at_mm"] = 2,
    };

    /// <summary>The formats of results and analyses.</summary>
    public static IReadOnlyList<FileFormat> All { get; } =
    [
        new(ResultJson.Format, "Result of a solve. Lengths in mm, everything else SI; the unit stands in each key.", typeof(ResultFile)),
        new(RampFile.Name, "Excitation curve. SI units; the unit stands in each key.", typeof(RampFile)),
        new(TwoWireFile.Name, "The computed field against the field of two wires. Lengths in mm, everything else SI.", typeof(TwoWireFile)),
        new(FlightFile.Name, "Deflection and pattern of a beam at the detector. Lengths in mm, everything else SI.", typeof(FlightFile)),
        new(TuneFile.Name, "Tuned pole faces: before, after, and how far each face moved. Lengths in mm, moves in micrometres, everything else SI.", typeof(TuneFile)),
        new(ToleranceFile.Name, "Tolerance budget. Lengths in mm, moves in micrometres, everything else SI.", typeof(ToleranceFile)),
        new(SweepPlanFile.Name, "Plan of a sweep: what is varied and from which inputs.", typeof(SweepPlanFile)),
        new(SweepPointFile.Name, "One finished point of a sweep.", typeof(SweepPointFile)),
        new(SweepTableFile.Name, "Table of a sweep. Lengths in mm, everything else SI.", typeof(SweepTableFile)),
        new(Maps.MapFile.Name, "What stands in a field map's table, and where it comes from.", typeof(Maps.MapFile)),
    ];

    /// <summary>Name of the published schema's file: "polefield-result-1.json".</summary>
    public string FileName => Name.Replace('/', '-') + ".json";

    /// <summary>Identifier of the schema.</summary>
    public string Id => "urn:" + Name.Replace('-', ':').Replace('/', ':');

    /// <summary>The JSON Schema (2020-12) as indented text ending in a line feed; the published file holds exactly this.</summary>
    public string Schema => Node().ToJsonString(JsonText.Options) + "\n";

    private JsonObject Node()
    {
        JsonSchemaExporterOptions exporter = new() { TreatNullObliviousAsNonNullable = true, TransformSchemaNode = Describe };
        JsonObject body = JsonText.Options.GetJsonSchemaAsNode(Shape, exporter).AsObject();
        JsonObject schema = new()
        {
            ["$schema"] = "https://json-schema.org/draft/2020-12/schema",
            ["$id"] = Id,
            ["title"] = Name,
            ["description"] = Holds,
        };
        foreach ((string key, JsonNode? value) in body.ToArray())
        {
            body.Remove(key);
            schema[key] = value;
        }

        return schema;
    }

    private JsonNode Describe(JsonSchemaExporterContext context, JsonNode schema)
    {
        if (schema is not JsonObject node)
        {
            // Any value is allowed here: "true" becomes an object so that it can carry its description.
            node = [];
            if (context.PropertyInfo is null || schema.GetValueKind() != System.Text.Json.JsonValueKind.True)
            {
                return schema;
            }
        }

        if (node.ContainsKey("properties"))
        {
            node["required"] = new JsonArray([.. context.TypeInfo.Properties.Where(IsAlwaysThere).Select(p => (JsonNode)p.Name)]);
        }

        if (context.PropertyInfo is not { } property)
        {
            return node;
        }

        if (property.AttributeProvider is MemberInfo member && member.GetCustomAttribute<DescriptionAttribute>() is { } text)
        {
            node.Insert(0, "description", text.Description);
        }

        if (property.Name == "format" && context.Path.Length == 2)
        {
            node["const"] = Name;
        }
        else if (property.Name.EndsWith("_sha256", StringComparison.Ordinal))
        {
            node["pattern"] = "^([0-9a-f]{64})?$"; // empty where the file could not be read
        }
        else if (Words.TryGetValue(property.Name, out string[]? words))
        {
            IEnumerable<JsonNode?> allowed = words.Select(w => (JsonNode?)w);
            bool mayBeNull = node["type"] is JsonArray types && types.Any(t => (string?)t == "null");
            node["enum"] = new JsonArray([.. mayBeNull ? allowed.Append(null) : allowed]);
        }
        else if (Lengths.TryGetValue(property.Name, out int length))
        {
            node["minItems"] = length;
            node["maxItems"] = length;
        }

        return node;
    }

    // What was added to a version later, or does not apply to every kind of part, may be missing.
    private static bool IsAlwaysThere(JsonPropertyInfo property) =>
        property.ShouldSerialize is null && property.AssociatedParameter is not { HasDefaultValue: true };
}
