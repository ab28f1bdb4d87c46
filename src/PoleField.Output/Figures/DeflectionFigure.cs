using OxyPlot;
using OxyPlot.Axes;
using PoleField.Beam;

namespace PoleField.Output.Figures;

/// <summary>The pattern a beam leaves at the detector, with the magnet on and off.</summary>
public static class DeflectionFigure
{
    /// <summary>Name of the picture.</summary>
    public const string Name = "deflection";

    /// <summary>Draws the pattern.</summary>
    /// <param name="flight">The flight.</param>
    /// <param name="caption">Species, source and what is not modelled.</param>
    public static Figure Draw(FlightReport flight, string caption)
    {
        IReadOnlyList<PatternPoint> pattern = flight.Pattern;
        double reach = 1e3 * pattern[^1].Z;
        double on = pattern.Max(p => p.Intensity);
        double off = pattern.Max(p => p.WithoutField);

        // The undeflected beam is often far higher than the pattern; it is shown for its place and width.
        double scale = on > 0 && off > 0 ? Math.Min(1, on / off) : 1;
        string offName = scale < 1 ? $"magnet off, times {FigureStyle.Number(scale, 2)}" : "magnet off";
        Figure figure = FigureFrame.Begin(
            new FrameText
            {
                Name = Name,
                Title = "Pattern at the detector along the deflection",
                Caption = caption,
                Key = [new("magnet on", FigureStyle.Main), new(offName, FigureStyle.Reference)],
            },
            new PlotRoom(600, 320, Left: 84));
        Panels panels = new(figure.Model, columns: 1, rows: 1);
        panels.Horizontal(0, FigureStyle.Axis(AxisPosition.Bottom, "height above the undeflected beam (mm)", -reach, reach));
        panels.Fill(0, 0, "share of the beam per mm", [Curve(p => scale * p.WithoutField, FigureStyle.Reference), Curve(p => p.Intensity, FigureStyle.Main)]);
        return figure;

        PanelCurve Curve(Func<PatternPoint, double> value, Pen pen) =>
            new([.. pattern.Select(p => new DataPoint(1e3 * p.Z, 1e-3 * value(p)))], pen);
    }
}
