using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Serialization.Metadata;
using PoleField.Geometry;

namespace PoleField.Output.Results;

/// <summary>
/// How every JSON file is written: UTF-8 without byte order mark, two-space indentation, fixed key order, doubles with the fewest
/// digits that read back to the same bits, null where there is no finite number, a line feed at the end.
/// </summary>
public static class JsonText
{
    /// <summary>Settings of the serialiser, for reading and writing.</summary>
    internal static JsonSerializerOptions Options { get; } = MakeOptions();

    /// <summary>Writes a file's content.</summary>
    /// <param name="file">An object whose members are the keys.</param>
    /// <param name="stream">Where to.</param>
    public static void Write<T>(T file, Stream stream)
    {
        JsonSerializer.Serialize(stream, file, Options);
        stream.WriteByte((byte)'\n');
    }

    /// <summary>The text <see cref="Write"/> writes.</summary>
    public static string Of<T>(T file) => JsonSerializer.Serialize(file, Options) + "\n";

    internal static double? Finite(double? value) => value is double v && double.IsFinite(v) ? v : null;

    internal static double? Millimetres(double? metres) => Finite(metres * 1e3);

    internal static IReadOnlyList<double>? Pair(Point? p, double factor = 1) => p is Point q && q.IsFinite ? [factor * q.Y, factor * q.Z] : null;

    private static JsonSerializerOptions MakeOptions()
    {
        JsonSerializerOptions options = new()
        {
            WriteIndented = true,
            NewLine = "\n",
            RespectNullableAnnotations = true,
            RespectRequiredConstructorParameters = true,

            // Names in any script stay readable; quotes and control characters are still escaped. HTML pages escape on their own.
            Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping,
            TypeInfoResolver = new DefaultJsonTypeInfoResolver { Modifiers = { LeaveOutWhatDoesNotApply } },
        };
        options.MakeReadOnly();
        return options;
    }

    // Keys of a part that do not apply to its kind are left out; everywhere else null says "there is no number".
    private static void LeaveOutWhatDoesNotApply(JsonTypeInfo type)
    {
        if (type.Type != typeof(PartSection))
        {
            return;
        }

        foreach (JsonPropertyInfo property in type.Properties.Where(p => !p.IsRequired))
        {
            property.ShouldSerialize = static (_, value) => value is not null;
        }
    }
}
