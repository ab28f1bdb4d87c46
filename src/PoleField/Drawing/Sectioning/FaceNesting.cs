using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Tells which face each closed walk bounds: outer walks of connected pieces bound the face those pieces lie in.</summary>
internal sealed class FaceNesting
{
    private readonly PlanarMap _map;
    private readonly List<PlanarMap.Cycle> _cycles;
    private readonly int[] _cycleOfHalf;
    private readonly int[] _component;  // of each edge
    private readonly int[] _outer;      // outer cycle of each component (indexed by its first edge), −1 elsewhere
    private readonly int[] _face;       // of each cycle, −1 while unknown

    private FaceNesting(PlanarMap map, List<PlanarMap.Cycle> cycles)
    {
        (_map, _cycles) = (map, cycles);
        _cycleOfHalf = new int[2 * map.Edges.Count];
        for (int c = 0; c < cycles.Count; c++)
        {
            foreach (int h in map.Walk(cycles[c].Half))
            {
                _cycleOfHalf[h] = c;
            }
        }

        _component = Components(map);
        _outer = new int[map.Edges.Count];
        Array.Fill(_outer, -1);
        _face = new int[cycles.Count];
        Array.Fill(_face, -1);
    }

    /// <summary>Face of each cycle; face 0 is the unbounded one.</summary>
    public static int[] FacesOf(PlanarMap map, List<PlanarMap.Cycle> cycles, out int faces)
    {
        FaceNesting nesting = new(map, cycles);
        faces = nesting.NumberInnerCycles();
        nesting.PlaceOuterCycles();
        return nesting._face;
    }

    private static int[] Components(PlanarMap map)
    {
        UnionFind sets = new(map.Edges.Count);
        int[] edgeAt = new int[map.Points.Count];
        Array.Fill(edgeAt, -1);
        for (int e = 0; e < map.Edges.Count; e++)
        {
            foreach (int v in new[] { map.Edges[e].Start, map.Edges[e].End })
            {
                if (edgeAt[v] < 0)
                {
                    edgeAt[v] = e;
                }

                sets.Union(edgeAt[v], e);
            }
        }

        return [.. Enumerable.Range(0, map.Edges.Count).Select(sets.Find)];
    }

    // The outer cycle encloses all others of its component, the other way round: its signed area is the least.
    private int NumberInnerCycles()
    {
        for (int c = 0; c < _cycles.Count; c++)
        {
            int component = _component[_cycles[c].Half >> 1];
            if (_outer[component] < 0 || _cycles[c].Area < _cycles[_outer[component]].Area)
            {
                _outer[component] = c;
            }
        }

        int faces = 1;
        for (int c = 0; c < _cycles.Count; c++)
        {
            if (_outer[_component[_cycles[c].Half >> 1]] != c)
            {
                _face[c] = faces++;
            }
        }

        return faces;
    }

    private void PlaceOuterCycles()
    {
        BoxIndex index = new([.. _map.Edges.Select(e => e.Curve.Bounds)]);
        int[] tallest = TallestEdges();
        Dictionary<int, int> parentCycle = []; // component to the cycle that looks at it
        List<int> near = [];
        foreach (int component in Enumerable.Range(0, _outer.Length).Where(c => _outer[c] >= 0))
        {
            parentCycle[component] = FacingCycle(component, tallest[component], index, near);
        }

        foreach (int component in parentCycle.Keys.Order())
        {
            // Up the chain of outer cycles until a face is known, then down again.
            Stack<int> chain = new();
            int face = 0;
            for (int cycle = _outer[component]; ;)
            {
                if (_face[cycle] >= 0)
                {
                    face = _face[cycle];
                    break;
                }

                chain.Push(cycle);
                int parent = parentCycle[_component[_cycles[cycle].Half >> 1]];
                if (parent < 0 || chain.Count > parentCycle.Count)
                {
                    break;
                }

                cycle = parent;
            }

            foreach (int cycle in chain)
            {
                _face[cycle] = face;
            }
        }
    }

    private int[] TallestEdges()
    {
        int[] tallest = new int[_map.Edges.Count];
        Array.Fill(tallest, -1);
        for (int e = 0; e < _map.Edges.Count; e++)
        {
            int c = _component[e];
            if (tallest[c] < 0 || _map.Edges[e].Curve.Bounds.Height > _map.Edges[tallest[c]].Curve.Bounds.Height)
            {
                tallest[c] = e;
            }
        }

        return tallest;
    }

    // Looks towards −y from where the component lies farthest that way on a general level; −1 when nothing is there.
    private int FacingCycle(int component, int tallest, BoxIndex index, List<int> near)
    {
        const double general = 0.41421356; // a share no drawing uses, so that the ray meets no corner
        Point from = _map.Edges[tallest].Curve.At(general);
        near.Clear();
        index.FindOverlaps(new Box(new Point(double.NegativeInfinity, from.Z), from), near);
        near.Sort();
        double far = 0;
        foreach (int e in near)
        {
            far = Math.Max(far, from.Y - _map.Edges[e].Curve.Bounds.Min.Y);
        }

        if (!(far > 0))
        {
            return -1;
        }

        Line ray = new(from, from - new Point(2 * far, 0));
        List<(double Y, int Cycle)> hits = [];
        double own = from.Y;
        foreach (int e in near)
        {
            Curve curve = _map.Edges[e].Curve;
            foreach ((double t, _) in CurveIntersection.Find(curve, ray, 1e-9 * far))
            {
                double y = curve.At(t).Y;
                if (_component[e] == component)
                {
                    own = Math.Min(own, y);
                }
                else
                {
                    hits.Add((y, _cycleOfHalf[(2 * e) + (curve.Derivative(t).Z < 0 ? 0 : 1)]));
                }
            }
        }

        return hits.Where(h => h.Y < own).DefaultIfEmpty((0, -1)).MaxBy(h => h.Item1).Item2;
    }
}
