using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Tells which face each closed walk bounds: outer walks of connected pieces bound the face those pieces lie in.</summary>
internal sealed class FaceNesting
{
    private readonly PlanarMap _map;
    private readonly List<PlanarMap.Cycle> _cycles;
    private readonly Box[] _bounds;     // of each edge
    private readonly double _left;      // where everything ends towards −y
    private readonly int[] _cycleOfHalf;
    private readonly int[] _component;  // of each edge
    private readonly int[] _outer;      // outer cycle of each component (indexed by its first edge), −1 elsewhere
    private readonly int[] _face;       // of each cycle, −1 while unknown

    private FaceNesting(PlanarMap map, List<PlanarMap.Cycle> cycles)
    {
        (_map, _cycles) = (map, cycles);
        _bounds = [.. map.Edges.Select(e => e.Curve.Bounds)];
        _left = _bounds.Select(b => b.Min.Y).DefaultIfEmpty().Min();
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
            foreach (int v in (ReadOnlySpan<int>)[map.Edges[e].Start, map.Edges[e].End])
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
        BoxTree index = new(_bounds);
        int[] order = [.. Enumerable.Range(0, _component.Length)];
        Array.Sort([.. _component], order);
        Dictionary<int, int> parentCycle = []; // component to the cycle that looks at it
        for (int from = 0, to; from < order.Length; from = to)
        {
            for (to = from + 1; to < order.Length && _component[order[to]] == _component[order[from]]; to++)
            {
            }

            parentCycle[_component[order[from]]] = FacingCycle(order.AsSpan(from, to - from), index);
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

    // Looks towards −y from where the component lies farthest that way on a general level; −1 when nothing is there.
    private int FacingCycle(ReadOnlySpan<int> edges, BoxTree index)
    {
        const double general = 0.41421356; // a share no drawing uses, so that the ray meets no corner
        int tallest = edges[0];
        foreach (int e in edges)
        {
            double height = _bounds[e].Height, most = _bounds[tallest].Height;
            tallest = height > most || (height == most && e < tallest) ? e : tallest;
        }

        Point from = _map.Edges[tallest].Curve.At(general);
        double far = from.Y - _left;
        if (!(far > 0))
        {
            return -1;
        }

        Line ray = new(from, from - new Point(2 * far, 0));
        double own = from.Y;
        foreach (int e in edges)
        {
            if (_bounds[e].Min.Z <= from.Z && from.Z <= _bounds[e].Max.Z && _bounds[e].Min.Y < own)
            {
                Hits(e, ray).ForEach(h => own = Math.Min(own, h.Y));
            }
        }

        (double Y, int Cycle) nearest = (double.NegativeInfinity, -1);
        foreach (int e in index.TowardsLeft(new Point(own, from.Z)))
        {
            if (_bounds[e].Max.Y < nearest.Y)
            {
                break;
            }

            if (_component[e] != _component[tallest])
            {
                Hits(e, ray).ForEach(h => nearest = h.Y < own && h.Y > nearest.Y ? h : nearest);
            }
        }

        return nearest.Cycle;
    }

    // Where a ray towards −y meets an edge, with the cycle that looks back at it from there.
    private List<(double Y, int Cycle)> Hits(int edge, Line ray)
    {
        Curve curve = _map.Edges[edge].Curve;
        return CurveIntersection.Find(curve, ray, 1e-9 * ray.Length)
            .ConvertAll(hit => (curve.At(hit.OnFirst).Y, _cycleOfHalf[(2 * edge) + (curve.Derivative(hit.OnFirst).Z < 0 ? 0 : 1)]));
    }
}
