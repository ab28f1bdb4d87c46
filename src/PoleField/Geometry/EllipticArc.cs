namespace PoleField.Geometry;

/// <summary>
/// A piece of an ellipse: centre + cos(u)·major + sin(u)·minor, the eccentric angle u running from
/// <see cref="StartAngle"/> over <see cref="Sweep"/>.
/// </summary>
public sealed record EllipticArc : Curve
{
    // Stub of the seam: the geometry developer completes it.

    /// <summary>Arc of an ellipse.</summary>
    /// <param name="centre">Centre.</param>
    /// <param name="major">Half axis vector at eccentric angle 0.</param>
    /// <param name="minorLength">Length of the other half axis, perpendicular to <paramref name="major"/>, counter-clockwise of it.</param>
    /// <param name="startAngle">Eccentric angle of the start, radians.</param>
    /// <param name="sweep">Signed eccentric angle travelled, radians, 0 &lt; |sweep| ≤ 2π.</param>
    public EllipticArc(Point centre, Point major, double minorLength, double startAngle, double sweep)
    {
        Centre = centre;
        Major = major;
        MinorLength = minorLength;
        StartAngle = startAngle;
        Sweep = sweep;
    }

    /// <summary>Centre of the ellipse.</summary>
    public Point Centre { get; }

    /// <summary>Half axis vector at eccentric angle 0.</summary>
    public Point Major { get; }

    /// <summary>Length of the half axis perpendicular to <see cref="Major"/>.</summary>
    public double MinorLength { get; }

    /// <summary>Eccentric angle of the start, radians.</summary>
    public double StartAngle { get; }

    /// <summary>Signed eccentric angle travelled, radians.</summary>
    public double Sweep { get; }

    /// <inheritdoc/>
    public override Point Start => throw new NotImplementedException();

    /// <inheritdoc/>
    public override Point End => throw new NotImplementedException();

    /// <inheritdoc/>
    public override double Length => throw new NotImplementedException();

    /// <inheritdoc/>
    public override Box Bounds => throw new NotImplementedException();

    /// <inheritdoc/>
    public override double AreaTerm(Point origin) => throw new NotImplementedException();

    /// <inheritdoc/>
    public override Point At(double t) => throw new NotImplementedException();

    /// <inheritdoc/>
    public override Point Derivative(double t) => throw new NotImplementedException();

    /// <inheritdoc/>
    public override Point SecondDerivative(double t) => throw new NotImplementedException();

    /// <inheritdoc/>
    public override Curve Reversed() => throw new NotImplementedException();

    /// <inheritdoc/>
    public override Curve Part(double from, double to) => throw new NotImplementedException();

    /// <inheritdoc/>
    public override Curve Transformed(Affine map) => throw new NotImplementedException();

    /// <inheritdoc/>
    public override double ClosestParameter(Point p) => throw new NotImplementedException();
}
