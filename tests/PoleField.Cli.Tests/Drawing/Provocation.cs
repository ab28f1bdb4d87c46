using System.Text;
using PoleField.Drawing;
using PoleField.Tests.Drawing.Dxf;

namespace PoleField.Cli.Tests.Drawing;

/// <summary>A small drawing that makes the program say something.</summary>
/// <param name="What">Kind of the finding it provokes.</param>
/// <param name="How">The drawing in words.</param>
internal sealed record Provocation(string What, string How)
{
    private const int LongestShown = 600;

    /// <summary>Entities of the drawing.</summary>
    public string Entities { get; init; } = "";

    /// <summary>Blocks of the drawing.</summary>
    public string Blocks { get; init; } = "";

    /// <summary>Header variables.</summary>
    public string Header { get; init; } = "9 $INSUNITS; 70 4";

    /// <summary>Table of layers.</summary>
    public string Tables { get; init; } = "";

    /// <summary>The file's bytes, when it is more than entities and blocks.</summary>
    public byte[]? Bytes { get; init; }

    /// <summary>How it is read.</summary>
    public DxfReadOptions Options { get; init; } = new();

    /// <summary>What is asked of it; null when reading is enough.</summary>
    public SectionRequest? Request { get; init; }

    /// <summary>The drawing as text with one pair after the other, empty when it is long or not text.</summary>
    public string Shown
    {
        get
        {
            string[] parts = [Blocks, Entities];
            string shown = string.Join("; ", parts.Where(p => p.Length > 0));
            return Bytes is not null || shown.Length > LongestShown ? "" : shown;
        }
    }

    /// <summary>Asks for parts.</summary>
    public static SectionRequest Parts(params string[] layers) => new() { PartLayers = layers, MaterialKeys = layers };

    /// <summary>A closed rectangle.</summary>
    public static string Box(string layer, double y0, double z0, double y1, double z1) => FormattableString.Invariant(
        $"0 LWPOLYLINE; 8 {layer}; 70 1; 10 {y0}; 20 {z0}; 10 {y1}; 20 {z0}; 10 {y1}; 20 {z1}; 10 {y0}; 20 {z1}");

    /// <summary>A straight line.</summary>
    public static string Line(string layer, double y0, double z0, double y1, double z1) =>
        FormattableString.Invariant($"0 LINE; 8 {layer}; 10 {y0}; 20 {z0}; 11 {y1}; 21 {z1}");

    /// <summary>The findings of the kind, in the order they are made.</summary>
    public (IReadOnlyList<Finding> Findings, string Unit) Provoke()
    {
        var drawing = new HandDrawn { Entities = Entities, Blocks = Blocks, Header = Header, Tables = Tables };
        IReadOnlyList<Finding> all;
        string unit = "";
        try
        {
            using var stream = new MemoryStream(Bytes ?? Encoding.UTF8.GetBytes(drawing.Text()));
            Sketch sketch = DxfReader.Read(stream, "pole.dxf", Options);
            unit = sketch.Unit.Name;
            all = [.. sketch.Findings, .. Request is null ? [] : Sectioning.Read(sketch, Request).Findings];
        }
        catch (InputException refusal)
        {
            all = refusal.Findings;
        }

        return ([.. all.Where(f => f.What == What)], unit);
    }
}
