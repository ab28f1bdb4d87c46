using OxyPlot;
using OxyPlot.Axes;
using PoleField.Design;
using PoleField.Geometry;

namespace PoleField.Output.Figures;

/// <summary>Where along the faces the shape matters: what a bump costs, millimetre by millimetre, on the faces that matter most.</summary>
public static class ToleranceFigure
{
    /// <summary>Name of the picture.</summary>
    public const string Name = "tolerance";

    private const int MostFaces = 2;
    private const double Shown = 0.98;  // share of a face's effect that the picture shows
    private const double Bump = 1e-5 * 1e-3; // 10 µm over 1 mm, m²

    /// <summary>Draws the budget's faces with the greatest effect on the gradient, side by side.</summary>
    public static Figure Draw(ToleranceBudget budget)
    {
        int[] faces =
        [
            .. Enumerable.Range(0, budget.Faces.Count)
                .OrderByDescending(f => budget.Along(f).Sum(p => Math.Abs(p.Density[1]))).Take(MostFaces),
        ];
        string beside = string.Join("; ", faces.Select((f, i) => $"{(i == 0 ? "left" : "right")}: {budget.Faces[f].Layer}"));
        Figure figure = FigureFrame.Begin(
            new FrameText
            {
                Name = Name,
                Title = "What a bump on the pole face costs",
                Caption = $"Change of gradient and field at the beam for 10 µm more iron over 1 mm of face ({beside}). "
                    + "s runs along the face from the place nearest to the beam. Where a curve is near zero the face may be rough; "
                    + "where it is far from zero the workshop must keep the shape.",
                Key = [new("computed", FigureStyle.Main)],
            },
            new PlotRoom(620, 400, Left: 84, Right: 84));
        var panels = new Panels(figure.Model, columns: faces.Length, rows: 2);
        for (int c = 0; c < faces.Length; c++)
        {
            FaceSensitivity[] points = Near(budget, faces[c], out double nearest);
            panels.Horizontal(c, FigureStyle.Axis(
                AxisPosition.Bottom,
                $"s (mm) on {budget.Faces[faces[c]].Layer}",
                1e3 * (points[0].ArcLength - nearest),
                1e3 * (points[^1].ArcLength - nearest)));
            panels.Fill(c, 0, "gradient (%)", Curve(budget, points, (1, nearest)));
            panels.Fill(c, 1, "field (%)", Curve(budget, points, (0, nearest)));
        }

        return figure;
    }

    private static List<PanelCurve> Curve(ToleranceBudget budget, FaceSensitivity[] points, (int Quantity, double Nearest) of)
    {
        double scale = 100 * Bump / budget.Derivatives[of.Quantity].Value;
        return [new([.. points.Select(p => new DataPoint(1e3 * (p.ArcLength - of.Nearest), scale * p.Density[of.Quantity]))], FigureStyle.Main)];
    }

    // The stretch around the place nearest to the beam that holds nearly all of the face's effect.
    private static FaceSensitivity[] Near(ToleranceBudget budget, int face, out double nearest)
    {
        FaceSensitivity[] all = [.. budget.Along(face)];
        Point beam = budget.BeamPlace;
        int middle = Array.IndexOf(all, all.MinBy(p => p.At.DistanceTo(beam)));
        nearest = all[middle].ArcLength;
        double total = all.Sum(p => Math.Abs(p.Density[1]));
        double sum = Math.Abs(all[middle].Density[1]);
        (int from, int to) = (middle, middle);
        while (sum < Shown * total && (from > 0 || to < all.Length - 1))
        {
            bool left = from > 0 && (to == all.Length - 1 || nearest - all[from - 1].ArcLength < all[to + 1].ArcLength - nearest);
            (from, to) = left ? (from - 1, to) : (from, to + 1);
            sum += Math.Abs(all[left ? from : to].Density[1]);
        }

        return all[from..(to + 1)];
    }
}
