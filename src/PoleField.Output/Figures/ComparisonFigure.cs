using PoleField.Beam;

namespace PoleField.Output.Figures;

/// <summary>A computed field beside the two-wire field: map of the gradient's deviation, and both along the two lines through the beam.</summary>
public static class ComparisonFigure
{
    /// <summary>Name of the map of deviations.</summary>
    public const string MapName = "two-wire-deviation";

    /// <summary>Name of the profiles.</summary>
    public const string ProfilesName = "two-wire-profiles";

    /// <summary>Deviation of d|B|/dz over the aperture, in per cent of the two-wire field's at the beam.</summary>
    /// <param name="field">The computed field.</param>
    /// <param name="comparison">The wires.</param>
    public static Figure Map(BeamField field, TwoWireComparison comparison)
    {
        TwoWireDeviation gradient = comparison.Gradient;
        double scale = Math.Abs(comparison.Wires.At(field.Aperture.Centre).Gradient);
        return GradientMapFigure.Draw(
            field.Aperture,
            p => 100 * (Math.Abs(field.At(p).Gradient) - Math.Abs(comparison.Wires.At(p).Gradient)) / scale,
            new DeviationText
            {
                Name = MapName,
                Title = "Gradient d|B|/dz over the aperture: deviation from the two-wire field",
                Caption = $"Wires at ±{FigureStyle.Number(1e3 * comparison.Wires.HalfSpacing)} mm; largest deviation "
                    + $"{FigureStyle.Number(100 * gradient.Max, 3)} %, rms {FigureStyle.Number(100 * gradient.Rms, 3)} %.",
                From = "the two-wire field",
            });
    }

    /// <summary>Both fields along y and along z through the beam's centre.</summary>
    /// <param name="report">The computed field.</param>
    /// <param name="comparison">The wires.</param>
    public static Figure Lines(BeamReport report, TwoWireComparison comparison) => ProfileFigure.Draw(
        new Profiles("computed", report.ProfileY, report.ProfileZ),
        $"Two wires at ±{FigureStyle.Number(1e3 * comparison.Wires.HalfSpacing)} mm, "
            + $"k = aG/B {FigureStyle.Number(comparison.ShapeFactor)} against {FigureStyle.Number(comparison.TwoWireShapeFactor)} of the wires.",
        new Profiles("two-wire field", comparison.ProfileY, comparison.ProfileZ)) with
    {
        Name = ProfilesName,
        Title = "The computed field and the two-wire field through the beam's centre",
    };
}
