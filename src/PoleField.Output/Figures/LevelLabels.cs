using OxyPlot;
using PoleField.Geometry;

namespace PoleField.Output.Figures;

/// <summary>Values written on level lines, one on each line that is long enough and free.</summary>
internal static class LevelLabels
{
    private const double SmallSize = 10;

    public static Marks Of(IReadOnlyList<LevelLine> lines, Func<double, string> text) => new((rc, screen, area) =>
    {
        List<OxyRect> taken = [];
        foreach (LevelLine line in lines.OrderByDescending(l => l.Points.Count))
        {
            ScreenPoint[] points = [.. line.Points.Select(screen)];
            string label = text(line.Level);
            if (Length(points) < 2.5 * TextWidths.Width(label, SmallSize))
            {
                continue;
            }

            // The middle first, then places to either side of it.
            foreach (double share in (ReadOnlySpan<double>)[0.5, 0.35, 0.65, 0.2, 0.8])
            {
                ScreenPoint at = Along(points, share);
                OxyRect box = Mark.LabelBox(at, label, SmallSize);
                bool inside = box.Left > area.Left && box.Right < area.Right && box.Top > area.Top && box.Bottom < area.Bottom;
                if (inside && !taken.Exists(t => Overlap(t, box)))
                {
                    taken.Add(Mark.Label(rc, at, label, SmallSize));
                    break;
                }
            }
        }
    });

    internal static bool Overlap(OxyRect a, OxyRect b) =>
        a.Left < b.Right && b.Left < a.Right && a.Top < b.Bottom && b.Top < a.Bottom;

    private static double Length(ScreenPoint[] points) =>
        Enumerable.Range(1, points.Length - 1).Sum(i => points[i].DistanceTo(points[i - 1]));

    private static ScreenPoint Along(ScreenPoint[] points, double share)
    {
        double rest = share * Length(points);
        for (int i = 1; i < points.Length; i++)
        {
            double piece = points[i].DistanceTo(points[i - 1]);
            if (rest <= piece && piece > 0)
            {
                Point p = Point.Between(new Point(points[i - 1].X, points[i - 1].Y), new Point(points[i].X, points[i].Y), rest / piece);
                return new ScreenPoint(p.Y, p.Z);
            }

            rest -= piece;
        }

        return points[^1];
    }
}
