using OxyPlot;
using OxyPlot.Annotations;
using OxyPlot.Axes;
using OxyPlot.Series;

namespace PoleField.Output.Figures;

/// <summary>A curve in a panel.</summary>
/// <param name="Points">The curve.</param>
/// <param name="Pen">How it is drawn; thickness 0 draws only marks.</param>
/// <param name="Marks">True to mark the points.</param>
internal sealed record PanelCurve(IReadOnlyList<DataPoint> Points, Pen Pen, bool Marks = false);

/// <summary>
/// Panels in one or two columns and one or more rows. A column shares its horizontal axis; the right column's vertical axes
/// stand at the right.
/// </summary>
internal sealed class Panels
{
    private const double ColumnGap = 0.05;
    private const double RowGap = 0.07;
    private const double Headroom = 0.07;
    private readonly PlotModel _model;
    private readonly int _columns;
    private readonly int _rows;

    public Panels(PlotModel model, int columns, int rows)
    {
        _model = model;
        _columns = columns;
        _rows = rows;
        model.PlotAreaBorderThickness = new OxyThickness(0);
    }

    /// <summary>Puts the horizontal axis of a column in place.</summary>
    public void Horizontal(int column, Axis axis)
    {
        axis.Key = $"column{column}";
        axis.MajorGridlineStyle = LineStyle.None;
        (axis.StartPosition, axis.EndPosition) = Extent(column, _columns, ColumnGap);
        _model.Axes.Add(axis);
    }

    /// <summary>Fills a panel (row 0 is the top) with curves under a vertical axis that just holds them.</summary>
    public void Fill(int column, int row, string title, IReadOnlyList<PanelCurve> curves)
    {
        DataPoint[] all = [.. curves.SelectMany(c => c.Points).Where(p => double.IsFinite(p.Y))];
        (double low, double high) = all.Length == 0 ? (0, 1) : (all.Min(p => p.Y), all.Max(p => p.Y));
        double size = Math.Max(Math.Abs(low), Math.Abs(high));
        double pad = Math.Max(Headroom * (high - low), Math.Max(1e-6 * size, 1e-12));
        LinearAxis axis = FigureStyle.Axis(column == 0 ? AxisPosition.Left : AxisPosition.Right, title, low - pad, high + pad);
        axis.Key = $"panel{column}-{row}";
        axis.IntervalLength = 42;
        axis.MajorGridlineStyle = LineStyle.None;
        (axis.StartPosition, axis.EndPosition) = Extent(_rows - 1 - row, _rows, RowGap);
        _model.Axes.Add(axis);
        _model.Annotations.Add(new PanelGrid { XAxisKey = $"column{column}", YAxisKey = axis.Key });
        foreach (PanelCurve curve in curves)
        {
            AddCurve(curve, $"column{column}", axis.Key);
        }

        _model.Annotations.Add(new PanelBorder { XAxisKey = $"column{column}", YAxisKey = axis.Key });
    }

    private static (double Start, double End) Extent(int index, int count, double gap)
    {
        double size = (1 - ((count - 1) * gap)) / count;
        double start = index * (size + gap);
        return (start, index == count - 1 ? 1 : start + size);
    }

    private void AddCurve(PanelCurve curve, string x, string y)
    {
        LineSeries series = new()
        {
            XAxisKey = x,
            YAxisKey = y,
            Color = curve.Pen.Colour,
            StrokeThickness = curve.Pen.Thickness,
            Dashes = curve.Pen.Dash.Length > 0 ? curve.Pen.Dash : null,
            LineJoin = LineJoin.Round,
            MarkerType = curve.Marks ? MarkerType.Circle : MarkerType.None,
            MarkerSize = 3,
            MarkerFill = FigureStyle.Paper,
            MarkerStroke = curve.Pen.Colour,
            MarkerStrokeThickness = 1.4,
        };
        series.Points.AddRange(curve.Points);
        _model.Series.Add(series);
    }
}

/// <summary>Grid lines of one panel at its own ticks (an axis would draw them through its neighbours too).</summary>
internal sealed class PanelGrid : Annotation
{
    public PanelGrid() => Layer = AnnotationLayer.BelowSeries;

    /// <inheritdoc/>
    public override void Render(IRenderContext rc)
    {
        OxyRect area = PanelBorder.AxesArea(this);
        List<ScreenPoint> ends = [];
        XAxis!.GetTickValues(out _, out IList<double> columns, out _);
        foreach (double x in columns.Select(XAxis.Transform))
        {
            ends.AddRange([new(x, area.Top), new(x, area.Bottom)]);
        }

        YAxis!.GetTickValues(out _, out IList<double> rows, out _);
        foreach (double y in rows.Select(YAxis.Transform))
        {
            ends.AddRange([new(area.Left, y), new(area.Right, y)]);
        }

        rc.DrawLineSegments(ends, FigureStyle.Grid, 0.8, EdgeRenderingMode.PreferGeometricAccuracy, null, LineJoin.Miter);
    }
}

/// <summary>The frame of a panel.</summary>
internal sealed class PanelBorder : Annotation
{
    public PanelBorder() => Layer = AnnotationLayer.AboveSeries;

    /// <inheritdoc/>
    public override OxyRect GetClippingRect() => new(0, 0, PlotModel.Width, PlotModel.Height);

    /// <inheritdoc/>
    public override void Render(IRenderContext rc) =>
        rc.DrawRectangle(AxesArea(this), OxyColors.Undefined, FigureStyle.Ink, 0.9, EdgeRenderingMode.PreferGeometricAccuracy);

    /// <summary>The rectangle spanned by an annotation's two axes.</summary>
    internal static OxyRect AxesArea(Annotation annotation)
    {
        Axis x = annotation.XAxis!, y = annotation.YAxis!; // set before anything is rendered
        double left = Math.Min(x.ScreenMin.X, x.ScreenMax.X), right = Math.Max(x.ScreenMin.X, x.ScreenMax.X);
        double top = Math.Min(y.ScreenMin.Y, y.ScreenMax.Y), bottom = Math.Max(y.ScreenMin.Y, y.ScreenMax.Y);
        return new OxyRect(left, top, right - left, bottom - top);
    }
}

/// <summary>A dotted upright line with a name at a value of the horizontal axis.</summary>
internal sealed class UprightLine : Annotation
{
    private readonly double _x;
    private readonly string _label;

    public UprightLine(double x, string label)
    {
        _x = x;
        _label = label;
        Layer = AnnotationLayer.AboveSeries;
    }

    /// <inheritdoc/>
    public override void Render(IRenderContext rc)
    {
        OxyRect area = PanelBorder.AxesArea(this);
        double x = XAxis!.Transform(_x);
        rc.DrawLine([new(x, area.Top), new(x, area.Bottom)], FigureStyle.Ink, 1.3, EdgeRenderingMode.PreferGeometricAccuracy, [1.2, 2.4], LineJoin.Miter);
        if (_label.Length > 0)
        {
            double half = (TextWidths.Width(_label, FigureStyle.SmallSize) / 2) + 6;
            double middle = Math.Clamp(x, area.Left + half, Math.Max(area.Left + half, area.Right - half));
            Mark.Label(rc, new ScreenPoint(middle, area.Bottom - 14), _label);
        }
    }
}
