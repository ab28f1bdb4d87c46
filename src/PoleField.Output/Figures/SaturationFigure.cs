using OxyPlot;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Output.Figures;

/// <summary>|B| in the iron, with its largest value marked.</summary>
public static class SaturationFigure
{
    private const double PlotWidth = 620;
    private const double PixelsPerPoint = 1.6;

    /// <summary>Draws |B| in the iron parts; air and coils stay white.</summary>
    public static Figure Draw(FieldScene scene)
    {
        Box seen = SectionDrawing.WholeView(scene.Section, scene.Aperture);
        double height = Math.Clamp(PlotWidth * seen.Height / seen.Width, 220, 700);
        Box view = SectionDrawing.View(seen, PlotWidth / height);
        double point = view.Width / PlotWidth;
        FieldTriangle[] iron = [.. scene.Triangles.Where(t => IsIron(scene, t.Region))];
        FieldRaster raster = FieldRaster.OfMagnitude(iron, view, (int)(PlotWidth * PixelsPerPoint));
        Peak peak = Worst(scene, iron);
        double top = Math.Max(Math.Min(peak.Field, 1.03 * raster.Quantile(0.999)), 1e-6); // a sharp corner must not set the scale
        double step = FigureStyle.NiceStep(top / 4);
        IReadOnlyList<LevelLine> lines = LevelLines.Trace(
            iron.Select(t => new ValueTriangle(t.P0, t.P1, t.P2, t.S0.Magnitude, t.S1.Magnitude, t.S2.Magnitude)), step, 0.15 * point, join: point);

        Figure figure = FigureFrame.Begin(
            new FrameText
            {
                Name = "saturation",
                Title = "Flux density in the iron",
                Caption = Caption(peak, step),
                Key = [new("outline of a part", FigureStyle.Outline), new("line of equal |B|", FigureStyle.Contour), new("aperture", FigureStyle.Aperture)],
            },
            new PlotRoom(PlotWidth, height, Right: ColourBar.Room));
        PlotModel model = figure.Model;
        FieldFigure.AddAxes(model, view);
        FieldFigure.AddImage(model, raster.Image(0, top, FigureStyle.Unsigned), view);
        model.Annotations.Add(new Strokes([.. lines.Select(l => l.Points)], FigureStyle.Contour, rim: 0));
        model.Annotations.Add(new Strokes(SectionDrawing.Outlines(scene.Section, 0.1 * point), FigureStyle.Outline, rim: 0));
        FieldFigure.AddAperture(model, scene, point);
        model.Annotations.Add(LevelLabels.Of(lines, v => FigureStyle.Number(v, 3) + " T"));
        if (iron.Length > 0)
        {
            model.Annotations.Add(new Marks((rc, screen, area) => MarkWorst(rc, screen(peak.At), area, $"{FigureStyle.Number(peak.Field, 3)} T")));
        }

        model.Annotations.Add(new ColourBar("|B| (T)", 0, top, FigureStyle.Unsigned));
        return figure;
    }

    private static bool IsIron(FieldScene scene, int region)
    {
        int part = region >= 0 ? scene.Section.Regions[region].Part : -1;
        return part >= 0 && scene.IsIron[part];
    }

    // As the result states it; the triangles' corners reach nearer to a sharp edge, where the value has no bound.
    private static Peak Worst(FieldScene scene, FieldTriangle[] iron)
    {
        if (scene.IronPeak is { } stated)
        {
            return new Peak(stated.Field, stated.At, stated.Part);
        }

        Peak worst = new(0, default, null);
        foreach (FieldTriangle t in iron)
        {
            Take(t.S0, t.P0, t.Region);
            Take(t.S1, t.P1, t.Region);
            Take(t.S2, t.P2, t.Region);
        }

        return worst;

        void Take(FieldSample sample, Point p, int region)
        {
            if (sample.Magnitude > worst.Field)
            {
                worst = new Peak(sample.Magnitude, p, scene.Section.Parts[scene.Section.Regions[region].Part]);
            }
        }
    }

    private static string Caption(Peak peak, double step)
    {
        if (peak.Part is not { } part)
        {
            return "There is no iron in this section.";
        }

        return $"Largest |B| in the iron: {FigureStyle.Number(peak.Field)} T in {part} at y = {FigureStyle.Number(1e3 * peak.At.Y)} mm, "
            + $"z = {FigureStyle.Number(1e3 * peak.At.Z)} mm (circled). Lines of equal |B| every {FigureStyle.Number(step)} T. "
            + "At a sharp corner the value grows with finer meshes; round it or read the value that 99 % of the area stays below.";
    }

    private static void MarkWorst(IRenderContext rc, ScreenPoint at, OxyRect area, string text)
    {
        const double radius = 8;
        const EdgeRenderingMode mode = EdgeRenderingMode.PreferGeometricAccuracy;
        rc.DrawEllipse(Mark.Around(at, radius), OxyColors.Undefined, FigureStyle.Paper, 4, mode);
        rc.DrawEllipse(Mark.Around(at, radius), OxyColors.Undefined, FigureStyle.Ink, 1.8, mode);
        double side = at.X < (area.Left + area.Right) / 2 ? -1 : 1; // outwards, unless the paper ends there
        side = at.X + (side * 90) > area.Left && at.X + (side * 90) < area.Right ? side : -side;
        double rise = at.Y > area.Top + 60 ? -1 : 1;
        ScreenPoint end = new(at.X + (side * 46), at.Y + (rise * 34));
        double reach = radius / Math.Sqrt((46 * 46) + (34 * 34));
        ScreenPoint start = new(at.X + (side * 46 * reach), at.Y + (rise * 34 * reach));
        rc.DrawLine([start, end], FigureStyle.Paper, 4, mode, null, LineJoin.Miter);
        rc.DrawLine([start, end], FigureStyle.Ink, 1.4, mode, null, LineJoin.Miter);
        Mark.Label(rc, end, text, FigureStyle.TextSize);
    }

    private readonly record struct Peak(double Field, Point At, string? Part);
}
