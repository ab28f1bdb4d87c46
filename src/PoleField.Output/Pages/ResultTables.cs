using System.Globalization;
using PoleField.Output.Figures;
using PoleField.Output.Results;

namespace PoleField.Output.Pages;

/// <summary>The tables of a result, in words and units for people.</summary>
internal static class ResultTables
{
    public static ReportTable Requirements(ResultFile result) => new(
        "Requirements of the case",
        ["quantity", "wanted", "found", "verdict"],
        [.. result.Require.Select(r => (IReadOnlyList<string>)[Words(r.Name), Bound(r) + WithUnit(r.Wanted, r.Unit), WithUnit(r.Found, r.Unit), Verdict.Of(r.Met)])]);

    public static ReportTable Beam(BeamSection b) => new(
        $"At the beam's centre, y = {Number(b.Y)} mm, z = {Number(b.Z)} mm",
        ["quantity", "value", "unit"],
        [
            ["field |B|", WithError(b.Field, b.FieldError), "T"],
            ["gradient d|B|/dz", WithError(b.Gradient, b.GradientError), "T/m"],
            ["By, Bz", $"{Number(b.By)}, {Number(b.Bz)}", "T"],
            ["dBz/dz", Number(b.DBzDz), "T/m"],
            ["d|B|/dy", Number(b.TransverseGradient), "T/m"],
        ]);

    public static ReportTable Aperture(ApertureSection a) => new(
        "Over the aperture, area-weighted",
        ["quantity", "mean", "smallest", "largest", "spread", "rms", "unit"],
        [
            ["field |B|", Number(a.Field.Mean), Number(a.Field.Min), Number(a.Field.Max), Percent(a.Field.Spread), Percent(a.Field.Rms), "T"],
            [
                "gradient d|B|/dz", WithError(a.Gradient.Mean, a.Gradient.Error), Number(a.Gradient.Min), Number(a.Gradient.Max),
                Percent(a.Gradient.Spread), Percent(a.Gradient.Rms), "T/m",
            ],
            [
                "|B| · d|B|/dz", Number(a.FieldTimesGradient.Mean), Number(a.FieldTimesGradient.Min), Number(a.FieldTimesGradient.Max),
                Percent(a.FieldTimesGradient.Spread), Percent(a.FieldTimesGradient.Rms), "T²/m",
            ],
        ]);

    public static ReportTable Iron(IReadOnlyList<PartSection> parts) => new(
        "Flux density in the parts",
        ["layer", "kind", "material", "area (mm²)", "largest |B| (T)", "at y, z (mm)", "99 % below (T)", "saturated share", "ampere-turns spent (A)"],
        [
            .. parts.Select(p => (IReadOnlyList<string>)
            [
                p.Layer, p.Kind, p.Material, Number(p.Area), Number(p.FieldMax), Pair(p.FieldMaxAt), Number(p.FieldP99),
                p.SaturatedShare is double share ? Percent(share) : "", Number(p.MmfDrop, 4),
            ]),
        ]);

    public static ReportTable Forces(IReadOnlyList<PartSection> parts) => new(
        "Currents and magnetic forces, per metre of length",
        ["layer", "ampere-turns of an outline (A)", "current density (A/mm²)", "force along y (N/m)", "force along z (N/m)", "counted"],
        [
            .. parts.Where(p => p.Force is not null).Select(p => (IReadOnlyList<string>)
            [
                p.Layer, Number(p.AmpereTurns), Number(p.CurrentDensity, 3), Number(p.Force![0], 4), Number(p.Force[1], 4),
                p.ForceOnFreeFacesOnly == true ? "faces in air only" : "whole part",
            ]),
        ]);

    public static ReportTable Circuit(CircuitSection c) => new(
        "Magnetic circuit",
        ["quantity", "value", "unit"],
        [
            ["ampere-turns", Number(c.AmpereTurns), "A"],
            ["of these in the gap", Number(c.GapAmpereTurns), "A"],
            ["in iron and leakage", Number(c.IronAmpereTurns), "A"],
            ["efficiency", Percent(c.Efficiency), ""],
            ["stored energy", Number(c.Energy), "J per metre"],
            ["inductance", Number(c.Inductance), "µH per metre and turn²"],
            ["pull across the gap", Number(c.GapPull), "N per metre"],
        ]);

    public static ReportTable Materials(IReadOnlyList<MaterialSection> materials) => new(
        "Materials and where their curves come from",
        ["material", "what it is", "source"],
        [.. materials.Select(m => (IReadOnlyList<string>)[m.Name, string.Join("; ", new[] { m.Text, m.State, m.Caution }.Where(t => !string.IsNullOrEmpty(t))), m.Source])]);

    public static ReportTable Run(ResultFile result)
    {
        RunSection r = result.Run;
        SecondsSection s = r.Seconds;
        return new ReportTable(
            "Mesh and accuracy",
            ["quantity", "value"],
            [
                ["triangles, order", $"{Whole(result.Mesh.Triangles)}, {Whole(result.Mesh.Order)}"],
                ["unknowns", Whole(result.Mesh.Unknowns)],
                ["smallest angle", $"{Number(result.Mesh.SmallestAngle)}°"],
                ["Newton steps, refined meshes", $"{Whole(r.NewtonSteps)}, {Whole(r.AdaptiveSteps)}"],
                ["relative accuracy reached (asked)", $"{Number(r.AccuracyReached, 2)} ({Number(r.AccuracyAsked, 2)})"],
                ["seconds: read, mesh, solve, evaluate, total", string.Join(", ", new[] { s.Read, s.Mesh, s.Solve, s.Evaluate, s.Total }.Select(v => Number(v, 3)))],
                ["largest memory", $"{Number(r.PeakMemory)} MB"],
            ]);
    }

    public static ReportTable Provenance(ResultFile result) => new(
        "Provenance",
        ["what", "value"],
        [
            ["program", "PoleField " + result.ProgramVersion],
            ["SHA-256 of the case", result.CaseSha256],
            ["SHA-256 of the sketch", result.SketchSha256],
        ]);

    /// <summary>A value and its error bar with as many digits as the bar allows: 310.2500 ± 0.0015.</summary>
    public static string WithError(double? given, double? bar)
    {
        if (given is not { } value || bar is not { } error || !(error > 0.0) || !double.IsFinite(error))
        {
            return Number(given, 6);
        }

        int decimals = Math.Clamp(1 - (int)Math.Floor(Math.Log10(error)), 0, 12);
        string form = "F" + decimals.ToString(CultureInfo.InvariantCulture);
        return $"{value.ToString(form, CultureInfo.InvariantCulture)} ± {error.ToString(form, CultureInfo.InvariantCulture)}".Replace('-', '−');
    }

    public static string Percent(double? share) => share is { } s && double.IsFinite(s) ? FigureStyle.Number(100 * s, 3) + " %" : "–";

    public static string Number(double? value, int digits = 5) => value is double v ? FigureStyle.Number(v, digits) : "";

    private static string WithUnit(double? value, string unit) => unit == "1" ? Percent(value) : value is null ? "–" : $"{Number(value)} {unit}";

    // The keys of [require] end with the side of the bound: gradient_min, spread_max.
    private static string Words(string key) => key[..(key.EndsWith("_min", StringComparison.Ordinal) || key.EndsWith("_max", StringComparison.Ordinal) ? ^4 : ^0)].Replace('_', ' ');

    private static string Bound(RequireSection r) =>
        r.Name.EndsWith("_min", StringComparison.Ordinal) ? "at least " : r.Name.EndsWith("_max", StringComparison.Ordinal) ? "at most " : "";

    private static string Whole(int value) => value.ToString(CultureInfo.InvariantCulture);

    private static string Pair(IReadOnlyList<double>? p) => p is [var y, var z] ? $"{Number(y, 4)}, {Number(z, 4)}" : "";
}
