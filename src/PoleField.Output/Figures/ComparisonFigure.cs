using PoleField.Beam;

namespace PoleField.Output.Figures;

/// <summary>A computed field beside the two-wire field: map of the gradient's deviation, and both along the two lines through the beam.</summary>
public static class ComparisonFigure
{
    /// <summary>Name of the map of the gradient's deviation.</summary>
    public const string GradientName = "two-wire-gradient";

    /// <summary>Name of the map of the field's deviation.</summary>
    public const string FieldName = "two-wire-field";

    /// <summary>Deviation of d|B|/dz over the aperture, in per cent of the two-wire field's at the beam.</summary>
    /// <param name="field">The computed field.</param>
    /// <param name="comparison">The wires.</param>
    public static Figure Gradient(BeamField field, TwoWireComparison comparison) =>
        Map(field, comparison, v => Math.Abs(v.Gradient), (GradientName, "Gradient d|B|/dz", comparison.Gradient));

    /// <summary>Deviation of |B| over the aperture, in per cent of the two-wire field's at the beam.</summary>
    /// <param name="field">The computed field.</param>
    /// <param name="comparison">The wires.</param>
    public static Figure Field(BeamField field, TwoWireComparison comparison) =>
        Map(field, comparison, v => v.Field, (FieldName, "Field |B|", comparison.Field));

    private static Figure Map(
        BeamField field, TwoWireComparison comparison, Func<BeamValues, double> size, (string Name, string What, TwoWireDeviation Deviation) of)
    {
        double scale = size(comparison.Wires.At(field.Aperture.Centre));
        return GradientMapFigure.Draw(
            field.Aperture,
            p => 100 * (size(field.At(p)) - size(comparison.Wires.At(p))) / scale,
            new DeviationText
            {
                Name = of.Name,
                Title = of.What + " over the aperture: deviation from the two-wire field",
                Caption = $"Wires at ±{FigureStyle.Number(1e3 * comparison.Wires.HalfSpacing)} mm; largest deviation "
                    + $"{FigureStyle.Number(100 * of.Deviation.Max, 3)} %, rms {FigureStyle.Number(100 * of.Deviation.Rms, 3)} %.",
                From = "the two-wire field",
            });
    }

    /// <summary>Both fields along y and along z through the beam's centre.</summary>
    /// <param name="report">The computed field.</param>
    /// <param name="comparison">The wires.</param>
    public static Figure Lines(BeamReport report, TwoWireComparison comparison)
    {
        TwoWireField wires = comparison.Wires;
        string how = comparison.Stated.HalfSpacing is null ? "Two wires fitted to the computed field" : "Two wires as stated, their current fitted";
        return ProfileFigure.Draw(
            Along("computed", report.ProfileY, report.ProfileZ),
            $"{how}: half-spacing {FigureStyle.Number(1e3 * wires.HalfSpacing, 4)} mm, midpoint z = {FigureStyle.Number(1e3 * wires.Midpoint.Z, 3)} mm; "
                + $"k = aG/B {FigureStyle.Number(comparison.ShapeFactor, 4)} against {FigureStyle.Number(comparison.TwoWireShapeFactor, 4)} of the wires.",
            Along("two-wire field", comparison.ProfileY, comparison.ProfileZ));
    }

    private static Profiles Along(string name, IReadOnlyList<BeamValues> y, IReadOnlyList<BeamValues> z) =>
        new(name, [.. y.Select(ProfilePoint.AlongY)], [.. z.Select(ProfilePoint.AlongZ)]);
}
