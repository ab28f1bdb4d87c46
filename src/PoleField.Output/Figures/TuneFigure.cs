using OxyPlot;
using OxyPlot.Axes;
using PoleField.Design;

namespace PoleField.Output.Figures;

/// <summary>Old and new faces, and how far each place moved.</summary>
public static class TuneFigure
{
    /// <summary>Name of the picture.</summary>
    public const string Name = "tuned-faces";

    private const int MostFaces = 2;

    private const double Shown = 0.2; // of a panel's height: how far the largest move is drawn

    /// <summary>Draws the faces that moved most, side by side: above old and new face, the move exaggerated; below the move.</summary>
    public static Figure Draw(TuneResult tuned)
    {
        FaceMoves[] faces = [.. tuned.Moves.OrderByDescending(m => m.Points.Max(p => Math.Abs(p.Move))).Take(MostFaces).OrderBy(m => m.Points.Min(p => p.At.Z))];
        double times = faces.Length == 0 ? 1 : Exaggeration(faces);
        Figure figure = FigureFrame.Begin(
            new FrameText
            {
                Name = Name,
                Title = "Tuned pole faces",
                Caption = "Above: the faces as they were (dashed) and tuned, z drawn larger than y"
                    + (times > 1 ? FormattableString.Invariant($", the move drawn {times:g3} times as large as it is. ") : ". ")
                    + "Below: outward move of the face where it was; positive where iron is added.",
                Key = [new("tuned", FigureStyle.Main), new("before", FigureStyle.Reference)],
            },
            new PlotRoom(620, 400, Left: 84, Right: 84, Bottom: 62));
        var panels = new Panels(figure.Model, columns: Math.Max(1, faces.Length), rows: 2);
        for (int c = 0; c < faces.Length; c++)
        {
            IReadOnlyList<FaceMove> points = faces[c].Points;
            double[] across = [.. points.SelectMany(p => new[] { p.At.Y, p.At.Y + (times * p.Move * p.Outward.Y) }).Select(y => 1e3 * y)];
            panels.Horizontal(c, FigureStyle.Axis(AxisPosition.Bottom, $"y (mm), {faces[c].Layer}", across.Min(), across.Max()));
            panels.Fill(
                c,
                0,
                "z (mm)",
                [
                    new([.. points.Select(p => new DataPoint(1e3 * (p.At.Y + (times * p.Move * p.Outward.Y)), 1e3 * (p.At.Z + (times * p.Move * p.Outward.Z))))], FigureStyle.Main),
                    new([.. points.Select(p => new DataPoint(1e3 * p.At.Y, 1e3 * p.At.Z))], FigureStyle.Reference),
                ]);
            panels.Fill(c, 1, "move (µm)", [new([.. points.Select(p => new DataPoint(1e3 * p.At.Y, 1e6 * p.Move))], FigureStyle.Main)]);
        }

        return figure;
    }

    // 1, 2 or 5 times a power of ten.
    private static double Exaggeration(FaceMoves[] faces)
    {
        double wanted = faces.Min(f =>
            Shown * (f.Points.Max(p => p.At.Z) - f.Points.Min(p => p.At.Z)) / Math.Max(f.Points.Max(p => Math.Abs(p.Move)), 1e-9));
        double decade = Math.Pow(10, Math.Floor(Math.Log10(Math.Max(wanted, 1))));
        return (Math.Max(wanted, 1) / decade) switch { >= 5 => 5, >= 2 => 2, _ => 1 } * decade;
    }
}
