using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Cli.Text;

namespace PoleField.Cli;

/// <summary>What a person must know before the magnet is built or switched on, with this magnet's numbers.</summary>
internal static class Cautions
{
    // Common practice: about 2 A/mm² without, about 10 A/mm² with water cooling.
    private const double AirCooled = 2e6;
    private const double WaterCooled = 10e6;

    /// <summary>The cautions of a result, the most telling first.</summary>
    /// <param name="file">The case.</param>
    /// <param name="report">The answer.</param>
    /// <param name="strayReach">Distance from the middle of the section inside which the field exceeds <see cref="StrayField.ImplantLevel"/>; null when unknown.</param>
    public static IReadOnlyList<string> Of(CaseFile file, BeamReport report, double? strayReach)
    {
        var cautions = new List<string>();
        AddForce(cautions, file, report);
        AddEnergy(cautions, file, report);
        AddHeat(cautions, file, report);
        cautions.Add(strayReach is { } reach
            ? $"Stray field: above 0.5 mT (danger to pacemakers; EU directive 2013/35/EU) up to {Numbers.Significant(reach, 2)} m from the middle "
                + "of the section; a magnet of finite length falls off faster than this plane section."
            : "Stray field: not known from this model; measure before people with implants or loose iron come near.");
        cautions.Add(
            "A plane section knows nothing of the magnet's ends: there field, gradient and saturation differ over about a gap width, "
            + "and the effective length is not the iron length.");
        cautions.Add("Curves are single-valued: remanence and the history of the iron are not in the numbers.");
        cautions.Add("Local safety rules and licensed practice come before anything printed here.");
        return cautions;
    }

    private static void AddForce(List<string> cautions, CaseFile file, BeamReport report)
    {
        PartReport? pulled = report.Parts.Where(p => p.ForcePerMetre is not null).MaxBy(p => p.ForcePerMetre!.Value.Length);
        if (pulled?.ForcePerMetre is not { } force || !(force.Length > 0))
        {
            return;
        }

        string total = file.Length is { } length ? $", {Numbers.Significant(force.Length * length, 3)} N over its length" : string.Empty;
        cautions.Add(
            $"Force: {pulled.Layer} is pulled with {Numbers.Significant(force.Length, 3)} N per metre{total}. "
            + "Fixings must hold it; parts and tools can snap together and crush hands.");
    }

    private static void AddEnergy(List<string> cautions, CaseFile file, BeamReport report)
    {
        double energy = report.Circuit.EnergyPerMetre;
        if (!(report.Circuit.AmpereTurns > 0) || !(energy > 0))
        {
            return;
        }

        string total = file.Length is { } length ? $", {Numbers.Significant(energy * length, 3)} J over its length" : string.Empty;
        cautions.Add(
            $"Energy: {Numbers.Significant(energy, 3)} J per metre{total} are stored in the field; "
            + "opening the circuit under current gives a high voltage.");
    }

    private static void AddHeat(List<string> cautions, CaseFile file, BeamReport report)
    {
        double heat = 0;
        double densest = 0;
        foreach (PartReport part in report.Parts)
        {
            PartSection? section = file.Parts.FirstOrDefault(p => p.Layer == part.Layer);
            if (part.CurrentDensity is { } density && section?.Fill is { } fill)
            {
                heat += new CoilReport(part.Layer, part.Area * fill, Math.Abs(density)).HeatPerMetre();
                densest = Math.Max(densest, Math.Abs(density));
            }
        }

        if (heat > 0)
        {
            string total = file.Length is { } length ? $", {Numbers.Significant(heat * length, 3)} W over its length without the ends" : string.Empty;
            string cooling = densest > WaterCooled
                ? " Current density is beyond what water cooling usually bears (about 10 A/mm², common practice)."
                : densest > AirCooled ? " Current density calls for water cooling (beyond about 2 A/mm², common practice)." : string.Empty;
            cautions.Add($"Heat: the copper takes {Numbers.Significant(heat, 3)} W per metre at 20 °C{total}.{cooling}");
        }
        else if (report.Circuit.AmpereTurns > 0)
        {
            cautions.Add("Heat: state the copper's fill in the case to have current density and heat worked out.");
        }
    }
}
