using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Beam;

/// <summary>Elements at the places where the field is singular: corners of the iron, and all ends of the outlines of magnets.</summary>
internal static class CornerElements
{
    /// <summary>Elements that touch each such place, place by place.</summary>
    public static int[][] Of(Mesh mesh, Magnet magnet)
    {
        CrossSection section = mesh.Section;
        var corners = new SortedSet<int>(IronCorners.Of(section, magnet.MagneticParts).Select(c => c.Vertex));
        foreach (SectionEdge e in section.Edges.Where(e => IsMagnet(e.Left) || IsMagnet(e.Right)))
        {
            corners.Add(e.Start);
            corners.Add(e.End);
        }

        Dictionary<Point, int> numbers = [];
        foreach (int vertex in corners)
        {
            numbers.TryAdd(section.Vertices[vertex], numbers.Count);
        }

        var elements = new List<int>[numbers.Count];
        for (int k = 0; k < elements.Length; k++)
        {
            elements[k] = [];
        }

        for (int slot = 0; slot < mesh.Triangles.Count; slot++)
        {
            if (mesh.Regions[slot / 3] != Mesh.Exterior && numbers.TryGetValue(mesh.Vertices[mesh.Triangles[slot]], out int corner))
            {
                elements[corner].Add(slot / 3);
            }
        }

        return [.. elements.Select(e => e.ToArray())];

        bool IsMagnet(int region) => region >= 0 && section.Regions[region].Part is >= 0 and int part && magnet.Roles[part].Remanence != default;
    }
}
