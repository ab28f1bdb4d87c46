using PoleField.Beam;

namespace PoleField.Output.Results;

/// <summary>
/// What a reader must keep in mind beside the numbers: what a plane, static model cannot know, and what to heed around a
/// magnet. They state usual practice; the rules of the place and licensed people decide.
/// </summary>
public static class UsualCautions
{
    // Limits quoted: ICNIRP, Guidelines on limits of exposure to static magnetic fields, Health Physics 96 (2009) 504.
    private const double ImplantLimit = 0.5e-3;

    /// <summary>The cautions that apply to a report.</summary>
    /// <param name="report">The report.</param>
    /// <param name="length">Length of the magnet along the beam, metres; null when not stated.</param>
    public static IReadOnlyList<string> For(BeamReport report, double? length)
    {
        List<string> cautions =
        [
            "The model is plane: it knows nothing of the field at the magnet's ends. Fringe fields lengthen the effective "
            + "magnet by about a gap at each end and saturate pole ends first.",
            "The magnetisation curves are single-valued: no hysteresis, no remanence of soft iron. Expect a residual field of some "
            + "millitesla after a run and a different field on the way up and down; cycle the magnet before zero-field runs.",
            "Error bars cover the discretisation only, not the spread of materials, shapes and currents.",
        ];
        cautions.AddRange(Forces(report, length));
        if (report.Parts.Any(p => p.AmpereTurns is not null and not 0))
        {
            cautions.Add(Energy(report, length));
            cautions.Add("Coil heat: air-cooled copper is commonly run at 1 to 2 A/mm², hollow water-cooled conductor at 5 to 10 A/mm² "
                + "(common practice); interlock water flow and temperature.");
        }

        cautions.Add(FormattableString.Invariant($"Stray field: keep people with implants out of fields above {1e3 * ImplantLimit} mT (ICNIRP 2009), ")
            + "and steel tools away from the gap while the magnet is on; a few millitesla move loose iron.");
        cautions.Add("Follow the local safety rules and have electrical, mechanical and vacuum work done by licensed people.");
        return cautions;
    }

    private static IEnumerable<string> Forces(BeamReport report, double? length)
    {
        PartReport? pulled = report.Parts
            .Where(p => p.Kind == "iron" && p.ForcePerMetre is not null)
            .MaxBy(p => p.ForcePerMetre!.Value.Length);
        if (pulled?.ForcePerMetre is not { } force)
        {
            yield break;
        }

        string size = length is double l
            ? FormattableString.Invariant($"{force.Length * l:g3} N over {1e3 * l:g4} mm of length")
            : FormattableString.Invariant($"{force.Length:g3} N per metre of length");
        yield return $"Force: {pulled.Layer} is pulled with {size}. Spacers must carry it, also during assembly; fingers stay out of the gap. "
            + "A gap that yields changes the field.";
    }

    private static string Energy(BeamReport report, double? length)
    {
        double perMetre = report.Circuit.EnergyPerMetre;
        string size = length is double l
            ? FormattableString.Invariant($"{perMetre * l:g3} J")
            : FormattableString.Invariant($"{perMetre:g3} J per metre of length");
        return $"Energy: the field stores {size}. Never open the coil circuit under current; ramp down or use a free-wheel path.";
    }
}
