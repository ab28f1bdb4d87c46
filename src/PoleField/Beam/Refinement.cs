using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Beam;

/// <summary>Turns the elements' shares in the error into a finer size field.</summary>
internal sealed class Refinement
{
    private const double StrongestReduction = 0.25; // of an element's size in one go
    private const double StrongestCornerReduction = 0.05;
    private const double WeakestReduction = 0.8;    // smaller reductions are not worth a new mesh
    private const double OpenDiscShare = 0.1;       // of the tolerance for the second disc, which is cheap
    private const double StrongestOpenReduction = 0.4;
    private const double Safety = 0.8;              // of the tolerance, since the shares' signs are not counted on
    private const double CornerOrder = 4.0 / 3.0;   // decay of a corner's share, twice the exponent 2/3 of its potential
    private const double OrderBeyond = 1.0;         // decay of other shares beyond the order: cautious, for kinks of the material's law

    private readonly FiniteElementSpace _space;
    private readonly double _tolerance;
    private readonly double[] _share;   // of element e in the goal it matters most to, relative
    private readonly bool[] _isCorner;  // element e touches a corner of the iron

    /// <summary>Judges a solution's elements.</summary>
    /// <param name="estimate">The solution's errors.</param>
    /// <param name="accuracy">Relative error bar that field and gradient may have.</param>
    public Refinement(BeamEstimate estimate, double accuracy)
    {
        _space = estimate.Solution.Problem.Space;
        _tolerance = accuracy / (BeamEstimate.ErrorBarFactor * estimate.Caution);
        _share = new double[_space.ElementCount];
        _isCorner = new bool[_space.ElementCount];
        foreach (double[] goal in estimate.Shares.OfAll())
        {
            for (int e = 0; e < _share.Length; e++)
            {
                _share[e] = Math.Max(_share[e], Math.Abs(goal[e]));
            }
        }

        foreach (int e in estimate.CornerElements.SelectMany(c => c))
        {
            _isCorner[e] = true;
            _share[e] *= 1 + (BeamEstimate.CornerFactor / BeamEstimate.ErrorBarFactor);
        }
    }

    /// <summary>The size field for the next mesh.</summary>
    /// <param name="size">The last one.</param>
    public SizeField Next(SizeField size)
    {
        double allowed = Allowed(Safety * Math.Min(_tolerance, _share.Sum()));
        var sources = new List<(Point At, double Size)>();
        for (int e = 0; e < _share.Length; e++)
        {
            double order = _isCorner[e] ? CornerOrder : _space.Order + OrderBeyond;
            double reduction = Math.Pow(allowed / _share[e], 1 / order);
            if (_space.Mesh.Regions[e] == Mesh.Exterior || !(reduction < WeakestReduction))
            {
                continue;
            }

            ReadOnlySpan<int> nodes = _space.NodesOf(e);
            Point a = _space.Places[nodes[0]];
            Point b = _space.Places[nodes[1]];
            Point c = _space.Places[nodes[2]];
            double edge = Math.Sqrt((b - a).Cross(c - a) * 2 / Math.Sqrt(3.0));
            Point middle = (1.0 / 3) * (a + b + c);
            double strongest = _isCorner[e] ? StrongestCornerReduction : StrongestReduction;
            sources.Add((middle, Math.Max(reduction, strongest) * Math.Min(edge, size.At(middle))));
        }

        return size.With(sources);
    }

    /// <summary>Factor on the element size of the second disc, 1 or less.</summary>
    public double OfOpenDisc()
    {
        double outside = 0;
        for (int e = 0; e < _share.Length; e++)
        {
            outside += _space.Mesh.Regions[e] == Mesh.Exterior ? _share[e] : 0.0;
        }

        double reduction = Math.Pow(OpenDiscShare * _tolerance / outside, 1.0 / (2 * _space.Order));
        return reduction < 1 ? Math.Clamp(reduction, StrongestOpenReduction, WeakestReduction) : 1.0;
    }

    // The share that every element may keep so that the sum is the tolerance: elements below it keep theirs.
    private double Allowed(double tolerance)
    {
        double[] sorted = [.. _share.Order()];
        double below = 0;
        for (int i = 0; i < sorted.Length; i++)
        {
            double level = (tolerance - below) / (sorted.Length - i);
            if (level <= sorted[i])
            {
                return Math.Max(level, 0.01 * tolerance / sorted.Length);
            }

            below += sorted[i];
        }

        return double.PositiveInfinity;
    }
}
