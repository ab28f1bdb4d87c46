using PoleField.Beam;
using PoleField.Cli.Files;

namespace PoleField.Cli.Text;

/// <summary>Prints a whole result of <c>solve</c>, at most 80 columns wide.</summary>
internal static class SolveTables
{
    private const int Width = 80;

    public static void Write(TextWriter writer, SolvedCase result, Ink ink)
    {
        BeamReport report = result.Solved.Report;
        writer.WriteLine(ink.Strong(result.Case.Case!.Title));
        writer.WriteLine($"  case {Path.GetFileName(result.Case.Path)}, sketch {result.Case.Sketch!.Name} ({result.Case.DrawingUnit})");
        writer.WriteLine();
        BeamTables.WriteBeam(writer, report, ink);
        BeamTables.WriteAperture(writer, report, ink);
        WriteParts(writer, report, ink);
        WriteCoilsAndForces(writer, report, ink);
        WriteCircuit(writer, report.Circuit, ink);
        foreach (AnswerTable table in OperationText.Of(ResultOutput.FileOf(result)).SelectMany(o => o.Answer.Tables))
        {
            table.Write(writer, ink);
        }

        WriteRun(writer, result, ink);
        BeamTables.WriteRequirements(writer, result.Verdicts, ink);
        WriteCautions(writer, result, ink);
    }

    private static void WriteParts(TextWriter writer, BeamReport report, Ink ink)
    {
        writer.WriteLine(ink.Strong("Parts"));
        var table = new TextTable("layer", "kind", "material", ">area, mm²", ">B max, T", ">at y, z, mm", ">saturated");
        foreach (PartReport part in report.Parts)
        {
            table.Add(
                Cell.Of(part.Layer, 14),
                part.Kind,
                Cell.Of(part.Material, 16),
                Numbers.Significant(part.Area * 1e6, 4),
                Cell.Of(part.FieldMax, digits: 4),
                part.FieldMaxAt is { } at ? $"{Numbers.Millimetres(at.Y, 1)}, {Numbers.Millimetres(at.Z, 1)}" : "-",
                part.SaturatedShare is { } share ? Numbers.Percent(share) : "-");
        }

        BeamTables.WriteTable(writer, table, ink);
    }

    private static void WriteCoilsAndForces(TextWriter writer, BeamReport report, Ink ink)
    {
        PartReport[] parts = [.. report.Parts.Where(p => p.AmpereTurns is not null || p.ForcePerMetre is not null || p.MmfDrop is not null)];
        if (parts.Length == 0)
        {
            return;
        }

        writer.WriteLine(ink.Strong("Currents and forces"));
        var table = new TextTable("layer", ">ampere-turns, A", ">A/mm²", ">drop, A", ">force y, N/m", ">force z, N/m");
        foreach (PartReport part in parts)
        {
            table.Add(
                Cell.Of(part.Layer, 16),
                Cell.Of(part.AmpereTurns),
                Cell.Of(part.CurrentDensity, 1e-6, 3),
                Cell.Of(part.MmfDrop, digits: 4),
                Force(part, part.ForcePerMetre?.Y),
                Force(part, part.ForcePerMetre?.Z));
        }

        BeamTables.WriteTable(writer, table, ink);
        if (parts.Any(p => p.ForceOnFreeFacesOnly))
        {
            writer.WriteLine("  * on faces in air alone; what the joint to other iron carries is not counted");
            writer.WriteLine();
        }
    }

    private static string Force(PartReport part, double? component) =>
        Cell.Of(component, digits: 4) + (part.ForceOnFreeFacesOnly ? "*" : string.Empty);

    private static void WriteCircuit(TextWriter writer, CircuitReport circuit, Ink ink)
    {
        writer.WriteLine(ink.Strong("Circuit"));
        var table = new TextTable("quantity", ">value");
        table.Add("ampere-turns, A", Numbers.Significant(circuit.AmpereTurns));
        table.Add("of these across the gap, A", Numbers.Significant(circuit.GapAmpereTurns));
        table.Add("in iron and leakage, A", Numbers.Significant(circuit.IronAmpereTurns));
        table.Add("efficiency (gap share)", circuit.Efficiency is { } e ? Numbers.Percent(e) : "-");
        table.Add("stored energy, J/m", Numbers.Significant(circuit.EnergyPerMetre));
        table.Add("inductance, µH/m per turn²", Cell.Of(circuit.InductancePerMetre, 1e6));
        table.Add("pull across the gap, N/m", Numbers.Significant(circuit.GapPullPerMetre, 4));
        BeamTables.WriteTable(writer, table, ink);
    }

    private static void WriteRun(TextWriter writer, SolvedCase result, Ink ink)
    {
        SolveRecord record = result.Solved.Record;
        writer.WriteLine(ink.Strong("Mesh and run"));
        writer.WriteLine(FormattableString.Invariant(
            $"  {record.Triangles} triangles of order {record.Order}, {record.Unknowns} unknowns, smallest angle {record.SmallestAngleDegrees:F1}°"));
        writer.WriteLine(FormattableString.Invariant(
            $"  {record.AdaptiveSteps} {(record.AdaptiveSteps == 1 ? "refinement" : "refinements")}, {record.NewtonSteps} Newton steps, {result.TotalSeconds:F1} s, {result.PeakMemoryMegabytes:F0} MB"));
        string accuracy = $"accuracy {Numbers.Accuracy(record.AccuracyReached)} of {Numbers.Accuracy(record.AccuracyAsked)} asked: ";
        writer.WriteLine("  " + accuracy + (record.AccuracyMet ? ink.Good("reached") : ink.Bad("not reached")));
        writer.WriteLine();
    }

    private static void WriteCautions(TextWriter writer, SolvedCase result, Ink ink)
    {
        if (result.Warnings.Count > 0)
        {
            writer.WriteLine(ink.Strong("Warnings"));
            FindingText.Write(writer, result.Warnings, ink, result.Case.DrawingUnit);
            writer.WriteLine();
        }

        writer.WriteLine(ink.Strong("Cautions"));
        foreach (string line in result.Cautions.SelectMany(c => Wrapped.Lines(c, Width, "  - ")))
        {
            writer.WriteLine(line);
        }
    }
}
