using OxyPlot;
using OxyPlot.Axes;
using PoleField.Beam;

namespace PoleField.Output.Figures;

/// <summary>One place of a profile.</summary>
/// <param name="Place">Coordinate along the line, metres.</param>
/// <param name="Field">|B|, T.</param>
/// <param name="Gradient">d|B|/dz, T/m.</param>
public readonly record struct ProfilePoint(double Place, double Field, double Gradient)
{
    /// <summary>A place of a line along y.</summary>
    public static ProfilePoint AlongY(BeamValues v) => new(v.At.Y, v.Field, v.Gradient);

    /// <summary>A place of a line along z.</summary>
    public static ProfilePoint AlongZ(BeamValues v) => new(v.At.Z, v.Field, v.Gradient);
}

/// <summary>Two lines through the beam's centre.</summary>
/// <param name="Name">What the curves are: "computed", "two-wire field", ...</param>
/// <param name="AlongY">Values along y.</param>
/// <param name="AlongZ">Values along z.</param>
public sealed record Profiles(string Name, IReadOnlyList<ProfilePoint> AlongY, IReadOnlyList<ProfilePoint> AlongZ);

/// <summary>Gradient and field along y and along z through the beam's centre, with another field beside them if there is one.</summary>
public static class ProfileFigure
{
    /// <summary>Name of the picture.</summary>
    public const string Name = "profiles";

    /// <summary>Draws computed profiles and, if given, those they are compared with.</summary>
    public static Figure Draw(Profiles computed, string caption, Profiles? comparison = null)
    {
        List<KeyEntry> key = [new(computed.Name, FigureStyle.Main)];
        if (comparison is not null)
        {
            key.Add(new(comparison.Name, FigureStyle.Reference));
        }

        Figure figure = FigureFrame.Begin(
            new FrameText { Name = Name, Title = "Gradient and field through the beam's centre", Caption = caption, Key = key },
            new PlotRoom(620, 400, Left: 84, Right: 84));
        Panels panels = new(figure.Model, columns: 2, rows: 2);
        panels.Horizontal(0, Across(computed.AlongY, "y (mm)"));
        panels.Horizontal(1, Across(computed.AlongZ, "z (mm)"));
        panels.Fill(0, 0, "d|B|/dz (T/m)", Curves(p => p.AlongY, v => v.Gradient));
        panels.Fill(0, 1, "|B| (T)", Curves(p => p.AlongY, v => v.Field));
        panels.Fill(1, 0, "d|B|/dz (T/m)", Curves(p => p.AlongZ, v => v.Gradient));
        panels.Fill(1, 1, "|B| (T)", Curves(p => p.AlongZ, v => v.Field));
        return figure;

        List<PanelCurve> Curves(Func<Profiles, IReadOnlyList<ProfilePoint>> line, Func<ProfilePoint, double> value)
        {
            List<PanelCurve> curves = [new([.. line(computed).Select(v => new DataPoint(1e3 * v.Place, value(v)))], FigureStyle.Main)];
            if (comparison is not null)
            {
                curves.Add(new([.. line(comparison).Select(v => new DataPoint(1e3 * v.Place, value(v)))], FigureStyle.Reference));
            }

            return curves;
        }
    }

    private static LinearAxis Across(IEnumerable<ProfilePoint> points, string title)
    {
        double[] all = [.. points.Select(p => 1e3 * p.Place)];
        return FigureStyle.Axis(AxisPosition.Bottom, title, all.Min(), all.Max());
    }
}
