using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>Finds where curves meet at sharp angles.</summary>
internal static class Corners
{
    // Ruppert's refinement needs no care from 60 degrees up (Shewchuk 2002, section 5).
    private const double SharpAngle = Math.PI / 3;

    // Below this no sensible element fits between the two curves.
    private const double CuspAngle = 0.5 * Math.PI / 180;

    public static void Classify(IReadOnlyList<BoundaryCurve> curves)
    {
        Dictionary<int, List<(double Angle, int Curve, bool Start)>> ends = [];
        for (int i = 0; i < curves.Count; i++)
        {
            Note(ends, curves[i].Start, curves[i].Leaves(true), i, true);
            Note(ends, curves[i].End, curves[i].Leaves(false), i, false);
        }

        foreach (List<(double Angle, int Curve, bool Start)> around in ends.Values.Where(e => e.Count > 1))
        {
            around.Sort();
            for (int k = 0; k < around.Count; k++)
            {
                (double angle, int curve, bool start) = around[k];
                (double nextAngle, int nextCurve, bool nextStart) = around[(k + 1) % around.Count];
                double between = nextAngle - angle + (k + 1 == around.Count ? Math.Tau : 0);
                bool bent = !curves[curve].IsStraight || !curves[nextCurve].IsStraight;
                Corner corner = between < CuspAngle && bent ? Corner.Cusp : between < SharpAngle ? Corner.Sharp : Corner.Open;
                Raise(curves[curve], start, corner);
                Raise(curves[nextCurve], nextStart, corner);
            }
        }
    }

    private static void Note(
        Dictionary<int, List<(double Angle, int Curve, bool Start)>> ends, int vertex, Point direction, int curve, bool start)
    {
        if (!ends.TryGetValue(vertex, out List<(double Angle, int Curve, bool Start)>? list))
        {
            ends[vertex] = list = [];
        }

        list.Add((Math.Atan2(direction.Z, direction.Y), curve, start));
    }

    private static void Raise(BoundaryCurve curve, bool start, Corner corner)
    {
        if (start)
        {
            curve.AtStart = (Corner)Math.Max((int)curve.AtStart, (int)corner);
        }
        else
        {
            curve.AtEnd = (Corner)Math.Max((int)curve.AtEnd, (int)corner);
        }
    }
}
