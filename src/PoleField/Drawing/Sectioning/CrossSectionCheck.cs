using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Verifies what a <see cref="CrossSection"/> promises, by other means than those that made it.</summary>
public static class CrossSectionCheck
{
    private const double Rounding = 1e-9; // of the section's size
    private const double AreaRounding = 1e-9; // of the section's size squared

    /// <summary>Everything that is wrong, in words; empty for a sound section.</summary>
    public static IReadOnlyList<string> Faults(CrossSection section)
    {
        List<string> faults = [];
        CheckEdges(section, faults);
        CheckMeetings(section, faults);
        CheckTurns(section, faults);
        CheckAreas(section, faults);
        CheckSides(section, faults);
        return faults;
    }

    private static void CheckEdges(CrossSection s, List<string> faults)
    {
        HashSet<int> used = [];
        HashSet<Point> places = [];
        for (int i = 0; i < s.Edges.Count; i++)
        {
            SectionEdge e = s.Edges[i];
            used.Add(e.Start);
            used.Add(e.End);
            Expect(e.Curve.Start == s.Vertices[e.Start] && e.Curve.End == s.Vertices[e.End], $"edge {i} does not end at its vertices");
            Expect(e.Left != e.Right, $"edge {i} has region {e.Left} on both sides");
            Expect(IsRegion(e.Left) && IsRegion(e.Right), $"edge {i} names a region that is not there");
            Expect(e.Left != CrossSection.Outside && e.Right != CrossSection.Outside || s.HasRim, $"edge {i} borders on the outside without a rim");
        }

        for (int v = 0; v < s.Vertices.Count; v++)
        {
            Expect(used.Contains(v), $"vertex {v} is on no edge");
            Expect(places.Add(s.Vertices[v]), $"vertex {v} repeats another");
        }

        bool IsRegion(int r) => r >= CrossSection.Outside && r < s.Regions.Count;

        void Expect(bool holds, FormattableString fault)
        {
            if (!holds)
            {
                faults.Add(FormattableString.Invariant(fault));
            }
        }
    }

    // Edges meet only at common ends.
    private static void CheckMeetings(CrossSection s, List<string> faults)
    {
        double tolerance = Rounding * s.Bounds.Diagonal;
        foreach ((int i, int j) in new BoxTree([.. s.Edges.Select(e => e.Curve.Bounds)]).Pairs(0))
        {
            foreach ((double t, _) in CurveIntersection.Find(s.Edges[i].Curve, s.Edges[j].Curve, 0.01 * tolerance))
            {
                Point p = s.Edges[i].Curve.At(t);
                bool common = Common(s.Edges[i], s.Edges[j]).Any(v => s.Vertices[v].DistanceTo(p) <= 100 * tolerance);
                if (!common)
                {
                    faults.Add(FormattableString.Invariant($"edges {i} and {j} meet at ({p.Y:g9}, {p.Z:g9}) m, which is no common end"));
                }
            }
        }
    }

    private static IEnumerable<int> Common(SectionEdge a, SectionEdge b) =>
        new[] { a.Start, a.End }.Intersect([b.Start, b.End]);

    // Around a vertex each sector between neighbouring curves is named alike by both.
    private static void CheckTurns(CrossSection s, List<string> faults)
    {
        Dictionary<int, List<(double Angle, int Before, int After)>> around = [];
        double radius = 1e-4 * s.Edges.Min(e => e.Curve.Length);
        for (int i = 0; i < s.Edges.Count; i++)
        {
            SectionEdge e = s.Edges[i];
            double share = radius / e.Curve.Length;
            Leave(e.Start, e.Curve.At(share), e.Right, e.Left);
            Leave(e.End, e.Curve.At(1 - share), e.Left, e.Right);
        }

        foreach ((int v, List<(double Angle, int Before, int After)> leaving) in around.OrderBy(a => a.Key))
        {
            leaving.Sort();
            for (int k = 0; k < leaving.Count; k++)
            {
                if (leaving[k].After != leaving[(k + 1) % leaving.Count].Before)
                {
                    faults.Add(FormattableString.Invariant($"around vertex {v} regions {leaving[k].After} and {leaving[(k + 1) % leaving.Count].Before} share a sector"));
                }
            }
        }

        void Leave(int vertex, Point toward, int before, int after)
        {
            Point d = toward - s.Vertices[vertex];
            (around.TryGetValue(vertex, out List<(double, int, int)>? list) ? list : around[vertex] = [])
                .Add((Math.Atan2(d.Z, d.Y), before, after));
        }
    }

    // Green's theorem over the edges of each region.
    private static void CheckAreas(CrossSection s, List<string> faults)
    {
        double[] areas = new double[s.Regions.Count];
        foreach (SectionEdge e in s.Edges)
        {
            double term = e.Curve.AreaTerm(s.Bounds.Centre);
            if (e.Left >= 0)
            {
                areas[e.Left] += term;
            }

            if (e.Right >= 0)
            {
                areas[e.Right] -= term;
            }
        }

        double tolerance = AreaRounding * s.Bounds.Diagonal * s.Bounds.Diagonal;
        for (int r = 0; r < areas.Length; r++)
        {
            bool open = r == CrossSection.Air && !s.HasRim;
            double stated = s.Regions[r].Area;
            if (open ? !double.IsPositiveInfinity(stated) : !(Math.Abs(areas[r] - stated) <= tolerance))
            {
                faults.Add(FormattableString.Invariant($"region {r} states an area of {stated:g9} m²; its edges enclose {areas[r]:g9} m²"));
            }
        }
    }

    // What lies beside the middle of an edge, seen from the other edges: the region whose edges wind around it.
    private static void CheckSides(CrossSection s, List<string> faults)
    {
        const int most = 200; // edges looked at; the test is quadratic
        int step = Math.Max(1, s.Edges.Count / most);
        for (int i = 0; i < s.Edges.Count; i += step)
        {
            SectionEdge e = s.Edges[i];
            Point normal = e.Curve.Derivative(0.5).Unit().Perpendicular;
            double off = 1e-6 * Math.Min(e.Curve.Length, s.Bounds.Diagonal);
            foreach ((int region, double side) in new[] { (e.Left, off), (e.Right, -off) })
            {
                Point p = e.Curve.At(0.5) + (side * normal);
                int turns = region >= 0 ? SectionPoint.Turns(s, region, p) : 1;
                int expected = region == CrossSection.Air && !s.HasRim ? 0 : 1;
                if (turns != expected)
                {
                    faults.Add(FormattableString.Invariant($"edge {i}: its region {region} winds {turns} times about a point beside it"));
                }
            }
        }
    }
}
