using OxyPlot;
using OxyPlot.Annotations;

namespace PoleField.Output.Figures;

/// <summary>The colour scale beside a picture, with its quantity and unit.</summary>
internal sealed class ColourBar : Annotation
{
    /// <summary>Room a bar needs at the right of the plot area, points.</summary>
    public const double Room = 92;

    private const double Distance = 14;
    private const double BarWidth = 16;
    private readonly string _title;
    private readonly double _from;
    private readonly double _to;
    private readonly OxyImage _image;

    public ColourBar(string title, double from, double to, IReadOnlyList<OxyColor> palette)
    {
        _title = title;
        _from = from;
        _to = to;
        int count = Math.Min(palette.Count, IndexedPng.Transparent);
        byte[] column = [.. Enumerable.Range(0, count).Select(i => (byte)(count - 1 - i))];
        _image = new OxyImage(IndexedPng.Encode(column, 1, palette));
        Layer = AnnotationLayer.AboveSeries;
    }

    /// <inheritdoc/>
    public override OxyRect GetClippingRect() => new(0, 0, PlotModel.Width, PlotModel.Height);

    /// <inheritdoc/>
    public override void Render(IRenderContext rc)
    {
        OxyRect area = PlotModel.PlotArea;
        double left = area.Right + Distance;
        rc.DrawImage(_image, left, area.Top, BarWidth, area.Height, 1, true);
        rc.DrawRectangle(new OxyRect(left, area.Top, BarWidth, area.Height), OxyColors.Undefined, FigureStyle.Ink, 0.9, EdgeRenderingMode.PreferGeometricAccuracy);

        double wanted = Math.Max(2, area.Height / 48);
        double step = FigureStyle.NiceStep(2 * (_to - _from) / wanted);
        double widest = 0;
        for (double k = Math.Ceiling((_from / step) - 1e-9); k * step <= _to + (1e-9 * step); k++)
        {
            double y = area.Bottom - (((k * step) - _from) / (_to - _from) * area.Height);
            string text = FigureStyle.Number(k * step);
            rc.DrawLine([new(left + BarWidth, y), new(left + BarWidth + 4, y)], FigureStyle.Ink, 0.9, EdgeRenderingMode.PreferGeometricAccuracy, null, LineJoin.Miter);
            rc.DrawText(new ScreenPoint(left + BarWidth + 7, y), text, FigureStyle.Ink, FigureStyle.Font, FigureStyle.SmallSize, FontWeights.Normal, 0, HorizontalAlignment.Left, VerticalAlignment.Middle);
            widest = Math.Max(widest, TextWidths.Width(text, FigureStyle.SmallSize));
        }

        ScreenPoint middle = new(left + BarWidth + 7 + widest + 12, (area.Top + area.Bottom) / 2);
        rc.DrawText(middle, _title, FigureStyle.Ink, FigureStyle.Font, FigureStyle.TextSize, FontWeights.Normal, -90, HorizontalAlignment.Center, VerticalAlignment.Middle);
    }
}
