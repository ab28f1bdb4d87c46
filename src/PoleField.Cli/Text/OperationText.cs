using PoleField.Output.Results;

namespace PoleField.Cli.Text;

/// <summary>Tells what running a magnet takes: heat, pull, energy, and the field around it.</summary>
internal static class OperationText
{
    /// <summary>The tables and remarks, each with the anchor of its section in a report.</summary>
    public static IReadOnlyList<(string Id, Answer Answer)> Of(ResultFile result)
    {
        if (result.Operation is not { } operation)
        {
            return [];
        }

        return operation.Stray.Count == 0 ? [("coils", Coils(operation, result.Circuit))] : [("coils", Coils(operation, result.Circuit)), ("stray-field", StrayField(operation))];
    }

    private static Answer Coils(OperationSection o, CircuitSection circuit)
    {
        string warm = Numbers.Short(o.Celsius ?? double.NaN);
        List<AnswerTable> tables = [];
        if (o.Coils.Count > 0)
        {
            tables.Add(new AnswerTable(
                "Copper, per metre of length",
                ["layer", ">copper, mm²", ">A/mm²", ">W/m at 20 °C", $">W/m at {warm} °C"],
                [.. o.Coils.Select(c => new[]
                {
                    Cell.Of(c.Layer, 16),
                    Cell.Of(c.CopperArea, digits: 4),
                    Cell.Of(c.CurrentDensity, digits: 3),
                    Cell.Of(c.ColdHeat, digits: 3),
                    Cell.Of(c.WarmHeat, digits: 3),
                })]));
        }

        tables.Add(new AnswerTable(
            "Heat, pull and switch-off",
            ["quantity", ">per metre", o.Length is { } l ? $">over {Numbers.Short(l)} mm" : ">over the length"],
            [
                ["heat of all coils at 20 °C, W", Cell.Of(o.ColdHeatPerMetre, digits: 3), Cell.Of(o.ColdHeat, digits: 3)],
                [$"heat of all coils at {warm} °C, W", Cell.Of(o.WarmHeatPerMetre, digits: 3), Cell.Of(o.WarmHeat, digits: 3)],
                ["pull between the poles, N", Cell.Of(circuit.GapPull, digits: 4), Cell.Of(o.Pull, digits: 4)],
                ["stored energy, J", Cell.Of(circuit.Energy, digits: 4), Cell.Of(o.Energy, digits: 4)],
                ["inductance, µH per turn²", Cell.Of(circuit.Inductance, digits: 4), Cell.Of(o.Inductance, digits: 4)],
                ["flux linked with a turn, mWb", Cell.Of(1e3 * o.Linkage / (1e-3 * o.Length), digits: 4), Cell.Of(1e3 * o.Linkage, digits: 4)],
            ]));
        return new Answer(
            "Coils, pull and switch-off",
            tables,
            [
                "The coils' ends are not counted: they add copper, heat and inductance. Copper of 1/58 µΩ·m at 20 °C with 0.393 % per kelvin.",
                "Up to about 2 A/mm² windings are cooled by air, up to about 10 A/mm² by water in the conductor (common practice).",
                "Pull: Maxwell's stress across the horizontal line through the beam; spacers and frame must carry it.",
                "Never open the coil's circuit under current: the linked flux over the time of the switch-off is the mean voltage of a turn. "
                    + "In saturating iron the inductance is that of the whole linkage at this current; small changes meet less.",
            ]);
    }

    private static Answer StrayField(OperationSection o) => new(
        "Stray field",
        [
            new AnswerTable(
                "Distance from the middle of the section inside which the field exceeds a level",
                [">level, mT", ">distance, m"],
                [.. o.Stray.Select(s => new[] { s.Level is { } level ? Numbers.Short(level) : "-", (s.IsBound ? "≤ " : string.Empty) + Cell.Of(s.Distance, digits: 2) })]),
        ],
        [
            "0.5 mT is the action level for implanted devices, 3 mT that for flying iron (directive 2013/35/EU); local rules may be stricter.",
            "≤: weaker already on the circle around the section. A magnet of finite length falls off faster than this plane section.",
        ]);
}
