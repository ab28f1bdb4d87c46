using OxyPlot;
using OxyPlot.Annotations;
using PoleField.Geometry;

namespace PoleField.Output.Figures;

/// <summary>Lines in the plane of the cross-section (metres; the axes are in mm), with a light rim so that they show on any colour.</summary>
internal sealed class Strokes : Annotation
{
    private readonly IReadOnlyList<IReadOnlyList<Point>> _lines;
    private readonly Pen _pen;
    private readonly double _rim;

    public Strokes(IReadOnlyList<IReadOnlyList<Point>> lines, Pen pen, double rim)
    {
        _lines = lines;
        _pen = pen;
        _rim = rim;
        Layer = AnnotationLayer.AboveSeries;
    }

    /// <inheritdoc/>
    public override void Render(IRenderContext rc)
    {
        List<IList<ScreenPoint>> drawn = [.. _lines.Select(line => (IList<ScreenPoint>)[.. line.Select(p => Transform(new DataPoint(1e3 * p.Y, 1e3 * p.Z)))])];
        if (_rim > 0)
        {
            OxyColor light = OxyColor.FromAColor(0x90, OxyColors.White);
            foreach (IList<ScreenPoint> line in drawn)
            {
                rc.DrawLine(line, light, _pen.Thickness + (2 * _rim), EdgeRenderingMode.PreferGeometricAccuracy, null, LineJoin.Round);
            }
        }

        foreach (IList<ScreenPoint> line in drawn)
        {
            rc.DrawLine(line, _pen.Colour, _pen.Thickness, EdgeRenderingMode.PreferGeometricAccuracy, _pen.Dash, LineJoin.Round);
        }
    }
}

/// <summary>Draws by a function in screen coordinates; for marks and labels.</summary>
internal sealed class Marks : Annotation
{
    private readonly Action<IRenderContext, Func<Point, ScreenPoint>, OxyRect> _draw;
    private readonly bool _clipped;

    /// <param name="draw">Gets the context, the map from metres to the screen, and the plot area.</param>
    /// <param name="clipped">True to stay inside the plot area.</param>
    public Marks(Action<IRenderContext, Func<Point, ScreenPoint>, OxyRect> draw, bool clipped = true)
    {
        _draw = draw;
        _clipped = clipped;
        Layer = AnnotationLayer.AboveSeries;
    }

    /// <inheritdoc/>
    public override OxyRect GetClippingRect() =>
        _clipped ? base.GetClippingRect() : new OxyRect(0, 0, PlotModel.Width, PlotModel.Height);

    /// <inheritdoc/>
    public override void Render(IRenderContext rc) =>
        _draw(rc, p => Transform(new DataPoint(1e3 * p.Y, 1e3 * p.Z)), PlotModel.PlotArea);
}

/// <summary>Text with a veil behind it, and the common marks.</summary>
internal static class Mark
{
    /// <summary>A label centred at a place; returns the rectangle it covers.</summary>
    public static OxyRect Label(IRenderContext rc, ScreenPoint at, string text, double size = FigureStyle.SmallSize)
    {
        OxyRect box = LabelBox(at, text, size);
        rc.DrawRectangle(box, FigureStyle.Veil, OxyColors.Undefined, 0, EdgeRenderingMode.PreferGeometricAccuracy);
        rc.DrawText(at, text, FigureStyle.Ink, FigureStyle.Font, size, FontWeights.Normal, 0, HorizontalAlignment.Center, VerticalAlignment.Middle);
        return box;
    }

    /// <summary>The rectangle a label would cover.</summary>
    public static OxyRect LabelBox(ScreenPoint at, string text, double size = FigureStyle.SmallSize)
    {
        double width = TextWidths.Width(text, size) + 6;
        double height = size + 5;
        return new OxyRect(at.X - (width / 2), at.Y - (height / 2), width, height);
    }

    /// <summary>Sense of a current: a dot for one that comes towards the viewer (+x), a cross for one that goes away.</summary>
    public static void Current(IRenderContext rc, ScreenPoint at, double radius, bool towardsViewer)
    {
        const EdgeRenderingMode mode = EdgeRenderingMode.PreferGeometricAccuracy;
        rc.DrawEllipse(Around(at, radius), FigureStyle.Paper, FigureStyle.Ink, 1.4, mode);
        if (towardsViewer)
        {
            rc.DrawEllipse(Around(at, 0.22 * radius), FigureStyle.Ink, OxyColors.Undefined, 0, mode);
            return;
        }

        double d = radius * Math.Sqrt(0.5);
        rc.DrawLine([new(at.X - d, at.Y - d), new(at.X + d, at.Y + d)], FigureStyle.Ink, 1.4, mode, null, LineJoin.Miter);
        rc.DrawLine([new(at.X - d, at.Y + d), new(at.X + d, at.Y - d)], FigureStyle.Ink, 1.4, mode, null, LineJoin.Miter);
    }

    public static OxyRect Around(ScreenPoint at, double radius) => new(at.X - radius, at.Y - radius, 2 * radius, 2 * radius);
}
