using System.ComponentModel;
using System.Text.Json.Serialization;
using PoleField.Cli.Sketching;
using PoleField.Output.Results;

namespace PoleField.Cli.Files;

/// <summary>A starting sketch and what its closed form promises. Its members are the keys; their descriptions are the published schema's.</summary>
internal sealed class SketchFile(StartingCase start, string sketch, string text)
{
    public const string Name = "polefield-sketch/1";

    /// <summary>The format with its schema.</summary>
    public static FileFormat Form { get; } = new(Name, "A starting sketch and what its closed form promises. Lengths in mm, everything else SI.", typeof(SketchFile));

    [JsonPropertyName("format"), Description("Name and version of the format.")]
    public string Format { get; } = Name;

    [JsonPropertyName("family"), Description("Family of pole pairs.")]
    public string Family { get; } = start.Family.Name;

    [JsonPropertyName("title"), Description("Title of the case.")]
    public string Title { get; } = start.Title;

    [JsonPropertyName("sketch"), Description("Path of the drawing.")]
    public string Sketch { get; } = sketch;

    [JsonPropertyName("case"), Description("Path of the case file.")]
    public string Case { get; } = text;

    [JsonPropertyName("ampere_turns"), Description("Sum of the positive ampere-turns, A.")]
    public double AmpereTurns { get; } = start.AmpereTurns;

    [JsonPropertyName("beam"), Description("What the closed form promises at the beam.")]
    public PromisedBeam Beam { get; } = new(start);

    [JsonPropertyName("holds_for"), Description("What the closed form leaves out.")]
    public string HoldsFor { get; } = start.Idealisation;
}

internal sealed class PromisedBeam(StartingCase start)
{
    [JsonPropertyName("y_mm"), Description("Centre, across the deflection.")]
    public double Y { get; } = start.Sketch.Beam.Y;

    [JsonPropertyName("z_mm"), Description("Centre, along the deflection.")]
    public double Z { get; } = start.Sketch.Beam.Z;

    [JsonPropertyName("field_T"), Description("B = |B|.")]
    public double Field { get; } = start.Field;

    [JsonPropertyName("gradient_T_per_m"), Description("G = d|B|/dz, signed.")]
    public double Gradient { get; } = start.Gradient;
}
