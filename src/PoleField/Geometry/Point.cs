namespace PoleField.Geometry;

/// <summary>A place or a displacement in the cross-section: y to the right, z up, the beam towards the viewer.</summary>
/// <param name="Y">Across the deflection, metres (in a <c>Sketch</c>: drawing units).</param>
/// <param name="Z">Along the deflection, metres (in a <c>Sketch</c>: drawing units).</param>
public readonly record struct Point(double Y, double Z)
{
    /// <summary>Distance from the origin, or length of the displacement.</summary>
    public double Length => Math.Sqrt((Y * Y) + (Z * Z));

    /// <summary>Square of <see cref="Length"/>.</summary>
    public double SquaredLength => (Y * Y) + (Z * Z);

    /// <summary>The displacement turned by +90 degrees (from +y towards +z).</summary>
    public Point Perpendicular => new(-Z, Y);

    /// <summary>True when both coordinates are finite numbers.</summary>
    public bool IsFinite => double.IsFinite(Y) && double.IsFinite(Z);

    /// <summary>Scalar product.</summary>
    public double Dot(Point other) => (Y * other.Y) + (Z * other.Z);

    /// <summary>Vector product's component along the beam: positive when <paramref name="other"/> lies counter-clockwise.</summary>
    public double Cross(Point other) => (Y * other.Z) - (Z * other.Y);

    /// <summary>Distance between two places.</summary>
    public double DistanceTo(Point other) => (this - other).Length;

    /// <summary>The displacement scaled to length one; not a number for a zero displacement.</summary>
    public Point Unit() => (1.0 / Length) * this;

    /// <summary>The place <paramref name="t"/> of the way (0 to 1) from <paramref name="a"/> to <paramref name="b"/>.</summary>
    public static Point Between(Point a, Point b, double t) => new(a.Y + (t * (b.Y - a.Y)), a.Z + (t * (b.Z - a.Z)));

    /// <summary>The displacement of the given length at an angle counted from +y towards +z, radians.</summary>
    public static Point Polar(double length, double angle) => new(length * Math.Cos(angle), length * Math.Sin(angle));

    /// <summary>Sum.</summary>
    public static Point operator +(Point a, Point b) => new(a.Y + b.Y, a.Z + b.Z);

    /// <summary>Difference.</summary>
    public static Point operator -(Point a, Point b) => new(a.Y - b.Y, a.Z - b.Z);

    /// <summary>Opposite displacement.</summary>
    public static Point operator -(Point a) => new(-a.Y, -a.Z);

    /// <summary>Scaled displacement.</summary>
    public static Point operator *(double factor, Point a) => new(factor * a.Y, factor * a.Z);

    /// <summary>The coordinates in parentheses, with all their digits.</summary>
    public override string ToString() => FormattableString.Invariant($"({Y}, {Z})");
}
