using PoleField.Beam;

namespace PoleField.Cli.Text;

/// <summary>Tells an excitation curve.</summary>
internal static class RampText
{
    public static Answer Of(RampReport ramp)
    {
        var table = new AnswerTable(
            "Excitation",
            [
                ">factor", ">ampere-turns, A", ">|B|, T", ">d|B|/dz, T/m", ">per ampere-turn", ">spread", ">iron max, T", ">saturated", "most in",
                ">efficiency", ">k",
            ],
            [.. ramp.Steps.Select(s => Row(ramp, s))]);
        return new Answer("Excitation curve", [table], Remarks(ramp));
    }

    /// <summary>What the picture's caption says about the onset.</summary>
    public static string Onset(RampReport ramp)
    {
        string fall = Numbers.Percent(ramp.Onset);
        return ramp switch
        {
            { HasOtherSources: true } =>
                "Permanent magnets or a background field also act here, so gradient per ampere-turn says nothing about saturation and no onset is given.",
            { OnsetFactor: { } factor } =>
                $"Onset of saturation at {Numbers.Significant(factor, 4)} of the case's ampere-turns: gradient per ampere-turn is {fall} below its best.",
            _ => $"Gradient per ampere-turn does not fall {fall} below its best within these excitations.",
        };
    }

    private static string[] Row(RampReport ramp, RampStep s) =>
    [
        Numbers.Short(s.Factor, 4),
        Numbers.Significant(s.AmpereTurns),
        Numbers.WithError(s.Report.Beam.Field, s.Report.FieldError),
        Numbers.WithError(s.Report.Beam.Gradient, s.Report.GradientError),
        ramp.HasOtherSources ? "-" : Numbers.Percent(s.GradientPerAmpereTurn / Best(ramp)),
        Numbers.Percent(s.Report.Gradient.Spread),
        Cell.Of(s.IronFieldMax, digits: 4),
        Numbers.Percent(s.MostSaturated?.SaturatedShare ?? 0),
        s.MostSaturated is { } part ? Cell.Of(part.Layer, 12) : "-",
        s.Report.Circuit.Efficiency is { } e ? Numbers.Percent(e) : "-",
        Cell.Of(s.ShapeFactor, digits: 4),
    ];

    private static double Best(RampReport ramp) => ramp.Steps.Append(ramp.Start).Max(s => s.GradientPerAmpereTurn);

    private static List<string> Remarks(RampReport ramp)
    {
        List<string> remarks = [Onset(ramp)];
        if (ramp.FirstSaturated is { } first)
        {
            remarks.Add(
                $"First to saturate: {first.Layer}, from {Numbers.Short(first.Factor, 4)} of the ampere-turns on (polarised above 90 % of "
                + "saturation in more than half a per cent of its area).");
        }

        remarks.Add(ramp.HalfSpacing is { } a
            ? $"k = aG/B with a = {Numbers.Significant(1e3 * a)} mm, the half-spacing of the two wires; it drifts when the iron saturates."
            : "No two wires describe this field, so k is not given.");
        remarks.Add("Per ampere-turn: gradient over ampere-turns, in per cent of the best on the curve. Low-field permeability can put the best above the start.");
        remarks.Add(
            "All steps share the mesh of the case's own excitation and have their own error bars; "
            + (ramp.Steps.Any(s => s.OwnMesh)
                ? $"a mesh of their own was made at {string.Join(", ", ramp.Steps.Where(s => s.OwnMesh).Select(s => Numbers.Short(s.Factor, 4)))}."
                : "none needed another mesh."));
        remarks.Add("Curves are single-valued: going down, real iron keeps a remanent field that is not in these numbers.");
        return remarks;
    }
}
