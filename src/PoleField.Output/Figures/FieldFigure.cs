using OxyPlot;
using OxyPlot.Annotations;
using OxyPlot.Axes;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Output.Figures;

/// <summary>
/// The cross-section with field lines (equal steps of the vector potential, so equal flux between neighbours) over the
/// magnitude of B in colours; parts outlined and named, the sense of each coil's current marked.
/// </summary>
public static class FieldFigure
{
    private const double PlotWidth = 620;
    private const double SmallestHeight = 220;
    private const double LargestHeight = 700;
    private const double PixelsPerPoint = 1.6;

    /// <summary>The whole cross-section.</summary>
    public static Figure Whole(FieldScene scene)
    {
        Box seen = SectionDrawing.WholeView(scene.Section, scene.Aperture);
        return Draw(scene, new Detail("field", "Field lines and |B| of the cross-section", seen, LinesWanted: 36));
    }

    /// <summary>The beam and the faces on both sides of it.</summary>
    public static Figure Beam(FieldScene scene)
    {
        Box seen = SectionDrawing.BeamView(scene.Section, scene.Aperture);
        return Draw(scene, new Detail("field-beam", "Field lines and |B| around the beam", seen, LinesWanted: 22));
    }

    private static Figure Draw(FieldScene scene, Detail detail)
    {
        Box seen = detail.Seen;
        double height = Math.Clamp(PlotWidth * seen.Height / seen.Width, SmallestHeight, LargestHeight);
        Box view = SectionDrawing.View(seen, PlotWidth / height);
        double point = view.Width / PlotWidth;
        FieldTriangle[] shown = [.. scene.Triangles.Where(t => Box.Around(t.P0, t.P1, t.P2).Overlaps(view))];
        FieldRaster raster = FieldRaster.OfMagnitude(shown, view, (int)(PlotWidth * PixelsPerPoint));
        double step = FluxStep(shown, view, detail.LinesWanted);

        Figure figure = FigureFrame.Begin(
            new FrameText
            {
                Name = detail.Name,
                Title = detail.Title,
                Caption = Sentence(scene.Caption) + $"Neighbouring field lines enclose {FigureStyle.Number(1e3 * step)} mWb per metre of length.",
                Key =
                [
                    new("outline of a part", FigureStyle.Outline),
                    new("aperture", FigureStyle.Aperture),
                    new("field line", FigureStyle.Contour),
                ],
            },
            new PlotRoom(PlotWidth, height, Right: ColourBar.Room));
        PlotModel model = figure.Model;
        AddAxes(model, view);
        double top = Math.Max(raster.Quantile(0.998), double.Epsilon);
        AddImage(model, raster.Image(0, top, FigureStyle.Unsigned), view);

        // Halfway between the multiples: A = 0 fills wide regions without field, where its line would wander.
        double half = 0.5 * step;
        IReadOnlyList<LevelLine> lines = LevelLines.Trace(
            shown.Select(t => new ValueTriangle(t.P0, t.P1, t.P2, t.S0.Potential - half, t.S1.Potential - half, t.S2.Potential - half)),
            step,
            0.15 * point);
        model.Annotations.Add(new Strokes([.. lines.Select(l => l.Points)], FigureStyle.Contour, rim: 0));
        model.Annotations.Add(new Strokes(SectionDrawing.Outlines(scene.Section, 0.1 * point), FigureStyle.Outline, rim: 0.5));
        AddAperture(model, scene, point);
        model.Annotations.Add(new PartLabels(scene.Section, LabelPlaces.Find(raster), scene.CurrentOf).Annotation());
        model.Annotations.Add(new ColourBar("|B| (T)", 0, top, FigureStyle.Unsigned));
        return figure;
    }

    /// <summary>Axes of a view in mm whose scales are equal.</summary>
    internal static void AddAxes(PlotModel model, Box view)
    {
        model.Axes.Add(FigureStyle.Axis(AxisPosition.Bottom, "y (mm)", 1e3 * view.Min.Y, 1e3 * view.Max.Y));
        model.Axes.Add(FigureStyle.Axis(AxisPosition.Left, "z (mm)", 1e3 * view.Min.Z, 1e3 * view.Max.Z));
    }

    /// <summary>A picture that fills the view.</summary>
    internal static void AddImage(PlotModel model, OxyImage image, Box view) => model.Annotations.Add(new ImageAnnotation
    {
        ImageSource = image,
        X = new PlotLength(1e3 * view.Centre.Y, PlotLengthUnit.Data),
        Y = new PlotLength(1e3 * view.Centre.Z, PlotLengthUnit.Data),
        Width = new PlotLength(1e3 * view.Width, PlotLengthUnit.Data),
        Height = new PlotLength(1e3 * view.Height, PlotLengthUnit.Data),
        HorizontalAlignment = HorizontalAlignment.Center,
        VerticalAlignment = VerticalAlignment.Middle,
        Interpolate = true,
        Layer = AnnotationLayer.BelowSeries,
    });

    /// <summary>The aperture's outline: dashed with a light rim, or thin where it is too small for dashes.</summary>
    internal static void AddAperture(PlotModel model, FieldScene scene, double point)
    {
        Box box = scene.Aperture.Outline.Bounds;
        bool small = Math.Min(box.Width, box.Height) < 12 * point;
        Pen pen = small ? new Pen(FigureStyle.Ink, 1.1) : FigureStyle.Aperture;
        model.Annotations.Add(new Strokes([SectionDrawing.Flatten(scene.Aperture.Outline, 0.1 * point)], pen, rim: small ? 0.6 : 1.0));
    }

    internal static string Sentence(string text) => text.Length == 0 ? "" : text.TrimEnd() + " ";

    // A step of 1, 2 or 5 times a power of ten that gives about the wanted number of lines in the view.
    private static double FluxStep(FieldTriangle[] shown, Box view, int linesWanted)
    {
        double low = double.PositiveInfinity, high = double.NegativeInfinity;
        foreach (FieldTriangle t in shown)
        {
            if (view.Contains(t.P0))
            {
                low = Math.Min(low, t.S0.Potential);
                high = Math.Max(high, t.S0.Potential);
            }
        }

        return high > low ? FigureStyle.NiceStep(1.6 * (high - low) / linesWanted) : 1;
    }

    private sealed record Detail(string Name, string Title, Box Seen, int LinesWanted);
}
