using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>The upright rectangle the beam fills, mm.</summary>
/// <param name="Width">Along y, &gt; 0.</param>
/// <param name="Height">Along z, &gt; 0.</param>
public sealed record BeamExtent(double Width = 3, double Height = 0.3)
{
    internal void Check(DimensionCheck check)
    {
        check.Positive("Beam width", Width);
        check.Positive("Beam height", Height);
    }

    internal Outline At(Point centre) => Outline.Rectangle(centre, Width, Height);
}
