// Truth: helpers only; the checks they serve state theirs.
using PoleField.Drawing;
using PoleField.Geometry;
using Xunit;

namespace PoleField.Tests.Drawing.Families;

internal static class FamilyAssert
{
    public static IEnumerable<CircularArc> Arcs(Sketch sketch, string layer) =>
        sketch.Curves.Where(c => c.Layer == layer).Select(c => c.Curve).OfType<CircularArc>();

    /// <summary>Closed chains of a layer; fails where a curve does not start bitwise where the one before ended.</summary>
    public static IReadOnlyList<Outline> Outlines(Sketch sketch, string layer)
    {
        List<Outline> outlines = [];
        List<Curve> chain = [];
        foreach (Curve curve in sketch.Curves.Where(c => c.Layer == layer).Select(c => c.Curve))
        {
            if (chain.Count > 0)
            {
                Assert.True(chain[^1].End == curve.Start, FormattableString.Invariant($"{layer}: gap at ({curve.Start.Y}, {curve.Start.Z})."));
            }

            chain.Add(curve);
            if (curve.End == chain[0].Start)
            {
                outlines.Add(Outline.FromCurves(chain));
                chain = [];
            }
        }

        Assert.Empty(chain);
        return outlines;
    }

    public static void HasCorners(Sketch sketch, string layer, params (double Y, double Z)[] corners)
    {
        foreach ((double y, double z) in corners)
        {
            Assert.True(
                sketch.Curves.Any(c => c.Layer == layer && c.Curve.Start.DistanceTo(new Point(y, z)) < 1e-12),
                FormattableString.Invariant($"{layer} has no corner at ({y}, {z})."));
        }
    }
}
