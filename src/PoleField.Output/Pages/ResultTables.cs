using System.Globalization;
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Output.Figures;
using PoleField.Output.Results;

namespace PoleField.Output.Pages;

/// <summary>The tables of a result, in words and units for people.</summary>
internal static class ResultTables
{
    public static ReportTable Requirements(SolveResult result) => new(
        "Requirements of the case",
        ["requirement", "wanted", "found", "verdict"],
        [
            .. result.Requirements.Select(r => (IReadOnlyList<string>)[Words(r.Name), WithUnit(r.Wanted, r.Unit), WithUnit(r.Found, r.Unit), Verdict.Of(r.Met)]),
        ]);

    public static ReportTable Beam(BeamReport report)
    {
        BeamValues b = report.Beam;
        return new ReportTable(
            $"At the beam's centre, y = {Number(1e3 * b.At.Y)} mm, z = {Number(1e3 * b.At.Z)} mm",
            ["quantity", "value", "unit"],
            [
                ["field |B|", WithError(b.Field, report.FieldError), "T"],
                ["gradient d|B|/dz", WithError(b.Gradient, report.GradientError), "T/m"],
                ["By, Bz", $"{Number(b.By)}, {Number(b.Bz)}", "T"],
                ["dBz/dz", Number(b.DBzDz), "T/m"],
                ["d|B|/dy", Number(b.TransverseGradient), "T/m"],
            ]);
    }

    public static ReportTable Aperture(BeamReport report)
    {
        ApertureStatistics f = report.Field, g = report.Gradient, p = report.FieldTimesGradient;
        return new ReportTable(
            "Over the aperture, area-weighted",
            ["quantity", "mean", "smallest", "largest", "spread", "rms", "unit"],
            [
                ["field |B|", Number(f.Mean), Number(f.Min), Number(f.Max), Percent(f.Spread), Percent(f.Rms), "T"],
                ["gradient d|B|/dz", WithError(g.Mean, report.GradientMeanError), Number(g.Min), Number(g.Max), Percent(g.Spread), Percent(g.Rms), "T/m"],
                ["|B| · d|B|/dz", Number(p.Mean), Number(p.Min), Number(p.Max), Percent(p.Spread), Percent(p.Rms), "T²/m"],
            ]);
    }

    public static ReportTable Parts(BeamReport report) => new(
        "Parts",
        ["layer", "kind", "material", "area (mm²)", "largest |B| (T)", "at y, z (mm)", "99 % below (T)", "saturated share", "ampere-turns (A)", "current density (A/mm²)", "force y, z (N/m)"],
        [
            .. report.Parts.Select(p => (IReadOnlyList<string>)
            [
                p.Layer, p.Kind, p.Material, Number(1e6 * p.Area), Number(p.FieldMax), Pair(p.FieldMaxAt, 1e3), Number(p.FieldP99),
                p.SaturatedShare is double share ? Percent(share) : "", Number(p.AmpereTurns), Number(p.CurrentDensity / 1e6), Pair(p.ForcePerMetre, 1),
            ]),
        ]);

    public static ReportTable Circuit(CircuitReport c) => new(
        "Magnetic circuit",
        ["quantity", "value", "unit"],
        [
            ["ampere-turns", Number(c.AmpereTurns), "A"],
            ["of these in the gap", Number(c.GapAmpereTurns), "A"],
            ["in iron and leakage", Number(c.IronAmpereTurns), "A"],
            ["efficiency", c.Efficiency is double e ? Percent(e) : "–", ""],
            ["stored energy", Number(c.EnergyPerMetre), "J per metre"],
            ["inductance", Number(1e6 * c.InductancePerMetre), "µH per metre and turn²"],
        ]);

    public static ReportTable Run(SolveResult result)
    {
        SolveRecord r = result.Record;
        RunSeconds s = result.Seconds;
        return new ReportTable(
            "How it was computed",
            ["quantity", "value"],
            [
                ["triangles, order", $"{Whole(r.Triangles)}, {Whole(r.Order)}"],
                ["unknowns", Whole(r.Unknowns)],
                ["smallest angle", $"{Number(r.SmallestAngleDegrees)}°"],
                ["Newton steps, refined meshes", $"{Whole(r.NewtonSteps)}, {Whole(r.AdaptiveSteps)}"],
                ["relative accuracy reached (asked)", $"{Number(r.AccuracyReached, 2)} ({Number(r.AccuracyAsked, 2)})"],
                ["seconds: read, mesh, solve, evaluate, total", string.Join(", ", new[] { s.Read, s.Mesh, s.Solve, s.Evaluate, s.Total }.Select(v => Number(v, 3)))],
                ["largest memory", $"{Number(result.PeakMemoryMB)} MB"],
            ]);
    }

    public static ReportTable Provenance(SolveResult result) => new(
        "Provenance",
        ["what", "value"],
        [
            ["program", "PoleField " + result.ProgramVersion],
            ["SHA-256 of the case", result.CaseSha256],
            ["SHA-256 of the sketch", result.SketchSha256],
        ]);

    /// <summary>A value and its error bar with as many digits as the bar allows: 310.2500 ± 0.0015.</summary>
    public static string WithError(double value, double error)
    {
        if (!(error > 0.0) || !double.IsFinite(error) || !double.IsFinite(value))
        {
            return Number(value, 6);
        }

        int decimals = Math.Clamp(1 - (int)Math.Floor(Math.Log10(error)), 0, 12);
        string form = "F" + decimals.ToString(CultureInfo.InvariantCulture);
        return $"{value.ToString(form, CultureInfo.InvariantCulture)} ± {error.ToString(form, CultureInfo.InvariantCulture)}".Replace('-', '−');
    }

    public static string Percent(double share) => double.IsFinite(share) ? FigureStyle.Number(100 * share, 3) + " %" : "–";

    public static string Number(double? value, int digits = 5) => value is double v ? FigureStyle.Number(v, digits) : "";

    private static string WithUnit(double value, string unit) => unit == "1" ? Percent(value) : $"{Number(value)} {unit}";

    private static string Words(string key) => key.Replace('_', ' ');

    private static string Whole(int value) => value.ToString(CultureInfo.InvariantCulture);

    private static string Pair(Point? p, double factor) =>
        p is Point q ? $"{Number(factor * q.Y, 4)}, {Number(factor * q.Z, 4)}" : "";
}
