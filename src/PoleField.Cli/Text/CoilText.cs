using PoleField.Beam;
using PoleField.Magnetostatics;

namespace PoleField.Cli.Text;

/// <summary>Tells of heat in the coils and of the field around the magnet.</summary>
internal static class CoilText
{
    private const double Warm = 80; // °C, a winding in steady use (common practice)

    // Common levels to fence off; 0.5 mT and 3 mT are those of directive 2013/35/EU.
    private static readonly double[] Levels = [StrayField.ImplantLevel, 1e-3, StrayField.AttractionLevel, 10e-3];

    /// <summary>Null when no coil states its copper share.</summary>
    public static Answer? Coils(Magnet magnet, double? length)
    {
        IReadOnlyList<CoilReport> coils = CoilReport.Of(magnet);
        if (coils.Count == 0)
        {
            return null;
        }

        var table = new AnswerTable(
            "Heat in the copper, without the ends",
            ["layer", ">copper, mm²", ">A/mm²", ">W/m at 20 °C", ">W/m at 80 °C"],
            [.. coils.Select(c => new[]
            {
                c.Layer,
                Numbers.Significant(c.CopperArea * 1e6, 4),
                Numbers.Significant(c.CurrentDensity * 1e-6, 3),
                Numbers.Significant(c.HeatPerMetre(), 3),
                Numbers.Significant(c.HeatPerMetre(Warm), 3),
            })]);
        double cold = coils.Sum(c => c.HeatPerMetre());
        double warm = coils.Sum(c => c.HeatPerMetre(Warm));
        string total = length is { } l
            ? $"All coils: {Numbers.Significant(cold * l, 3)} W at 20 °C, {Numbers.Significant(warm * l, 3)} W at 80 °C over the magnet's length, ends not counted."
            : $"All coils: {Numbers.Significant(cold, 3)} W per metre at 20 °C, {Numbers.Significant(warm, 3)} W per metre at 80 °C, ends not counted.";
        return new Answer(
            "Coils",
            [table],
            [total, "Up to about 2 A/mm² windings are cooled by air, up to about 10 A/mm² by water in the conductor (common practice)."]);
    }

    /// <summary>Null in a uniform background, which never falls off.</summary>
    public static Answer? StrayFieldOf(SolvedMagnet solved)
    {
        Magnet magnet = solved.Solution.Magnet;
        if (magnet.AppliedField != default || magnet.Section.HasRim)
        {
            return null;
        }

        var table = new AnswerTable(
            "Distance from the middle of the section inside which the field exceeds a level",
            [">level, mT", ">distance, m"],
            [.. Levels.Select(level => new[]
            {
                Numbers.Short(level * 1e3),
                Cell.Of(StrayField.Reach(p => solved.Solution.At(p)?.Magnitude, magnet.Section.Bounds, level), digits: 2),
            })]);
        return new Answer(
            "Stray field",
            [table],
            [
                "0.5 mT is the action level for implanted devices, 3 mT that for flying iron (directive 2013/35/EU); local rules may be stricter.",
                "The smallest distance shown is the circle around the section. A magnet of finite length falls off faster than this plane section.",
            ]);
    }
}
