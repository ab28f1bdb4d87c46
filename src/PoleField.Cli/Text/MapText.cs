using PoleField.Geometry;
using PoleField.Output.Maps;

namespace PoleField.Cli.Text;

/// <summary>Tells what a field map holds.</summary>
internal static class MapText
{
    /// <summary>The map in words.</summary>
    /// <param name="map">Table of values; null when none was made.</param>
    /// <param name="triangles">Triangles of the written mesh; null when none was.</param>
    public static Answer Of(FieldMap? map, int? triangles)
    {
        List<string[]> rows = [];
        if (map is not null)
        {
            Count("the extracted field: field and gradient", MapSource.Extraction);
            Count("its finite element: field, and gradient in air", MapSource.Element);
            Count("nothing: outside the model, empty", MapSource.None);
        }

        if (triangles is { } t)
        {
            rows.Add(["mesh of second-order triangles: the finite elements' values", FormattableString.Invariant($"{t}")]);
        }

        string caption = map is null ? "Field map" : $"Field map: {Places(map.Grid)}";
        return new Answer("Field map", [new AnswerTable(caption, ["values from", ">places or cells"], rows)], map is null ? [] : [Mind]);

        void Count(string from, MapSource source)
        {
            int count = map!.Samples.Count(s => s.Source == source);
            if (count > 0)
            {
                rows.Add([from, FormattableString.Invariant($"{count}")]);
            }
        }
    }

    private const string Mind =
        "The extracted field has the accuracy of the solve. A gradient of a finite element is rougher, jumps from element to element and is worst at corners of the iron.";

    private static string Places(MapGrid grid)
    {
        if (!grid.IsRectangle)
        {
            return FormattableString.Invariant($"{grid.Count} listed places");
        }

        (Point from, Point to) = (grid[0], grid[grid.Count - 1]);
        return FormattableString.Invariant($"{grid.CountY} by {grid.CountZ} places, ") + $"y from {Mm(from.Y)} to {Mm(to.Y)} mm, z from {Mm(from.Z)} to {Mm(to.Z)} mm";
    }

    private static string Mm(double metres) => Numbers.Short(1e3 * metres);
}
