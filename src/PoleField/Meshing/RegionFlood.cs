using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>Gives every triangle the region that the curves around it say.</summary>
internal static class RegionFlood
{
    private const int Unknown = int.MinValue;

    /// <summary>Region of each triangle; <see cref="CrossSection.Outside"/> beyond the rim.</summary>
    /// <exception cref="MeshingException">Two curves disagree, or a region has no boundary.</exception>
    public static int[] Regions(
        Triangulation triangulation, IReadOnlyList<BoundaryCurve> curves, IReadOnlyList<CurvePiece> pieces)
    {
        int[] regions = new int[triangulation.TriangleCount];
        Array.Fill(regions, Unknown);
        IntList stack = new();
        for (int h = 0; h < 3 * triangulation.TriangleCount; h++)
        {
            int piece = triangulation.PieceOf(h);
            if (piece < 0)
            {
                continue;
            }

            BoundaryCurve curve = curves[pieces[piece].Curve];
            int region = triangulation.Origin(h) == pieces[piece].A ? curve.Left : curve.Right;
            if (regions[h / 3] == Unknown)
            {
                regions[h / 3] = region;
                stack.Add(h / 3);
                Spread(triangulation, regions, stack);
            }
            else if (regions[h / 3] != region)
            {
                Point at = triangulation.Place(triangulation.Origin(h));
                throw new MeshingException(FormattableString.Invariant(
                    $"The curves around one region name two, {regions[h / 3]} and {region}, near ({at.Y:g9}, {at.Z:g9}) m; an outline is open or its sides are swapped."), at);
            }
        }

        int lost = Array.IndexOf(regions, Unknown);
        if (lost >= 0)
        {
            Point at = triangulation.Place(triangulation.Origin(3 * lost));
            throw new MeshingException(FormattableString.Invariant(
                $"Nothing bounds the area near ({at.Y:g9}, {at.Z:g9}) m."), at);
        }

        return regions;
    }

    private static void Spread(Triangulation triangulation, int[] regions, IntList stack)
    {
        while (stack.Count > 0)
        {
            int t = stack.Pop();
            for (int h = 3 * t; h < (3 * t) + 3; h++)
            {
                int twin = triangulation.Twin(h);
                if (twin >= 0 && triangulation.PieceOf(h) < 0 && regions[twin / 3] == Unknown)
                {
                    regions[twin / 3] = regions[t];
                    stack.Add(twin / 3);
                }
            }
        }
    }
}
