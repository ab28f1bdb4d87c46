using OxyPlot;
using OxyPlot.Axes;

namespace PoleField.Output.Figures;

/// <summary>One excitation.</summary>
/// <param name="AmpereTurns">Ampere-turns that drive the gap, A.</param>
/// <param name="Field">|B| at the beam, T.</param>
/// <param name="Gradient">d|B|/dz at the beam, T/m.</param>
public readonly record struct ExcitationPoint(double AmpereTurns, double Field, double Gradient);

/// <summary>Field and gradient against ampere-turns, with the straight line of the start and the onset of saturation.</summary>
public static class ExcitationFigure
{
    /// <summary>Draws an excitation curve.</summary>
    /// <param name="points">Two points or more, in rising order; the first sets the straight line through zero.</param>
    /// <param name="onset">Ampere-turns at the onset of saturation, A; null when it was not reached.</param>
    /// <param name="caption">Numbers and what counts as onset.</param>
    public static Figure Draw(IReadOnlyList<ExcitationPoint> points, double? onset, string caption)
    {
        Pen straight = FigureStyle.Reference;
        Figure figure = FigureFrame.Begin(
            new FrameText
            {
                Name = "excitation",
                Title = "Field and gradient against ampere-turns",
                Caption = caption,
                Key = [new("computed", FigureStyle.Main), new("without saturation (straight from the start)", straight)],
            },
            new PlotRoom(560, 430, Left: 84));
        double last = points.Max(p => p.AmpereTurns);
        (double unit, string unitName) = last >= 2000 ? (1e3, "kA") : (1.0, "A");
        Panels panels = new(figure.Model, columns: 1, rows: 2);
        panels.Horizontal(0, FigureStyle.Axis(AxisPosition.Bottom, $"ampere-turns ({unitName})", 0, 1.03 * last / unit));
        panels.Fill(0, 0, "d|B|/dz (T/m)", Curves(p => p.Gradient));
        panels.Fill(0, 1, "|B| (T)", Curves(p => p.Field));
        if (onset is double at)
        {
            string label = $"onset of saturation at {FigureStyle.Number(at / unit)} {unitName}";
            figure.Model.Annotations.Add(new UprightLine(at / unit, "") { XAxisKey = "column0", YAxisKey = "panel0-0" });
            figure.Model.Annotations.Add(new UprightLine(at / unit, label) { XAxisKey = "column0", YAxisKey = "panel0-1" });
        }

        return figure;

        List<PanelCurve> Curves(Func<ExcitationPoint, double> value)
        {
            ExcitationPoint first = points[0];
            double slope = value(first) / first.AmpereTurns;
            return
            [
                new([new DataPoint(0, 0), new DataPoint(last / unit, slope * last)], straight),
                new([.. points.Select(p => new DataPoint(p.AmpereTurns / unit, value(p)))], FigureStyle.Main, Marks: true),
            ];
        }
    }
}
