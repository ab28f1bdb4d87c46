using OxyPlot;
using OxyPlot.Annotations;

namespace PoleField.Output.Figures;

/// <summary>One entry of the key above a plot.</summary>
/// <param name="Label">What the line stands for.</param>
/// <param name="Pen">How it is drawn.</param>
internal sealed record KeyEntry(string Label, Pen Pen);

/// <summary>What stands around the plot area.</summary>
internal sealed record FrameText
{
    public required string Name { get; init; }

    public required string Title { get; init; }

    public required string Caption { get; init; }

    public IReadOnlyList<KeyEntry> Key { get; init; } = [];

    /// <summary>Lines under the plot before the caption, such as a numbered list.</summary>
    public IReadOnlyList<string> Notes { get; init; } = [];
}

/// <summary>Size of the plot area and the room axes and colour bars need beside it, points.</summary>
internal readonly record struct PlotRoom(double Width, double Height, double Left = 66, double Right = 22, double Bottom = 50);

/// <summary>Draws title, key, notes and caption in the margins; the plot area gets exactly the size asked for.</summary>
internal sealed class FigureFrame : Annotation
{
    private const double Edge = 14;
    private const double TitleLine = 20;
    private const double Gap = 4; // kept of the margin where a page leaves the title out
    private const double KeySample = 27; // ends with a whole dash of the aperture's pen
    private readonly FrameText _text;
    private readonly IReadOnlyList<string> _title;
    private readonly List<IReadOnlyList<KeyEntry>> _keyRows;
    private readonly List<string> _foot;

    private FigureFrame(FrameText text, double width)
    {
        _text = text;
        double room = width - (2 * Edge);
        _title = TextWidths.Wrap(text.Title, FigureStyle.TitleSize * 1.13, room);
        _keyRows = BreakKey(text.Key, room);
        List<string> foot = [];
        foreach (string note in text.Notes)
        {
            foot.AddRange(TextWidths.Wrap(note, FigureStyle.SmallSize, room));
        }

        foot.AddRange(TextWidths.Wrap(text.Caption, FigureStyle.SmallSize, room));
        _foot = foot;
        Layer = AnnotationLayer.AboveSeries;
    }

    private double HeadHeight => Edge + (_title.Count * TitleLine) + (_keyRows.Count * 18) + 8;

    private double FootHeight => (_foot.Count * FigureStyle.LineHeight) + Edge;

    /// <summary>Starts a figure; the caller adds axes (before all else) and content to its model.</summary>
    public static Figure Begin(FrameText text, PlotRoom room)
    {
        double width = room.Left + room.Width + room.Right;
        FigureFrame frame = new(text, width);
        PlotModel model = new()
        {
            DefaultFont = FigureStyle.Font,
            DefaultFontSize = FigureStyle.TextSize,
            Culture = System.Globalization.CultureInfo.InvariantCulture,
            Background = FigureStyle.Paper,
            TextColor = FigureStyle.Ink,
            PlotAreaBorderColor = FigureStyle.Ink,
            PlotAreaBorderThickness = new OxyThickness(0.9),
            Padding = new OxyThickness(0),
            PlotMargins = new OxyThickness(room.Left, frame.HeadHeight, room.Right, room.Bottom + frame.FootHeight),
        };
        model.Annotations.Add(frame);
        double height = frame.HeadHeight + room.Height + room.Bottom + frame.FootHeight;
        return new Figure(text.Name, text.Title, text.Caption, model, width, height)
        {
            TitleHeight = Edge + (frame._title.Count * TitleLine) - Gap,
            CaptionHeight = text.Notes.Count == 0 ? frame.FootHeight : 0,
        };
    }

    /// <inheritdoc/>
    public override OxyRect GetClippingRect() => new(0, 0, PlotModel.Width, PlotModel.Height);

    /// <inheritdoc/>
    public override void Render(IRenderContext rc)
    {
        double y = Edge;
        foreach (string line in _title)
        {
            Write(rc, line, y, isTitle: true);
            y += TitleLine;
        }

        foreach (IReadOnlyList<KeyEntry> row in _keyRows)
        {
            DrawKeyRow(rc, row, y + 9);
            y += 18;
        }

        double foot = PlotModel.Height - FootHeight;
        foreach (string line in _foot)
        {
            Write(rc, line, foot, isTitle: false);
            foot += FigureStyle.LineHeight;
        }
    }

    private static void DrawKeyRow(IRenderContext rc, IReadOnlyList<KeyEntry> row, double y)
    {
        double x = Edge;
        foreach (KeyEntry entry in row)
        {
            ScreenPoint[] sample = [new(x, y), new(x + KeySample, y)];
            rc.DrawLine(sample, entry.Pen.Colour, entry.Pen.Thickness, EdgeRenderingMode.PreferGeometricAccuracy, entry.Pen.Dash, LineJoin.Round);
            rc.DrawText(
                new ScreenPoint(x + KeySample + 6, y), entry.Label, FigureStyle.Ink, FigureStyle.Font, FigureStyle.SmallSize, FontWeights.Normal, 0, HorizontalAlignment.Left, VerticalAlignment.Middle);
            x += EntryWidth(entry);
        }
    }

    private static double EntryWidth(KeyEntry entry) => KeySample + 6 + TextWidths.Width(entry.Label, FigureStyle.SmallSize) + 18;

    private static List<IReadOnlyList<KeyEntry>> BreakKey(IReadOnlyList<KeyEntry> key, double room)
    {
        List<IReadOnlyList<KeyEntry>> rows = [];
        List<KeyEntry> row = [];
        double used = 0;
        foreach (KeyEntry entry in key)
        {
            double width = EntryWidth(entry);
            if (row.Count > 0 && used + width > room)
            {
                rows.Add(row);
                row = [];
                used = 0;
            }

            row.Add(entry);
            used += width;
        }

        if (row.Count > 0)
        {
            rows.Add(row);
        }

        return rows;
    }

    private static void Write(IRenderContext rc, string text, double y, bool isTitle)
    {
        double size = isTitle ? FigureStyle.TitleSize : FigureStyle.SmallSize;
        double weight = isTitle ? FontWeights.Bold : FontWeights.Normal;
        rc.DrawText(new ScreenPoint(Edge, y), text, FigureStyle.Ink, FigureStyle.Font, size, weight, 0, HorizontalAlignment.Left, VerticalAlignment.Top);
    }
}
