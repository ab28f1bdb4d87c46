namespace PoleField.Geometry;

/// <summary>An upright rectangle that encloses something; <see cref="Empty"/> encloses nothing.</summary>
/// <param name="Min">Lower left corner.</param>
/// <param name="Max">Upper right corner.</param>
public readonly record struct Box(Point Min, Point Max)
{
    /// <summary>The box that encloses nothing; joined with anything it gives that thing's box.</summary>
    public static Box Empty { get; } = new(
        new Point(double.PositiveInfinity, double.PositiveInfinity),
        new Point(double.NegativeInfinity, double.NegativeInfinity));

    /// <summary>True when nothing is enclosed.</summary>
    public bool IsEmpty => !(Min.Y <= Max.Y && Min.Z <= Max.Z);

    /// <summary>Extent along y.</summary>
    public double Width => Max.Y - Min.Y;

    /// <summary>Extent along z.</summary>
    public double Height => Max.Z - Min.Z;

    /// <summary>Length of the diagonal: the scale of what is enclosed.</summary>
    public double Diagonal => (Max - Min).Length;

    /// <summary>Middle of the box.</summary>
    public Point Centre => Point.Between(Min, Max, 0.5);

    /// <summary>Smallest box around the given points.</summary>
    public static Box Around(params ReadOnlySpan<Point> points)
    {
        Box box = Empty;
        foreach (Point p in points)
        {
            box = box.Including(p);
        }

        return box;
    }

    /// <summary>Smallest box around this one and a point.</summary>
    public Box Including(Point p) => new(
        new Point(Math.Min(Min.Y, p.Y), Math.Min(Min.Z, p.Z)),
        new Point(Math.Max(Max.Y, p.Y), Math.Max(Max.Z, p.Z)));

    /// <summary>Smallest box around this one and another.</summary>
    public Box Including(Box other) => new(
        new Point(Math.Min(Min.Y, other.Min.Y), Math.Min(Min.Z, other.Min.Z)),
        new Point(Math.Max(Max.Y, other.Max.Y), Math.Max(Max.Z, other.Max.Z)));

    /// <summary>The box grown on all sides.</summary>
    public Box Inflated(double margin) => new(Min - new Point(margin, margin), Max + new Point(margin, margin));

    /// <summary>True when the point lies inside or on the edge.</summary>
    public bool Contains(Point p) => p.Y >= Min.Y && p.Y <= Max.Y && p.Z >= Min.Z && p.Z <= Max.Z;

    /// <summary>Distance from a point to the box, 0 inside it.</summary>
    public double DistanceTo(Point p) => new Point(
        Math.Max(0, Math.Max(Min.Y - p.Y, p.Y - Max.Y)),
        Math.Max(0, Math.Max(Min.Z - p.Z, p.Z - Max.Z))).Length;

    /// <summary>True when the two boxes share a point.</summary>
    public bool Overlaps(Box other) =>
        Min.Y <= other.Max.Y && other.Min.Y <= Max.Y && Min.Z <= other.Max.Z && other.Min.Z <= Max.Z;
}
