namespace PoleField.Geometry;

/// <summary>
/// A smooth piece of outline, travelled from parameter 0 to 1. Curves stay exact from the drawing to the nodes of the
/// mesh: nose and groove radii carry the physics.
/// </summary>
/// <remarks>
/// Every instance is regular: finite, of positive length, with a derivative that vanishes nowhere inside. A curve may be
/// closed (a full circle: <see cref="Start"/> equals <see cref="End"/>). Instances are immutable.
/// </remarks>
public abstract record Curve
{
    /// <summary>Place at parameter 0.</summary>
    public abstract Point Start { get; }

    /// <summary>Place at parameter 1.</summary>
    public abstract Point End { get; }

    /// <summary>Arc length.</summary>
    public abstract double Length { get; }

    /// <summary>Smallest upright box around the curve (exact, not of control points).</summary>
    public abstract Box Bounds { get; }

    /// <summary>
    /// The curve's share ½∫(y dz − z dy) of an outline's area by Green's theorem, taken about <paramref name="origin"/>
    /// so that drawings far from zero lose no digits.
    /// </summary>
    public abstract double AreaTerm(Point origin);

    /// <summary>Place at parameter <paramref name="t"/> in [0, 1]; exactly <see cref="Start"/> and <see cref="End"/> at the ends.</summary>
    public abstract Point At(double t);

    /// <summary>Derivative of the place by the parameter.</summary>
    public abstract Point Derivative(double t);

    /// <summary>Second derivative of the place by the parameter.</summary>
    public abstract Point SecondDerivative(double t);

    /// <summary>The same points travelled the other way.</summary>
    public abstract Curve Reversed();

    /// <summary>The piece between two parameters, 0 ≤ <paramref name="from"/> &lt; <paramref name="to"/> ≤ 1.</summary>
    public abstract Curve Part(double from, double to);

    /// <summary>Image under an affine map (the result may be of another kind: a sheared arc is an elliptic arc).</summary>
    public abstract Curve Transformed(Affine map);

    /// <summary>Parameter of the curve's nearest point to <paramref name="p"/>.</summary>
    public abstract double ClosestParameter(Point p);

    /// <summary>Signed curvature, 1/length: positive where the curve turns to its left.</summary>
    public double CurvatureAt(double t)
    {
        Point d = Derivative(t);
        double speed = d.Length;
        return d.Cross(SecondDerivative(t)) / (speed * speed * speed);
    }

    /// <summary>Distance from a point to the nearest point of the curve.</summary>
    public double DistanceTo(Point p) => p.DistanceTo(At(ClosestParameter(p)));
}
