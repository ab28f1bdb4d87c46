using OxyPlot;
using OxyPlot.Axes;
using PoleField.Beam;

namespace PoleField.Output.Figures;

/// <summary>Field and gradient against ampere-turns, with the straight line of the start, what saturation does to them, and its onset.</summary>
public static class ExcitationFigure
{
    /// <summary>Name of the picture.</summary>
    public const string Name = "excitation";

    /// <summary>Draws an excitation curve.</summary>
    /// <param name="ramp">The curve.</param>
    /// <param name="caption">Numbers and what counts as onset.</param>
    public static Figure Draw(RampReport ramp, string caption)
    {
        RampStep[] all = [ramp.Start, .. ramp.Steps];
        double last = all.Max(s => s.AmpereTurns);
        double best = all.Max(s => s.GradientPerAmpereTurn);
        (double unit, string unitName) = last >= 2000 ? (1e3, "kA") : (1.0, "A");
        List<KeyEntry> key = [new("computed", FigureStyle.Main)];
        if (!ramp.HasOtherSources)
        {
            key.Add(new("without saturation (straight from the start)", FigureStyle.Reference));
        }

        Figure figure = FigureFrame.Begin(
            new FrameText { Name = Name, Title = "What the ampere-turns give", Caption = caption, Key = key },
            new PlotRoom(640, 520, Left: 84, Right: 84));
        Panels panels = new(figure.Model, columns: 2, rows: 3);
        for (int column = 0; column < 2; column++)
        {
            panels.Horizontal(column, FigureStyle.Axis(AxisPosition.Bottom, $"ampere-turns ({unitName})", 0, 1.03 * last / unit));
        }

        panels.Fill(0, 0, "d|B|/dz (T/m)", FromZero(s => s.Report.Beam.Gradient));
        panels.Fill(0, 1, "|B| (T)", FromZero(s => s.Report.Beam.Field));
        panels.Fill(0, 2, "gap share (%)", Steps(s => 100 * (s.Report.Circuit.Efficiency ?? double.NaN)));
        panels.Fill(1, 0, "d|B|/dz per A (% of best)", Steps(s => 100 * s.GradientPerAmpereTurn / best));
        panels.Fill(1, 1, "spread of d|B|/dz (%)", Steps(s => 100 * s.Report.Gradient.Spread));
        panels.Fill(1, 2, ramp.HalfSpacing is null ? "largest |B| in iron (T)" : "k = aG/B", Steps(s => (ramp.HalfSpacing is null ? s.IronFieldMax : s.ShapeFactor) ?? double.NaN));
        if (ramp.OnsetFactor * ramp.Steps[0].AmpereTurns / ramp.Steps[0].Factor is { } onset)
        {
            string label = $"onset of saturation at {FigureStyle.Number(onset / unit)} {unitName}";
            for (int panel = 0; panel < 6; panel++)
            {
                figure.Model.Annotations.Add(new UprightLine(onset / unit, panel == 2 ? label : "")
                {
                    XAxisKey = FormattableString.Invariant($"column{panel / 3}"),
                    YAxisKey = FormattableString.Invariant($"panel{panel / 3}-{panel % 3}"),
                });
            }
        }

        return figure;

        List<PanelCurve> FromZero(Func<RampStep, double> value)
        {
            PanelCurve computed = new([.. all.Select(s => new DataPoint(s.AmpereTurns / unit, value(s)))], FigureStyle.Main, Marks: true);
            double slope = value(all[0]) / all[0].AmpereTurns;
            return ramp.HasOtherSources ? [computed] : [new([new DataPoint(0, 0), new DataPoint(last / unit, slope * last)], FigureStyle.Reference), computed];
        }

        List<PanelCurve> Steps(Func<RampStep, double> value) =>
            [new([.. all.Select(s => new DataPoint(s.AmpereTurns / unit, value(s)))], FigureStyle.Main, Marks: true)];
    }
}
