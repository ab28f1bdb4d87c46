using OxyPlot;
using OxyPlot.Axes;
using PoleField.Design;

namespace PoleField.Output.Figures;

/// <summary>Old and new faces, and how far each place moved.</summary>
public static class TuneFigure
{
    private const int MostFaces = 2;

    /// <summary>Draws the stretches that moved, the first two side by side.</summary>
    public static Figure Draw(TuneResult tuned)
    {
        (string Layer, IReadOnlyList<FaceMove> Points)[] faces = [.. tuned.Moves.Take(MostFaces)];
        Figure figure = FigureFrame.Begin(
            new FrameText
            {
                Name = "tuned-faces",
                Title = "Tuned pole faces",
                Caption = "Above: the faces across the beam, as they were (dashed) and tuned, to scale in neither direction. "
                    + "Below: outward move of the face where it was; positive where iron is added.",
                Key = [new("tuned", FigureStyle.Main), new("before", FigureStyle.Reference)],
            },
            new PlotRoom(620, 400, Left: 84, Right: 84));
        var panels = new Panels(figure.Model, columns: faces.Length, rows: 2);
        for (int c = 0; c < faces.Length; c++)
        {
            IReadOnlyList<FaceMove> points = faces[c].Points;
            double[] across = [.. points.SelectMany(p => new[] { p.At.Y, p.At.Y + (p.Move * p.Outward.Y) }).Select(y => 1e3 * y)];
            panels.Horizontal(c, FigureStyle.Axis(AxisPosition.Bottom, $"y (mm), {faces[c].Layer}", across.Min(), across.Max()));
            panels.Fill(
                c,
                0,
                "z (mm)",
                [
                    new([.. points.Select(p => new DataPoint(1e3 * (p.At.Y + (p.Move * p.Outward.Y)), 1e3 * (p.At.Z + (p.Move * p.Outward.Z))))], FigureStyle.Main),
                    new([.. points.Select(p => new DataPoint(1e3 * p.At.Y, 1e3 * p.At.Z))], FigureStyle.Reference),
                ]);
            panels.Fill(c, 1, "move (µm)", [new([.. points.Select(p => new DataPoint(1e3 * p.At.Y, 1e6 * p.Move))], FigureStyle.Main)]);
        }

        return figure;
    }
}
