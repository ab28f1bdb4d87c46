namespace PoleField.Geometry;

/// <summary>An affine map of the plane: p → (YY·y + YZ·z + Y0, ZY·y + ZZ·z + Z0).</summary>
public readonly record struct Affine(double YY, double YZ, double ZY, double ZZ, double Y0, double Z0)
{
    /// <summary>The map that moves nothing.</summary>
    public static Affine Identity { get; } = new(1, 0, 0, 1, 0, 0);

    /// <summary>Mirror image in the z axis (y → −y).</summary>
    public static Affine MirrorInZAxis { get; } = new(-1, 0, 0, 1, 0, 0);

    /// <summary>Determinant: the factor by which areas change, negative for mirror images.</summary>
    public double Determinant => (YY * ZZ) - (YZ * ZY);

    /// <summary>Uniform scaling about the origin.</summary>
    public static Affine Scaling(double factor) => new(factor, 0, 0, factor, 0, 0);

    /// <summary>Shift.</summary>
    public static Affine Shift(Point by) => new(1, 0, 0, 1, by.Y, by.Z);

    /// <summary>Turn about a point by an angle from +y towards +z, radians.</summary>
    public static Affine Turn(Point about, double angle)
    {
        (double s, double c) = Math.SinCos(angle);
        return new Affine(c, -s, s, c, about.Y - (c * about.Y) + (s * about.Z), about.Z - (s * about.Y) - (c * about.Z));
    }

    /// <summary>Image of a place.</summary>
    public Point Apply(Point p) => new((YY * p.Y) + (YZ * p.Z) + Y0, (ZY * p.Y) + (ZZ * p.Z) + Z0);

    /// <summary>Image of a displacement.</summary>
    public Point ApplyToDisplacement(Point p) => new((YY * p.Y) + (YZ * p.Z), (ZY * p.Y) + (ZZ * p.Z));

    /// <summary>The map that applies <paramref name="first"/>, then this one.</summary>
    public Affine After(Affine first)
    {
        Point origin = Apply(new Point(first.Y0, first.Z0));
        return new Affine(
            (YY * first.YY) + (YZ * first.ZY),
            (YY * first.YZ) + (YZ * first.ZZ),
            (ZY * first.YY) + (ZZ * first.ZY),
            (ZY * first.YZ) + (ZZ * first.ZZ),
            origin.Y,
            origin.Z);
    }

    /// <summary>True when lengths change by one common factor in all directions (circles stay circles).</summary>
    public bool IsSimilarity
    {
        get
        {
            double scale = Math.Max(Math.Abs(YY) + Math.Abs(ZY), Math.Abs(YZ) + Math.Abs(ZZ));
            double tolerance = 1e-12 * scale;
            bool direct = Math.Abs(YY - ZZ) <= tolerance && Math.Abs(YZ + ZY) <= tolerance;
            bool mirrored = Math.Abs(YY + ZZ) <= tolerance && Math.Abs(YZ - ZY) <= tolerance;
            return direct || mirrored;
        }
    }
}
