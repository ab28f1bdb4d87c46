using OxyPlot;
using OxyPlot.Axes;
using PoleField.Output.Results;

namespace PoleField.Output.Figures;

/// <summary>How uniform the gradient can be for each size of it.</summary>
public static class TradeOffFigure
{
    /// <summary>Name of the picture.</summary>
    public const string Name = "trade-off";

    private const double Margin = 0.05; // of the axis, beside the curve

    /// <summary>Draws the trade-off of an outcome that has one.</summary>
    public static Figure Draw(TuneOutcome outcome)
    {
        DataPoint[] curve =
        [
            .. outcome.TradeOff.Select(p => new DataPoint(Math.Abs(p.Report.Beam.Gradient), 100 * outcome.RmsOf(p.Report))).OrderBy(p => p.X),
        ];
        var before = new DataPoint(Math.Abs(outcome.Before.Beam.Gradient), 100 * outcome.RmsOf(outcome.Before));
        double from = Math.Min(before.X, curve[0].X), to = Math.Max(before.X, curve[^1].X);
        Figure figure = FigureFrame.Begin(
            new FrameText
            {
                Name = Name,
                Title = "Gradient against uniformity",
                Caption = "Smallest rms found over the aperture for each gradient at the beam, within the reach, clearance and tool the case allows; "
                    + "every shape was solved to full accuracy. The dashed lines cross at the magnet as drawn.",
                Key = [new("best found", FigureStyle.Main), new("as drawn", FigureStyle.Reference)],
            },
            new PlotRoom(480, 300, Left: 84, Right: 40));
        var panels = new Panels(figure.Model, columns: 1, rows: 1);
        double margin = Margin * (to - from);
        panels.Horizontal(0, FigureStyle.Axis(AxisPosition.Bottom, "gradient at the beam (T/m)", from - margin, to + margin));
        double top = 1.1 * Math.Max(before.Y, curve.Max(p => p.Y));
        panels.Fill(
            0,
            0,
            outcome.OfProduct ? "rms of field × gradient (%)" : "rms of the gradient (%)",
            [
                new(curve, FigureStyle.Main),
                new([new DataPoint(before.X, 0), new DataPoint(before.X, top)], FigureStyle.Reference),
                new([new DataPoint(from - margin, before.Y), new DataPoint(to + margin, before.Y)], FigureStyle.Reference),
            ]);
        return figure;
    }
}
