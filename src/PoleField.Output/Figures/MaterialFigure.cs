using OxyPlot;
using OxyPlot.Axes;
using PoleField.Materials;

namespace PoleField.Output.Figures;

/// <summary>A magnetisation curve: B over the logarithm of H, and relative permeability over B.</summary>
public static class MaterialFigure
{
    private const int Samples = 400;

    /// <summary>Draws a material's law with the points it was made from.</summary>
    /// <param name="material">The material.</param>
    /// <param name="data">Points of the table (H in A/m, B in T); empty for a linear law. Beyond the last one lies the tail.</param>
    public static Figure Draw(Material material, IReadOnlyList<(double H, double B)> data)
    {
        double lastB = data.Count > 0 ? data.Max(p => p.B) : 2;
        double highest = Math.Max(1.15 * lastB, double.IsFinite(material.Law.SaturationPolarisation) ? 1.12 * material.Law.SaturationPolarisation : 0);
        DataPoint[] law = Sample(material.Law, 0, lastB);
        DataPoint[] tail = data.Count > 0 ? Sample(material.Law, lastB, highest) : [];
        DataPoint[] table = [.. data.Where(p => p.H > 0 && p.B > 0).Select(p => new DataPoint(p.H, p.B))];
        Pen points = new(FigureStyle.Ink, 0);
        List<KeyEntry> key = [new("law between the data", FigureStyle.Main)];
        if (data.Count > 0)
        {
            key.Add(new("tail towards saturation", FigureStyle.Reference));
        }

        Figure figure = FigureFrame.Begin(
            new FrameText
            {
                Name = "material",
                Title = $"Magnetisation of {material.Name}",
                Caption = Caption(material, table.Length),
                Key = key,
            },
            new PlotRoom(640, 330, Left: 70, Right: 92));
        Panels panels = new(figure.Model, columns: 2, rows: 1);
        double lowH = (table.Length > 0 ? table : law).Min(p => p.X);
        double highH = law.Concat(tail).Max(p => p.X);
        panels.Horizontal(0, FigureStyle.LogAxis(AxisPosition.Bottom, "H (A/m)", Decade(lowH, Math.Floor), Decade(highH, Math.Ceiling)));
        panels.Horizontal(1, FigureStyle.Axis(AxisPosition.Bottom, "B (T)", 0, highest));
        panels.Fill(0, 0, "B (T)",
        [
            new([.. law.Where(p => p.X >= Decade(lowH, Math.Floor))], FigureStyle.Main), new(tail, FigureStyle.Reference), new(table, points, Marks: true),
        ]);
        panels.Fill(1, 0, "relative permeability", [new(Permeability(law), FigureStyle.Main), new(Permeability(tail), FigureStyle.Reference), new(Permeability(table), points, Marks: true)]);
        return figure;
    }

    private static string Caption(Material material, int points)
    {
        string saturation = double.IsFinite(material.Law.SaturationPolarisation)
            ? $" Saturation polarisation {FigureStyle.Number(material.Law.SaturationPolarisation)} T."
            : "";
        string table = points > 0 ? $" {points} points (circles), {material.State}." : "";
        return $"{material.Description.TrimEnd('.')}.{table}{saturation} Source: {material.Source.TrimEnd('.')}.";
    }

    private static DataPoint[] Sample(MagneticLaw law, double from, double to) =>
    [
        .. Enumerable.Range(from > 0 ? 0 : 1, Samples)
            .Select(i => from + ((to - from) * i / Samples))
            .Select(b => new DataPoint(law.At(b).FieldStrength, b)),
    ];

    private static DataPoint[] Permeability(IEnumerable<DataPoint> hb) =>
        [.. hb.Select(p => new DataPoint(p.Y, p.Y / (PhysicalConstants.Mu0 * p.X)))];

    private static double Decade(double value, Func<double, double> round) => Math.Pow(10, round(Math.Log10(value)));
}
