using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>
/// Wanted edge length at every place: near each source its size, growing with distance at the field's rate, never above
/// the ceiling. Evaluation must cost O(log n) in the number of sources.
/// </summary>
public sealed class SizeField
{
    /// <summary>Largest edge length anywhere, metres.</summary>
    public double Ceiling => throw new NotImplementedException("seam");

    /// <summary>Growth of edge length per length of distance from a source; 0.35 is usual.</summary>
    public double Growth => throw new NotImplementedException("seam");

    /// <summary>A field with the given ceiling and growth and these sources (place, size in metres).</summary>
    public static SizeField FromSources(
        double ceiling, double growth, IReadOnlyList<(Point At, double Size)> sources) => throw new NotImplementedException("seam");

    /// <summary>This field and further sources (used by adaptive refinement).</summary>
    public SizeField With(IReadOnlyList<(Point At, double Size)> sources) => throw new NotImplementedException("seam");

    /// <summary>Wanted edge length at a place, metres.</summary>
    public double At(Point p) => throw new NotImplementedException("seam");
}
