using PoleField.Beam;
using PoleField.Geometry;

namespace PoleField.Cli.Text;

/// <summary>Says how near a field is to that of two wires.</summary>
internal static class CompareText
{
    public static Answer Of(TwoWireComparison comparison, double accuracy)
    {
        TwoWireField wires = comparison.Wires;
        var found = new AnswerTable(
            "Two wires nearest to the computed field over the aperture",
            ["quantity", ">value", ""],
            [
                ["half-spacing a, mm", Numbers.Significant(1e3 * wires.HalfSpacing, 6), Origin(comparison.Stated.HalfSpacing is null)],
                ["midpoint y, z, mm", Place(wires.Midpoint), Origin(comparison.Stated.Midpoint is null)],
                ["current of the right wire, A", Numbers.Significant(wires.Current, 6), "fitted"],
            ]);
        var deviations = new AnswerTable(
            "Computed against two-wire field",
            ["quantity", ">computed at the beam", ">two wires", ">deviation there", ">largest", ">rms"],
            [
                Row("field |B|, T", comparison.Beam.Field, wires.At(comparison.Beam.At).Field, comparison.Field),
                Row("gradient d|B|/dz, T/m", comparison.Beam.Gradient, wires.At(comparison.Beam.At).Gradient, comparison.Gradient),
                [
                    "k = aG/B",
                    Numbers.Significant(comparison.ShapeFactor),
                    Numbers.Significant(comparison.TwoWireShapeFactor),
                    Percent((comparison.ShapeFactor / comparison.TwoWireShapeFactor) - 1),
                    string.Empty,
                    string.Empty,
                ],
            ]);
        return new Answer("Two-wire approximation", [found, deviations], Remarks(comparison, accuracy));
    }

    private static string[] Row(string name, double computed, double wires, TwoWireDeviation deviation) =>
    [
        name,
        Numbers.Significant(computed),
        Numbers.Significant(wires),
        Percent(deviation.AtBeam),
        Numbers.Percent(deviation.Max),
        Numbers.Percent(deviation.Rms),
    ];

    private static string Percent(double ratio) => (ratio > 0 ? "+" : string.Empty) + Numbers.Percent(ratio);

    private static string Origin(bool fitted) => fitted ? "fitted" : "stated";

    private static string Place(Point p) => $"{Numbers.Millimetres(p.Y, 4)}, {Numbers.Millimetres(p.Z, 4)}";

    private static List<string> Remarks(TwoWireComparison comparison, double accuracy)
    {
        var remarks = new List<string>
        {
            "Deviations are relative to the two-wire field's mean over the aperture; largest and rms are over the aperture.",
        };
        if (comparison.Gradient.Max <= accuracy)
        {
            remarks.Add("The gradient is that of two wires within the error bar of the solve.");
        }

        remarks.Add(
            "Poles that end too soon do not follow the wires' equipotentials: field and gradient fall away from the middle, the gradient "
            + "several times as much as the field.");
        remarks.Add(
            "Saturation starts on the flanks of the convex pole, where flux is densest. The pole then acts rounder and wider than drawn: "
            + "k falls, and a fitted half-spacing comes out larger than the drawn one. Compare at several excitations with ramp.");
        remarks.Add("A finite permeability below saturation mostly lowers the current that is left for the gap and hardly changes the shape.");
        return remarks;
    }
}
