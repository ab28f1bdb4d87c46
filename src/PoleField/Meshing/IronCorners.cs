using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>Corners of the iron's outline: the field is singular there, and so is the error of any mesh.</summary>
internal static class IronCorners
{
    private const double SmoothDegrees = 3; // joints that turn less are no corners

    /// <summary>Vertices of the section where the outline of the magnetic parts turns, with the angle the iron fills there, radians.</summary>
    public static IEnumerable<(int Vertex, double IronAngle)> Of(CrossSection section, IReadOnlyCollection<int> magneticParts)
    {
        Dictionary<int, List<(Point Leaves, bool IronLeft)>> ends = [];
        foreach (SectionEdge e in section.Edges.Where(e => IsMagnetic(e.Left) != IsMagnetic(e.Right)))
        {
            Note(e.Start, e.Curve.Derivative(0).Unit(), IsMagnetic(e.Left));
            Note(e.End, -e.Curve.Derivative(1).Unit(), IsMagnetic(e.Right));
        }

        foreach ((int vertex, List<(Point Leaves, bool IronLeft)> around) in ends.OrderBy(e => e.Key))
        {
            if (around.Count != 2)
            {
                yield return (vertex, 0); // outlines that touch in a point are corners of the worst kind
                continue;
            }

            (Point from, Point to) = around[0].IronLeft
                ? (around[0].Leaves, around[1].Leaves)
                : (around[1].Leaves, around[0].Leaves);
            double angle = Math.Atan2(from.Cross(to), from.Dot(to));
            angle += angle < 0 ? Math.Tau : 0;
            if (Math.Abs(angle - Math.PI) > SmoothDegrees * Math.PI / 180)
            {
                yield return (vertex, angle);
            }
        }

        bool IsMagnetic(int region) => region >= 0 && magneticParts.Contains(section.Regions[region].Part);

        void Note(int vertex, Point leaves, bool ironLeft)
        {
            if (!ends.TryGetValue(vertex, out List<(Point Leaves, bool IronLeft)>? list))
            {
                ends[vertex] = list = [];
            }

            list.Add((leaves, ironLeft));
        }
    }
}
