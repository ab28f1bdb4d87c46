using OxyPlot;
using OxyPlot.Axes;
using PoleField.Design;
using PoleField.Geometry;
using PoleField.Output.Results;

namespace PoleField.Output.Figures;

/// <summary>Where along the faces the shape matters: what form it may have and what a bump costs, millimetre by millimetre, on the faces that matter most.</summary>
public static class ToleranceFigure
{
    /// <summary>Name of the picture.</summary>
    public const string Name = "tolerance";

    private const int MostFaces = 2;
    private const double Shown = 0.995;  // share of a face's effect that the picture shows
    private const double Bump = 1e-5 * 1e-3; // 10 µm over 1 mm, m²
    private const double Roomy = 50e-6; // metres: what is allowed beyond this is not told apart

    /// <summary>Draws the budget's faces with the greatest effect on the gradient, side by side: allowed form above, what a bump costs below.</summary>
    /// <param name="budget">Budget.</param>
    /// <param name="allowances">Loosest form of every stretch.</param>
    public static Figure Draw(ToleranceBudget budget, FormAllowances allowances)
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
                Title = "How true the pole faces must be",
                Caption = FormattableString.Invariant($"Above: form error, one sigma over {1e3 * budget.Tolerances.FormLength:g3} mm of face, that each millimetre may have so that all together ")
                    + FormattableString.Invariant($"change the gradient by {100 * allowances.Gradient:g3} %; {1e6 * Roomy:g2} µm stands for that or more. Below: change of the gradient for 10 µm more iron over 1 mm of face. ")
                    + $"Faces: {beside}; s runs along the face from the place nearest to the beam.",
                Key = [new("computed", FigureStyle.Main)],
            },
            new PlotRoom(620, 400, Left: 84, Right: 84, Bottom: 62));
        var panels = new Panels(figure.Model, columns: faces.Length, rows: 2);
        for (int c = 0; c < faces.Length; c++)
        {
            FaceSensitivity[] points = Near(budget, faces[c], out double nearest);
            panels.Horizontal(c, FigureStyle.Axis(
                AxisPosition.Bottom,
                $"s (mm) on {budget.Faces[faces[c]].Layer}",
                1e3 * (points[0].ArcLength - nearest),
                1e3 * (points[^1].ArcLength - nearest)));
            panels.Fill(c, 0, "allowed form (µm)", Allowed(allowances.Stretches, faces[c], (points[0].ArcLength, points[^1].ArcLength, nearest)));
            panels.Fill(c, 1, "gradient (%)", Curve(budget, points, nearest));
        }

        return figure;
    }

    private static List<PanelCurve> Curve(ToleranceBudget budget, FaceSensitivity[] points, double nearest)
    {
        double scale = 100 * Bump / budget.Derivatives[1].Value;
        return [new([.. points.Select(p => new DataPoint(1e3 * (p.ArcLength - nearest), scale * p.Density[1]))], FigureStyle.Main)];
    }

    // Steps, one for each stretch.
    private static List<PanelCurve> Allowed(IReadOnlyList<FormAllowance> allowances, int face, (double From, double To, double Nearest) shown)
    {
        var points = new List<DataPoint>();
        foreach (FormAllowance a in allowances.Where(a => a.Face == face && a.To > shown.From && a.From < shown.To))
        {
            double size = 1e6 * Math.Min(Roomy, a.OneSigma);
            points.Add(new DataPoint(1e3 * (Math.Max(a.From, shown.From) - shown.Nearest), size));
            points.Add(new DataPoint(1e3 * (Math.Min(a.To, shown.To) - shown.Nearest), size));
        }

        return [new(points, FigureStyle.Main), new([new DataPoint(points[0].X, 0), new DataPoint(points[^1].X, 0)], FigureStyle.Contour)];
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
