using OxyPlot;
using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Output.Figures;

/// <summary>Names of the parts at their roomiest places, with the sense of the current in coils; labels never cover each other.</summary>
internal sealed class PartLabels(CrossSection section, IReadOnlyList<LabelPlace> places, Func<Region, double> current)
{
    private const double SmallestMark = 6;
    private const double LargestMark = 13;

    // Less room than this, in points, and a region gets no name of its own.
    private const double SmallestRoom = 4;

    public Marks Annotation() => new(Draw);

    private void Draw(IRenderContext rc, Func<Point, ScreenPoint> screen, OxyRect area)
    {
        double perMetre = screen(new Point(1, 0)).X - screen(new Point(0, 0)).X;
        List<OxyRect> taken = [];
        HashSet<string> named = [];
        foreach (LabelPlace place in places.Where(p => p.Region >= 0).OrderByDescending(p => p.Radius).ThenBy(p => p.Region))
        {
            Region region = section.Regions[place.Region];
            if (region.Part < 0 || place.Radius * perMetre < SmallestRoom)
            {
                continue;
            }

            ScreenPoint at = screen(place.At);
            double ampereTurns = current(region);
            if (ampereTurns != 0.0)
            {
                double radius = Math.Clamp(0.4 * place.Radius * perMetre, SmallestMark, LargestMark);
                Mark.Current(rc, at, radius, ampereTurns > 0);
                taken.Add(Mark.Around(at, radius));
                at = new ScreenPoint(at.X, at.Y + radius + 11);
            }

            string text = section.Parts[region.Part];
            OxyRect box = Mark.LabelBox(at, text);
            double left = Math.Clamp(box.Left, area.Left + 3, Math.Max(area.Left + 3, area.Right - 3 - box.Width));
            at = new ScreenPoint(left + (box.Width / 2), at.Y);
            box = Mark.LabelBox(at, text);
            bool fits = box.Top >= area.Top && box.Bottom <= area.Bottom && !taken.Exists(t => LevelLabels.Overlap(t, box));
            if (fits && (ampereTurns != 0.0 || named.Add(text)))
            {
                taken.Add(Mark.Label(rc, at, text));
            }
        }
    }
}
