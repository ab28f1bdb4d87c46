using PoleField.Cli.Text;
using PoleField.Drawing;

namespace PoleField.Cli.Sketching;

/// <summary>A starting sketch with everything its case file says.</summary>
internal sealed record StartingCase
{
    public required FamilyWords Words { get; init; }

    /// <summary>The family with the dimensions asked for.</summary>
    public required PoleFamily Family { get; init; }

    public required StartingSketch Sketch { get; init; }

    /// <summary>Name of both files, without ending.</summary>
    public required string Name { get; init; }

    /// <summary>Ampere-turns in all, A, as rounded for the case file.</summary>
    public required double AmpereTurns { get; init; }

    /// <summary>Length along the beam, metres; null when not stated.</summary>
    public double? Length { get; init; }

    /// <summary>Material of the poles; null for the suggested one.</summary>
    public string? Material { get; init; }

    /// <summary>Material of the yoke; null for the suggested one.</summary>
    public string? YokeMaterial { get; init; }

    public string Title =>
        $"{char.ToUpperInvariant(Family.Name[0])}{Family.Name[1..]}{(Words.HasIron ? " pair" : string.Empty)}, {Words.LeadingLength} {Words.Options[0].Written(Family)}";

    /// <summary>B at the beam by the closed form, T.</summary>
    public double Field => AmpereTurns * Sketch.FieldPerAmpereTurn;

    /// <summary>d|B|/dz at the beam by the closed form, T/m.</summary>
    public double Gradient => Field * Sketch.GradientPerField;

    /// <summary>What the closed form leaves out.</summary>
    public string Idealisation => Words.HasIron
        ? "iron of infinite permeability, faces uncut"
        : "exact outside round conductors with even current density";

    /// <summary>Material of a part; null for coils.</summary>
    public string? MaterialOf(SuggestedPart part) => part.Share != 0
        ? null
        : part.Layer == "YOKE" ? YokeMaterial ?? part.Material : Material ?? part.Material;

    /// <summary>Ampere-turns of each outline of a part, A.</summary>
    public double AmpereTurnsOf(SuggestedPart part) => part.Share * AmpereTurns;

    /// <summary>Rough relative error of the promised field because the faces are cut; null where there is no rule for it.</summary>
    public double? ErrorOfCut => Family is TwoWirePair pair ? pair.FieldErrorOfCut : null;

    /// <summary>Ampere-turns with five digits, as a person would write them.</summary>
    public static double Rounded(double ampereTurns) =>
        double.Parse(ampereTurns.ToString("G5", System.Globalization.CultureInfo.InvariantCulture), System.Globalization.CultureInfo.InvariantCulture);

    /// <summary>"y = 0 mm, z = 3.6 mm".</summary>
    public string BeamPlace => $"y = {Numbers.Short(Sketch.Beam.Y)} mm, z = {Numbers.Short(Sketch.Beam.Z)} mm";
}
