using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Reads drawings in DXF, text or binary, versions R12 to 2018 (and others as far as they keep to the format).</summary>
/// <remarks>
/// Read: LINE, ARC, CIRCLE, ELLIPSE, LWPOLYLINE, POLYLINE, SPLINE and INSERT, in model space, as exact curves. All else is
/// counted in <see cref="Sketch.Skipped"/> with the reason. X and Y of the drawing become y and z.
/// </remarks>
public static class DxfReader
{
    // A cross-section outside these sizes, metres, more likely has the wrong unit (judgement).
    private const double SmallestPlausible = 1e-3, LargestPlausible = 10.0;

    // Heights apart by more than this part of the drawing's size are told.
    private const double FlatRounding = 1e-6;

    /// <summary>Reads a drawing.</summary>
    /// <param name="stream">The file's bytes; read to the end mark, left open.</param>
    /// <param name="name">File name for messages.</param>
    /// <param name="options">How to read; null for the defaults.</param>
    /// <returns>The visible curves in drawing units, with notes and warnings.</returns>
    /// <exception cref="InputException">The file is no drawing, damaged, or beyond the limits; holds all faults found.</exception>
    public static Sketch Read(Stream stream, string name, DxfReadOptions? options = null)
    {
        options ??= new DxfReadOptions();
        var report = new DxfReport(name, options.Limits.Faults);
        var bytes = new DxfBytes(stream, report, options.Limits.FileBytes);
        DxfPairs pairs = Open(bytes, report, options.Limits);
        pairs.Texts.IsUtf8 = bytes.HasMark;
        pairs.Texts.Choose(null, null);

        DxfDocument document = new DxfParser(pairs, report, options.Limits).Parse();
        (LengthUnit unit, UnitOrigin origin) = ChooseUnit(document, options, report);
        var expansion = new DxfExpansion(document, report, options.Limits, unit.Metres);
        expansion.Run();
        report.ThrowIfFaulty();
        Tell(expansion, report, unit);
        return new Sketch(name, unit, origin, expansion.Curves, expansion.Skipped, report.Findings);
    }

    private static DxfPairs Open(DxfBytes bytes, DxfReport report, DxfLimits limits)
    {
        bytes.Need(DxfForeign.Beginning);
        if (bytes.Ahead.StartsWith(DxfBinaryPairs.Mark))
        {
            bytes.Skip(DxfBinaryPairs.Mark.Length);
            return new DxfBinaryPairs(bytes, report, limits);
        }

        if (DxfForeign.Recognise(bytes.Ahead) is { } what)
        {
            throw report.Stop("not-dxf", $"The file is {what}, not a drawing in DXF.", "Export the drawing as DXF (text or binary).");
        }

        return new DxfTextPairs(bytes, report, limits);
    }

    private static (LengthUnit Unit, UnitOrigin Origin) ChooseUnit(
        DxfDocument document, DxfReadOptions options, DxfReport report)
    {
        long code = document.InsertUnits ?? 0;
        LengthUnit? stated = DxfUnits.Of(code);
        if (options.Unit is { } told)
        {
            string also = stated is not null && stated.Metres != told.Metres ? $"; the drawing's $INSUNITS says {stated.Name}" : string.Empty;
            report.Note("unit", $"Unit of the drawing: {told.Name}, as the case states{also}.", "Nothing to do.");
            return (told, UnitOrigin.CaseFile);
        }

        if (stated is not null)
        {
            bool disagree = document.Measurement is { } m && (m == 0) != DxfUnits.IsImperial((int)code);
            string also = disagree ? $"; $MEASUREMENT={document.Measurement} disagrees and does not count" : string.Empty;
            report.Note("unit", FormattableString.Invariant($"Unit of the drawing: {stated.Name}, from $INSUNITS={code}{also}."), "Nothing to do.");
            return (stated, UnitOrigin.InsertUnits);
        }

        string unknown = code != 0 ? FormattableString.Invariant($"$INSUNITS={code} is no known unit. ") : string.Empty;
        const string state = "State the unit in the case file, or set it in the drawing.";
        if (document.Measurement == 1)
        {
            Action<string, string, string, DxfPlace> tell = code != 0 ? report.Warn : report.Note;
            tell("unit", $"{unknown}Unit of the drawing: mm, from $MEASUREMENT=1.", state, default);
            return (LengthUnit.Millimetre, UnitOrigin.Measurement);
        }

        report.Warn("unit", $"{unknown}The drawing states no unit; mm is assumed.", state);
        return (LengthUnit.Millimetre, UnitOrigin.Assumed);
    }

    private static void Tell(DxfExpansion expansion, DxfReport report, LengthUnit unit)
    {
        foreach (SkippedEntities skipped in expansion.Skipped)
        {
            Tell(skipped, report);
        }

        foreach ((string layer, (int count, DxfPlace first)) in expansion.Fitted)
        {
            report.Warn(
                "fit-spline",
                FormattableString.Invariant(
                    $"Layer {DxfReport.Shown(layer)} has {count} SPLINE without control points; a cubic spline was laid through the fit points, and between them the drawing program may show another curve."),
                "Export splines with control points if the difference matters.",
                first);
        }

        if (expansion.Curves.Count == 0)
        {
            report.Warn("no-curves", "The drawing shows no curves.", "See what was skipped, and why.");
            return;
        }

        TellSize(expansion, report, unit);
    }

    private static void Tell(SkippedEntities skipped, DxfReport report)
    {
        var place = new DxfPlace(0, skipped.Layer);
        string which = FormattableString.Invariant($"{skipped.Count} {skipped.Kind} on layer {DxfReport.Shown(skipped.Layer)}");
        if (skipped.Why == DxfExpansion.NoLength)
        {
            report.Note("no-length", $"{which}: pieces without length were dropped.", "Nothing to do.", place);
        }
        else if (skipped.Why.StartsWith(DxfExpansion.CentreLine, StringComparison.Ordinal))
        {
            report.Warn("centre-line", $"{which} not read: {skipped.Why}.", "Give it a continuous line type if it bounds something.", place);
        }
        else if (skipped.Why == DxfExpansion.External)
        {
            report.Warn("external", $"{which} not read: {skipped.Why}.", "Bind the reference and export again.", place);
        }
        else if (DxfWords.NotRead(skipped.Kind) is { MayBeOutline: true } words && skipped.Why == words.Why)
        {
            report.Warn("not-read", $"{which} not read: {words.Why}.", words.Cure, place);
        }
    }

    private static void TellSize(DxfExpansion expansion, DxfReport report, LengthUnit unit)
    {
        Box box = Box.Empty;
        foreach (SketchCurve curve in expansion.Curves)
        {
            box = box.Including(curve.Curve.Start).Including(curve.Curve.End).Including(curve.Curve.At(0.5));
        }

        double size = box.Diagonal * unit.Metres;
        if (size is < SmallestPlausible or > LargestPlausible)
        {
            report.Warn(
                "size",
                FormattableString.Invariant($"The drawing is {size * 1e3:g4} mm across, which is unusual for a pole tip."),
                $"If its unit is not {unit.Name}, state the unit in the case file.");
        }

        (double low, double high) = expansion.Heights;
        if (high - low > FlatRounding * box.Diagonal)
        {
            report.Warn(
                "heights",
                FormattableString.Invariant($"Entities lie at heights from z = {low} to {high}; all were laid flat into one plane."),
                "Move everything to z = 0 if that was not meant.");
        }
    }
}
