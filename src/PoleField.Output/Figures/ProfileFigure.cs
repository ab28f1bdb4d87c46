using OxyPlot;
using OxyPlot.Axes;
using PoleField.Beam;

namespace PoleField.Output.Figures;

/// <summary>Two lines through the beam's centre.</summary>
/// <param name="Name">What the curves are: "computed", "two-wire field", ...</param>
/// <param name="AlongY">Values along y.</param>
/// <param name="AlongZ">Values along z.</param>
public sealed record Profiles(string Name, IReadOnlyList<BeamValues> AlongY, IReadOnlyList<BeamValues> AlongZ);

/// <summary>Gradient and field along y and along z through the beam's centre, with another field beside them if there is one.</summary>
public static class ProfileFigure
{
    /// <summary>Draws computed profiles and, if given, those they are compared with.</summary>
    public static Figure Draw(Profiles computed, string caption, Profiles? comparison = null)
    {
        List<KeyEntry> key = [new(computed.Name, FigureStyle.Main)];
        if (comparison is not null)
        {
            key.Add(new(comparison.Name, FigureStyle.Reference));
        }

        Figure figure = FigureFrame.Begin(
            new FrameText { Name = "profiles", Title = "Gradient and field through the beam's centre", Caption = caption, Key = key },
            new PlotRoom(620, 400, Left: 84, Right: 84));
        Panels panels = new(figure.Model, columns: 2, rows: 2);
        panels.Horizontal(0, Across(computed.AlongY.Select(v => v.At.Y), "y (mm)"));
        panels.Horizontal(1, Across(computed.AlongZ.Select(v => v.At.Z), "z (mm)"));
        panels.Fill(0, 0, "d|B|/dz (T/m)", Curves(p => p.AlongY, v => v.At.Y, v => v.Gradient));
        panels.Fill(0, 1, "|B| (T)", Curves(p => p.AlongY, v => v.At.Y, v => v.Field));
        panels.Fill(1, 0, "d|B|/dz (T/m)", Curves(p => p.AlongZ, v => v.At.Z, v => v.Gradient));
        panels.Fill(1, 1, "|B| (T)", Curves(p => p.AlongZ, v => v.At.Z, v => v.Field));
        return figure;

        List<PanelCurve> Curves(
            Func<Profiles, IReadOnlyList<BeamValues>> line, Func<BeamValues, double> place, Func<BeamValues, double> value)
        {
            List<PanelCurve> curves = [new([.. line(computed).Select(v => new DataPoint(1e3 * place(v), value(v)))], FigureStyle.Main)];
            if (comparison is not null)
            {
                curves.Add(new([.. line(comparison).Select(v => new DataPoint(1e3 * place(v), value(v)))], FigureStyle.Reference));
            }

            return curves;
        }
    }

    private static LinearAxis Across(IEnumerable<double> places, string title)
    {
        double[] all = [.. places.Select(p => 1e3 * p)];
        return FigureStyle.Axis(AxisPosition.Bottom, title, all.Min(), all.Max());
    }
}
