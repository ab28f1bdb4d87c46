using PoleField.Beam;
using PoleField.Cli.Case;

namespace PoleField.Cli.Text;

/// <summary>Prints the answer of <c>solve</c>: beam, aperture and requirements.</summary>
internal static class BeamTables
{
    public static void WriteBeam(TextWriter writer, BeamReport report, Ink ink)
    {
        BeamValues beam = report.Beam;
        writer.WriteLine(ink.Strong($"Beam at y = {Numbers.Millimetres(beam.At.Y)} mm, z = {Numbers.Millimetres(beam.At.Z)} mm"));
        var table = new TextTable("quantity", ">value", string.Empty);
        Add(table, "field |B|, T", beam.Field, report.FieldError);
        Add(table, "gradient d|B|/dz, T/m", beam.Gradient, report.GradientError);
        Add(table, "By, T", beam.By, 0);
        Add(table, "Bz, T", beam.Bz, 0);
        Add(table, "dBz/dz, T/m", beam.DBzDz, 0);
        Add(table, "transverse gradient d|B|/dy, T/m", beam.TransverseGradient, 0);
        WriteTable(writer, table, ink);
    }

    public static void WriteAperture(TextWriter writer, BeamReport report, Ink ink)
    {
        writer.WriteLine(ink.Strong(
            $"Aperture of {Numbers.Significant(report.ApertureArea * 1e6)} mm², clearance {Numbers.Significant(report.Clearance * 1e3, 4)} mm"));
        var table = new TextTable("quantity", ">mean", string.Empty, ">min", ">max", ">spread", ">rms");
        Add(table, "field, T", report.Field, 0);
        Add(table, "gradient, T/m", report.Gradient, report.GradientMeanError);
        Add(table, "field × gradient, T²/m", report.FieldTimesGradient, 0);
        WriteTable(writer, table, ink);
    }

    public static void WriteRequirements(TextWriter writer, IReadOnlyList<Verdict> verdicts, Ink ink)
    {
        if (verdicts.Count == 0)
        {
            return;
        }

        writer.WriteLine(ink.Strong("Requirements"));
        var table = new TextTable("name", "wanted", "found", "verdict");
        foreach (Verdict verdict in verdicts)
        {
            Dimension dimension = verdict.Limit.Quantity.Dimension;
            table.Add(
                verdict.Limit.Name,
                $"{(verdict.Limit.AtLeast ? "at least" : "at most")} {Numbers.InUnit(verdict.Limit.Bound, dimension)}",
                verdict.Found is { } found ? Numbers.InUnit(found, dimension) : "no such value",
                Words(verdict));
        }

        WriteTable(writer, table, ink);
    }

    public static void WriteTable(TextWriter writer, TextTable table, Ink ink)
    {
        foreach (string line in table.Lines(ink))
        {
            writer.WriteLine(line);
        }

        writer.WriteLine();
    }

    private static string Words(Verdict verdict)
    {
        string word = verdict.Met ? "met" : "not met";
        return verdict.IsWithinError ? word + ", within the error bar" : word;
    }

    private static void Add(TextTable table, string name, double value, double error)
    {
        string[] text = Numbers.WithError(value, error).Split(" ± ");
        table.Add(name, text[0], text.Length > 1 ? "± " + text[1] : string.Empty);
    }

    private static void Add(TextTable table, string name, ApertureStatistics of, double meanError)
    {
        string[] mean = Numbers.WithError(of.Mean, meanError).Split(" ± ");
        table.Add(
            name,
            mean[0],
            mean.Length > 1 ? "± " + mean[1] : string.Empty,
            Numbers.Significant(of.Min),
            Numbers.Significant(of.Max),
            Numbers.Percent(of.Spread),
            Numbers.Percent(of.Rms));
    }
}
