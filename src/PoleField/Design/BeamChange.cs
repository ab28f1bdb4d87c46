using System.Numerics;
using PoleField.Beam;
using PoleField.Geometry;

namespace PoleField.Design;

/// <summary>The chain rule from a changed field to the beam's numbers.</summary>
internal static class BeamChange
{
    /// <summary>Change of |B| at a place, T.</summary>
    public static double OfField(in BeamValues at, in BeamValues change) =>
        ((at.By * change.By) + (at.Bz * change.Bz)) / at.Field;

    /// <summary>Change of G = d|B|/dz at a place, T/m.</summary>
    public static double OfGradient(in BeamValues at, in BeamValues change) =>
        ((change.By * at.DByDz) + (change.Bz * at.DBzDz) + (at.By * change.DByDz) + (at.Bz * change.DBzDz)
            - (at.Gradient * OfField(at, change))) / at.Field;

    /// <summary>Change of a sum of terms Re(first·F′ + second·F″).</summary>
    /// <param name="terms">The sum.</param>
    /// <param name="change">Changed field by place.</param>
    public static double Of(IEnumerable<BeamTerm> terms, IReadOnlyDictionary<Point, BeamValues> change)
    {
        double sum = 0;
        foreach (BeamTerm t in terms)
        {
            BeamValues v = change[t.At];
            sum += (t.First * new Complex(-v.Bz, -v.By)).Real + (t.Second * new Complex(-v.DByDz, v.DBzDz)).Real;
        }

        return sum;
    }
}
