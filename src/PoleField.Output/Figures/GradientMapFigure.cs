using OxyPlot;
using PoleField.Beam;
using PoleField.Geometry;

namespace PoleField.Output.Figures;

/// <summary>How the gradient departs from its mean over the aperture.</summary>
public static class GradientMapFigure
{
    private const double PlotWidth = 600;
    private const double SmallestHeight = 200;
    private const double LargestHeight = 600;
    private const int Columns = 160;

    // A place on the edge counts as inside; grids stay this share of the box away from it.
    private const double Inset = 1e-6;

    /// <summary>Draws d|B|/dz over the aperture as a deviation from the mean.</summary>
    /// <param name="aperture">The aperture.</param>
    /// <param name="values">Values at a place inside the aperture.</param>
    /// <param name="gradient">Statistics of d|B|/dz over the aperture.</param>
    public static Figure Draw(Aperture aperture, Func<Point, BeamValues> values, ApertureStatistics gradient) => Draw(
        aperture,
        p => 100 * ((values(p).Gradient / gradient.Mean) - 1),
        new DeviationText
        {
            Name = "gradient-map",
            Title = "Gradient d|B|/dz over the aperture: deviation from its mean",
            Caption = Caption(gradient),
            From = "the mean",
        });

    /// <summary>Draws a deviation in per cent over the aperture.</summary>
    internal static Figure Draw(Aperture aperture, Func<Point, double> percent, DeviationText text)
    {
        Box box = aperture.Outline.Bounds;
        Box view = box.Inflated(0.03 * Math.Min(box.Width, box.Height));
        double height = Math.Clamp(PlotWidth * view.Height / view.Width, SmallestHeight, LargestHeight);
        double stretch = height / view.Height / (PlotWidth / view.Width);
        int rows = (int)Math.Max(24, Columns * height / PlotWidth);
        double[,] nodes = Sample(aperture, percent, rows);
        double most = Largest(nodes);
        double step = FigureStyle.NiceStep(Math.Max(2 * most, 1e-9) / 7);

        // Contours are traced in a plane where both scales are equal on the screen, and mapped back.
        Affine flat = new(1, 0, 0, stretch, 0, 0), back = new(1, 0, 0, 1 / stretch, 0, 0);
        IReadOnlyList<LevelLine> lines =
        [
            .. LevelLines.Trace(Cells(box, nodes, flat), step, 0.1 * view.Width / PlotWidth)
                .Select(l => l with { Points = [.. l.Points.Select(back.Apply)] }),
        ];

        Figure figure = FigureFrame.Begin(
            new FrameText
            {
                Name = text.Name,
                Title = text.Title,
                Caption = text.Caption + Stretched(stretch),
                Key =
                [
                    new($"as {text.From}", MeanPen), new($"stronger than {text.From}", FigureStyle.Contour), new($"weaker than {text.From}", BelowPen),
                ],
            },
            new PlotRoom(PlotWidth, height, Right: ColourBar.Room + 8));
        FieldFigure.AddAxes(figure.Model, view);
        FieldFigure.AddImage(figure.Model, Raster(box, nodes).Image(-most, most, FigureStyle.Signed), box);
        AddLines(figure.Model, lines, step);
        figure.Model.Annotations.Add(new Strokes([SectionDrawing.Flatten(aperture.Outline, 0.1 * view.Width / PlotWidth)], FigureStyle.Outline, rim: 0));
        figure.Model.Annotations.Add(LevelLabels.Of(lines, v => Percent(v, step)));
        figure.Model.Annotations.Add(new ColourBar($"deviation from {text.From} (%)", -most, most, FigureStyle.Signed));
        return figure;
    }

    private static Pen MeanPen { get; } = new(FigureStyle.Ink, 1.8);

    private static Pen BelowPen { get; } = new(FigureStyle.Ink, 0.9, 6, 4);

    private static void AddLines(PlotModel model, IReadOnlyList<LevelLine> lines, double step)
    {
        Add(l => Math.Abs(l) < 0.5 * step, MeanPen);
        Add(l => l > 0.5 * step, FigureStyle.Contour);
        Add(l => l < -0.5 * step, BelowPen);

        void Add(Func<double, bool> which, Pen pen) =>
            model.Annotations.Add(new Strokes([.. lines.Where(l => which(l.Level)).Select(l => l.Points)], pen, rim: 0));
    }

    private static string Percent(double value, double step) => Math.Abs(value) < 0.5 * step
        ? "0"
        : (value > 0 ? "+" : "") + FigureStyle.Number(value, 2) + " %";

    private static string Caption(ApertureStatistics gradient) =>
        $"Mean {FigureStyle.Number(gradient.Mean)} T/m, from {FigureStyle.Number(gradient.Min)} to {FigureStyle.Number(gradient.Max)} T/m; "
            + $"spread {FigureStyle.Number(100 * gradient.Spread, 3)} %, rms {FigureStyle.Number(100 * gradient.Rms, 3)} %.";

    private static string Stretched(double stretch) =>
        Math.Abs(stretch - 1) < 0.01 ? string.Empty : $" z is drawn {FigureStyle.Number(stretch, 2)} times as large as y.";

    // Deviation in per cent at node i, j of a grid that spans the aperture's box; not a number outside the aperture.
    private static double[,] Sample(Aperture aperture, Func<Point, double> deviation, int rows)
    {
        const int columns = Columns;
        Box box = aperture.Outline.Bounds;
        double[,] nodes = new double[columns + 1, rows + 1];
        for (int i = 0; i <= columns; i++)
        {
            for (int j = 0; j <= rows; j++)
            {
                Point p = new(
                    box.Min.Y + (box.Width * Math.Clamp(i / (double)columns, Inset, 1 - Inset)),
                    box.Min.Z + (box.Height * Math.Clamp(j / (double)rows, Inset, 1 - Inset)));
                nodes[i, j] = aperture.Outline.Contains(p) ? deviation(p) : double.NaN;
            }
        }

        return nodes;
    }

    private static double Largest(double[,] nodes)
    {
        double most = 0;
        foreach (double v in nodes)
        {
            most = Math.Max(most, double.IsNaN(v) ? 0 : Math.Abs(v));
        }

        return Math.Max(most, 1e-6);
    }

    private static IEnumerable<ValueTriangle> Cells(Box box, double[,] nodes, Affine map)
    {
        (int columns, int rows) = (nodes.GetLength(0) - 1, nodes.GetLength(1) - 1);
        for (int i = 0; i < columns; i++)
        {
            for (int j = 0; j < rows; j++)
            {
                (Point a, Point b, Point c, Point d) = (At(i, j), At(i + 1, j), At(i + 1, j + 1), At(i, j + 1));
                (double va, double vb, double vc, double vd) = (nodes[i, j], nodes[i + 1, j], nodes[i + 1, j + 1], nodes[i, j + 1]);
                if (double.IsFinite(va + vb + vc))
                {
                    yield return new ValueTriangle(a, b, c, va, vb, vc);
                }

                if (double.IsFinite(va + vc + vd))
                {
                    yield return new ValueTriangle(a, c, d, va, vc, vd);
                }
            }
        }

        Point At(int i, int j) => map.Apply(box.Min + new Point(box.Width * i / columns, box.Height * j / rows));
    }

    private static FieldRaster Raster(Box box, double[,] nodes)
    {
        (int columns, int rows) = (nodes.GetLength(0) - 1, nodes.GetLength(1) - 1);
        return FieldRaster.OfFunction(
            p =>
            {
                double u = (p.Y - box.Min.Y) / box.Width * columns, v = (p.Z - box.Min.Z) / box.Height * rows;
                (int i, int j) = (Math.Clamp((int)u, 0, columns - 1), Math.Clamp((int)v, 0, rows - 1));
                (double s, double t) = (u - i, v - j);
                return ((1 - s) * (1 - t) * nodes[i, j]) + (s * (1 - t) * nodes[i + 1, j])
                    + (s * t * nodes[i + 1, j + 1]) + ((1 - s) * t * nodes[i, j + 1]);
            },
            box,
            columns * 3,
            rows * 3);
    }
}

/// <summary>What stands around a map of deviations.</summary>
internal sealed record DeviationText
{
    public required string Name { get; init; }

    public required string Title { get; init; }

    public required string Caption { get; init; }

    /// <summary>What it deviates from, with its article.</summary>
    public required string From { get; init; }
}
