using System.Globalization;
using OxyPlot;
using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Output.Figures;

/// <summary>The sketch as it was read, with every fault, doubt and healed joint marked by a number that the list below explains.</summary>
public static class SketchFigure
{
    private const double PlotWidth = 640;
    private const int MostListed = 20;

    // Shade and dash together keep layers apart on a grey print.
    private static IReadOnlyList<Pen> LayerPens { get; } =
    [
        new(FigureStyle.Ink, 1.6), new(OxyColor.FromRgb(0x1f, 0x5a, 0x99), 1.6, 3, 1.5), new(OxyColor.FromRgb(0xa8, 0x55, 0x0a), 1.6, 2, 2),
        new(OxyColor.FromRgb(0x5a, 0x62, 0x6b), 1.6, 4, 1.5, 1, 1.5), new(OxyColor.FromRgb(0x2f, 0x7d, 0x7a), 2.2),
        new(OxyColor.FromRgb(0x7a, 0x6a, 0x9a), 2.2, 2, 1), new(OxyColor.FromRgb(0x8a, 0x8f, 0x96), 1.8, 1.2, 1.8),
    ];

    /// <summary>Draws a sketch and what was found in it.</summary>
    /// <param name="sketch">The sketch, at least one curve.</param>
    /// <param name="findings">Findings with or without a place; those without are only listed.</param>
    public static Figure Draw(Sketch sketch, IReadOnlyList<Finding> findings)
    {
        Affine toMetres = Affine.Scaling(sketch.Unit.Metres);
        Box bounds = Box.Empty;
        foreach (SketchCurve c in sketch.Curves)
        {
            bounds = bounds.Including(c.Curve.Bounds);
        }

        Box seen = Box.Around(toMetres.Apply(bounds.Min), toMetres.Apply(bounds.Max));
        seen = seen.Inflated(Math.Max(0.05 * seen.Diagonal, 1e-6));
        double height = Math.Clamp(PlotWidth * seen.Height / seen.Width, 280, 700);
        Box view = SectionDrawing.View(seen, PlotWidth / height);
        string[] layers = [.. sketch.Curves.Select(c => c.Layer).Distinct()];
        Finding[] numbered = [.. findings.OrderByDescending(f => f.Severity).Take(MostListed)];

        Figure figure = FigureFrame.Begin(
            new FrameText
            {
                Name = "sketch",
                Title = $"Sketch {sketch.Name} as read",
                Caption = Caption(sketch, findings),
                Key = [.. layers.Select((layer, i) => new KeyEntry(layer, LayerPens[i % LayerPens.Count]))],
                Notes = [.. numbered.Select(Note), .. More(findings.Count - numbered.Length)],
            },
            new PlotRoom(PlotWidth, height));
        FieldFigure.AddAxes(figure.Model, view);
        double tolerance = 0.1 * view.Width / PlotWidth / sketch.Unit.Metres;
        for (int i = 0; i < layers.Length; i++)
        {
            IReadOnlyList<IReadOnlyList<Point>> lines =
            [
                .. sketch.Curves.Where(c => c.Layer == layers[i])
                    .Select(c => (IReadOnlyList<Point>)[.. SectionDrawing.Flatten(c.Curve, tolerance).Select(toMetres.Apply)]),
            ];
            // A thin whole line below the dashes: a gap in the picture is a gap in the drawing.
            Pen pen = LayerPens[i % LayerPens.Count];
            figure.Model.Annotations.Add(new Strokes(lines, new Pen(pen.Colour, 0.6), rim: 0));
            figure.Model.Annotations.Add(new Strokes(lines, pen, rim: 0));
        }

        (int, Severity, Point)[] places =
        [
            .. numbered.Select((f, i) => (Number: i + 1, f.Severity, At: f.At ?? (f.AtDrawing is Point p ? toMetres.Apply(p) : null as Point?)))
                .Where(m => m.At is not null).Select(m => (m.Number, m.Severity, m.At!.Value)),
        ];
        figure.Model.Annotations.Add(new Marks((rc, screen, area) => MarkFindings(rc, screen, area, places)));
        return figure;
    }

    private static string Caption(Sketch sketch, IReadOnlyList<Finding> findings)
    {
        int faults = findings.Count(f => f.Severity == Severity.Fault);
        int warnings = findings.Count(f => f.Severity == Severity.Warning);
        int notes = findings.Count - faults - warnings;
        return $"{sketch.Curves.Count} curves, drawn in {sketch.Unit.Name}. Faults (cross): {faults}. "
            + $"Warnings (triangle): {warnings}. Notes, such as healed joints (ring): {notes}.";
    }

    private static string Note(Finding f, int index)
    {
        string kind = f.Severity switch { Severity.Fault => "fault", Severity.Warning => "warning", _ => "note" };
        string layer = f.Layer is null ? "" : $", layer {f.Layer}";
        string line = f.Line is int n ? $", line {n.ToString(CultureInfo.InvariantCulture)}" : "";
        return $"{index + 1}. {char.ToUpperInvariant(kind[0])}{kind[1..]}{layer}{line}. {f.Text}";
    }

    private static string[] More(int count) => count > 0 ? [$"… and {count} more."] : [];

    private static void MarkFindings(IRenderContext rc, Func<Point, ScreenPoint> screen, OxyRect area, (int Number, Severity Severity, Point At)[] places)
    {
        List<OxyRect> taken = [.. places.Select(p => Mark.Around(screen(p.At), 7))];
        foreach ((int number, Severity severity, Point at) in places)
        {
            ScreenPoint p = screen(at);
            DrawMark(rc, p, severity);
            string text = number.ToString(CultureInfo.InvariantCulture);
            for (int turn = 0; turn < 24; turn++)
            {
                // Up and to the right first, then round in growing circles until there is room.
                double angle = (-Math.PI / 4) + (turn % 8 * Math.PI / 4), distance = 15 + (12 * (turn / 8));
                ScreenPoint label = new(p.X + (distance * Math.Cos(angle)), p.Y + (distance * Math.Sin(angle)));
                OxyRect box = Mark.LabelBox(label, text);
                bool inside = box.Left > area.Left && box.Right < area.Right && box.Top > area.Top && box.Bottom < area.Bottom;
                if (inside && !taken.Exists(t => LevelLabels.Overlap(t, box)))
                {
                    taken.Add(Mark.Label(rc, label, text));
                    break;
                }
            }
        }
    }

    private static void DrawMark(IRenderContext rc, ScreenPoint p, Severity severity)
    {
        const EdgeRenderingMode mode = EdgeRenderingMode.PreferGeometricAccuracy;
        OxyColor red = OxyColor.FromRgb(0xa3, 0x12, 0x12);
        if (severity == Severity.Fault)
        {
            const double d = 5;
            rc.DrawEllipse(Mark.Around(p, 8), FigureStyle.Veil, red, 1.6, mode);
            rc.DrawLine([new(p.X - d, p.Y - d), new(p.X + d, p.Y + d)], red, 2.2, mode, null, LineJoin.Miter);
            rc.DrawLine([new(p.X - d, p.Y + d), new(p.X + d, p.Y - d)], red, 2.2, mode, null, LineJoin.Miter);
        }
        else if (severity == Severity.Warning)
        {
            rc.DrawPolygon([new(p.X, p.Y - 8), new(p.X + 7.5, p.Y + 5.5), new(p.X - 7.5, p.Y + 5.5)], OxyColor.FromAColor(0x80, OxyColors.White), FigureStyle.Reference.Colour, 2, mode, null, LineJoin.Miter);
        }
        else
        {
            rc.DrawEllipse(Mark.Around(p, 6), OxyColors.Undefined, FigureStyle.Main.Colour, 1.8, mode);
        }
    }
}
