using PoleField.Beam;
using PoleField.Cli.Text;

namespace PoleField.Cli;

/// <summary>What a person must know before the magnet is built or switched on, with this magnet's numbers.</summary>
internal static class Cautions
{
    // Common practice: about 2 A/mm² without, about 10 A/mm² with water cooling.
    private const double AirCooled = 2e6;
    private const double WaterCooled = 10e6;

    /// <summary>The cautions of a result, the most telling first.</summary>
    /// <param name="report">The answer.</param>
    /// <param name="operation">What running the magnet takes.</param>
    public static IReadOnlyList<string> Of(BeamReport report, OperationReport operation)
    {
        var cautions = new List<string>();
        AddForce(cautions, report, operation);
        AddEnergy(cautions, operation);
        AddHeat(cautions, report, operation);
        cautions.Add(operation.Stray.FirstOrDefault(s => s.Distance is not null) is { Distance: { } reach } stray
            ? $"Stray field: above {Numbers.Short(1e3 * stray.Level)} mT {(stray.IsBound ? "at most" : "up to")} {Numbers.Significant(reach, 2)} m from the middle of the section "
                + "(0.5 mT: danger to pacemakers and other implants, EU directive 2013/35/EU; 3 mT: loose iron may fly). "
                + "A magnet of finite length falls off faster than this plane section."
            : "Stray field: not known from this model; measure before people with implants or loose iron come near.");
        cautions.Add(
            "A plane section knows nothing of the magnet's ends: there field, gradient and saturation differ over about a gap width. "
            + "The effective length is commonly taken as the iron length plus about one gap (common practice, less when the iron saturates). "
            + "Fringe fields and spin flips at entrance and exit are not modelled.");
        cautions.Add("Curves are single-valued: hysteresis, remanence and the history of the iron are not in the numbers; real poles keep some millitesla.");
        cautions.Add("Local safety rules and licensed practice come before anything printed here.");
        return cautions;
    }

    private static void AddForce(List<string> cautions, BeamReport report, OperationReport operation)
    {
        double pull = report.Circuit.GapPullPerMetre;
        PartReport? pulled = report.Parts.Where(p => p.ForcePerMetre is not null).MaxBy(p => p.ForcePerMetre!.Value.Length);
        double force = pulled?.ForcePerMetre?.Length ?? 0;
        if (pull > 0)
        {
            cautions.Add($"Force: the poles pull each other with {PerMetre(pull, "N", operation)} across the gap. Spacers and frame must hold it; "
                + "the gap narrows as they give way, and parts and tools can snap together and crush hands.");
        }

        if (force > 0)
        {
            string only = pulled!.ForceOnFreeFacesOnly ? " on its faces in air; what its joints to other iron carry is not in this number" : string.Empty;
            cautions.Add($"Force on a part: {pulled.Layer} is pulled with {PerMetre(force, "N", operation)}{only}.");
        }
    }

    private static void AddEnergy(List<string> cautions, OperationReport operation)
    {
        double energy = operation.Circuit.EnergyPerMetre;
        if (!(operation.Circuit.AmpereTurns > 0) || !(energy > 0))
        {
            return;
        }

        string voltage = operation.OverLength(operation.LinkagePerMetre) is { } linkage
            ? $": {Numbers.Significant(1e3 * linkage, 2)} V in each turn if the current ends within 1 ms"
            : string.Empty;
        cautions.Add($"Energy: {PerMetre(energy, "J", operation)} are stored in the field. Opening the circuit under current gives a high voltage{voltage}; "
            + "ramp down, or give the current a way through a diode or resistor.");
    }

    private static void AddHeat(List<string> cautions, BeamReport report, OperationReport operation)
    {
        if (operation.ColdHeatPerMetre is { } heat)
        {
            double densest = operation.Coils.Max(c => c.CurrentDensity);
            string cooling = densest > WaterCooled
                ? " Current density is beyond what water cooling usually bears (about 10 A/mm², common practice)."
                : densest > AirCooled ? " Current density calls for water cooling (beyond about 2 A/mm², common practice)." : string.Empty;
            cautions.Add($"Heat: the copper takes {PerMetre(heat, "W", operation)} at 20 °C, "
                + $"{Numbers.Significant(operation.WarmHeatPerMetre!.Value / heat, 3)} times as much at {Numbers.Short(operation.Setup.Celsius)} °C, without the coils' ends.{cooling}");
        }
        else if (report.Circuit.AmpereTurns > 0)
        {
            cautions.Add("Heat: state the copper's fill in the case to have current density and heat worked out.");
        }
    }

    private static string PerMetre(double value, string unit, OperationReport operation)
    {
        string total = operation.OverLength(value) is { } over ? $", {Numbers.Significant(over, 3)} {unit} over its length" : string.Empty;
        return $"{Numbers.Significant(value, 3)} {unit} per metre{total}";
    }
}
