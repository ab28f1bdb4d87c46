using System.Text.Json;
using PoleField.Beam;
using static PoleField.Output.Results.JsonText;

namespace PoleField.Output.Results;

/// <summary>Makes and reads the result file <c>polefield-result/1</c>.</summary>
public static class ResultJson
{
    /// <summary>Name and version of the format.</summary>
    public const string Format = "polefield-result/1";

    /// <summary>Turns a result (SI) into the file's sections (mm).</summary>
    public static ResultFile ToFile(SolveResult result)
    {
        BeamReport report = result.Report;
        SolveRecord record = result.Record;
        return new ResultFile(
            Format,
            result.Title,
            result.CaseSha256,
            result.SketchSha256,
            result.ProgramVersion,
            Beam(report),
            Aperture(report),
            [.. report.Parts.Select(Part)],
            Circuit(report.Circuit),
            new MeshSection(record.Triangles, record.Unknowns, record.Order, Finite(record.SmallestAngleDegrees)),
            Run(result),
            [.. result.Requirements.Select(r => new RequireSection(r.Name, r.Unit, Finite(r.Wanted), Finite(r.Found), r.Met))],
            result.Cautions,
            [.. result.Warnings.Select(w => new WarningSection(w.Where, w.Text))],
            [.. result.Materials.Select(m => new MaterialSection(m.Name, m.Description, m.Source, m.State, m.Caution))],
            result.Operation is { } operation ? Operation(operation) : null);
    }

    /// <summary>Reads a result file; keys it does not know are skipped, and what later versions of the program added may be missing.</summary>
    /// <exception cref="InputException">Not JSON, a required key is missing or of the wrong type, or another format.</exception>
    public static ResultFile Read(Stream stream, string fileName = "result")
    {
        try
        {
            ResultFile? file = JsonSerializer.Deserialize<ResultFile>(stream, Options);
            return file is { Format: Format }
                ? file
                : throw Unreadable(fileName, null, $"it has the format '{file?.Format ?? "null"}'");
        }
        catch (JsonException e)
        {
            int? line = e.LineNumber is long n ? (int)n + 1 : null;
            string place = string.IsNullOrEmpty(e.Path) ? "" : $" at {e.Path}";
            throw Unreadable(fileName, line, $"it is not in that form{place}");
        }
    }

    private static InputException Unreadable(string fileName, int? line, string what) => new(
    [
        new Finding(
            Severity.Fault,
            "result-unreadable",
            $"{fileName} cannot be read as {Format}: {what}.",
            "Give a result file written by this version, or solve again.") { File = fileName, Line = line },
    ]);

    internal static BeamSection Beam(BeamReport report)
    {
        BeamValues b = report.Beam;
        return new BeamSection(
            Millimetres(b.At.Y),
            Millimetres(b.At.Z),
            Finite(b.Field),
            Finite(report.FieldError),
            Finite(b.By),
            Finite(b.Bz),
            Finite(b.Gradient),
            Finite(report.GradientError),
            Finite(b.DBzDz),
            Finite(b.DByDz),
            Finite(b.TransverseGradient),
            report.Method == BeamFieldMethod.LocalFits ? "local-fits" : "harmonic-band");
    }

    private static ApertureSection Aperture(BeamReport report)
    {
        ApertureStatistics f = report.Field;
        ApertureStatistics g = report.Gradient;
        ApertureStatistics p = report.FieldTimesGradient;
        return new ApertureSection(
            Finite(report.ApertureArea * 1e6),
            Millimetres(report.Clearance),
            new FieldStatistics(Finite(f.Mean), Finite(f.Min), Finite(f.Max), Finite(f.Spread), Finite(f.Rms)),
            new GradientStatistics(
                Finite(g.Mean), Finite(g.Min), Finite(g.Max), Finite(g.Spread), Finite(g.Rms), Finite(report.GradientMeanError)),
            new ProductStatistics(Finite(p.Mean), Finite(p.Spread), Finite(p.Rms), Finite(p.Min), Finite(p.Max)),
            [.. report.ProfileY.Select(v => new ProfileAlongY(Millimetres(v.At.Y), Finite(v.Field), Finite(v.Gradient)))],
            [.. report.ProfileZ.Select(v => new ProfileAlongZ(Millimetres(v.At.Z), Finite(v.Field), Finite(v.Gradient)))]);
    }

    private static PartSection Part(PartReport p) => new(
        p.Layer,
        p.Kind,
        p.Material,
        Finite(p.Area * 1e6),
        p.Outlines,
        Finite(p.AmpereTurns),
        Finite(p.CurrentDensity / 1e6),
        Finite(p.FieldMax),
        Pair(p.FieldMaxAt, 1e3),
        Finite(p.FieldP99),
        Finite(p.SaturatedShare),
        Finite(p.MmfDrop),
        Pair(p.ForcePerMetre),
        Pair(p.ForceOtherWay),
        p.ForcePerMetre is null ? null : p.ForceOnFreeFacesOnly);

    private static CircuitSection Circuit(CircuitReport c) => new(
        Finite(c.AmpereTurns),
        Finite(c.GapAmpereTurns),
        Finite(c.IronAmpereTurns),
        Finite(c.Efficiency),
        Finite(c.EnergyPerMetre),
        Finite(c.InductancePerMetre * 1e6),
        Finite(c.GapPullPerMetre));

    private static RunSection Run(SolveResult result)
    {
        RunSeconds s = result.Seconds;
        return new RunSection(
            result.Record.NewtonSteps,
            result.Record.AdaptiveSteps,
            [.. result.Record.Rounds.Select(r => new RoundSection(r.Triangles, r.Unknowns, r.NewtonSteps, Finite(r.Accuracy)))],
            new SecondsSection(Finite(s.Read), Finite(s.Mesh), Finite(s.Solve), Finite(s.Evaluate), Finite(s.Total)),
            Finite(result.PeakMemoryMB),
            Finite(result.Record.AccuracyReached),
            Finite(result.Record.AccuracyAsked));
    }

    private static OperationSection Operation(OperationReport o)
    {
        CircuitReport c = o.Circuit;
        return new OperationSection(
            Millimetres(o.Setup.Length),
            Finite(o.Setup.Celsius),
            Finite(o.OverLength(o.ColdHeatPerMetre)),
            Finite(o.OverLength(o.WarmHeatPerMetre)),
            Finite(o.ColdHeatPerMetre),
            Finite(o.WarmHeatPerMetre),
            Finite(o.OverLength(c.GapPullPerMetre)),
            Finite(o.OverLength(c.EnergyPerMetre)),
            Finite(o.OverLength(1e6 * c.InductancePerMetre)),
            Finite(o.OverLength(o.LinkagePerMetre)),
            [.. o.Coils.Select(coil => new CoilSection(
                coil.Layer,
                Finite(1e6 * coil.CopperArea),
                Finite(1e-6 * coil.CurrentDensity),
                Finite(coil.HeatPerMetre()),
                Finite(coil.HeatPerMetre(o.Setup.Celsius))))],
            [.. o.Stray.Select(s => new StraySection(Finite(1e3 * s.Level), Finite(s.Distance), s.IsBound))]);
    }
}
