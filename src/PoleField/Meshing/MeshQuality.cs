using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>How good a mesh is, in numbers.</summary>
/// <param name="Triangles">Number of triangles, second disc included.</param>
/// <param name="Vertices">Number of vertices.</param>
/// <param name="SmallestAngleDegrees">Smallest angle of any straight-sided triangle, degrees.</param>
/// <param name="SmallestAngleAt">Where it is, metres.</param>
/// <param name="ShortestEdge">Shortest edge, metres.</param>
/// <param name="MeanEdge">Mean edge length, each triangle's three sides counted, metres.</param>
/// <param name="LongestEdge">Longest edge, metres.</param>
public sealed record MeshQuality(
    int Triangles,
    int Vertices,
    double SmallestAngleDegrees,
    Point SmallestAngleAt,
    double ShortestEdge,
    double MeanEdge,
    double LongestEdge)
{
    /// <summary>Measures a mesh.</summary>
    public static MeshQuality Of(Mesh mesh)
    {
        double smallest = Math.PI, shortest = double.PositiveInfinity, longest = 0, sum = 0;
        Point at = default;
        for (int t = 0; t < mesh.TriangleCount; t++)
        {
            for (int c = 0; c < 3; c++)
            {
                Point p = mesh.Vertices[mesh.Triangles[(3 * t) + c]];
                Point u = mesh.Vertices[mesh.Triangles[(3 * t) + ((c + 1) % 3)]] - p;
                Point v = mesh.Vertices[mesh.Triangles[(3 * t) + ((c + 2) % 3)]] - p;
                double angle = Math.Atan2(u.Cross(v), u.Dot(v));
                double length = u.Length;
                (shortest, longest, sum) = (Math.Min(shortest, length), Math.Max(longest, length), sum + length);
                if (angle < smallest)
                {
                    (smallest, at) = (angle, p);
                }
            }
        }

        return new MeshQuality(
            mesh.TriangleCount, mesh.Vertices.Count, smallest * 180 / Math.PI, at, shortest, sum / (3 * mesh.TriangleCount), longest);
    }
}
