using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>How to mesh.</summary>
public sealed record MeshOptions
{
    /// <summary>Smallest angle to reach away from sharp input corners, degrees, at most 30.</summary>
    public double SmallestAngleDegrees { get; init; } = 26;

    /// <summary>Largest turn of a curve along one mesh edge, degrees.</summary>
    public double LargestTurnDegrees { get; init; } = 20;

    /// <summary>Radius of the open circle over that of the smallest circle around the section, more than 1.02.</summary>
    public double OpenCircleRatio { get; init; } = 1.15;

    /// <summary>Edge length in the disc that stands for open space and on its rim, over its radius, at most 0.5.</summary>
    public double OpenDiscSize { get; init; } = 0.3;

    /// <summary>Most triangles before giving up.</summary>
    public int MostTriangles { get; init; } = 5_000_000;
}

/// <summary>Constrained Delaunay triangulation with quality refinement over a section bounded by curves.</summary>
public static class Mesher
{
    /// <summary>Meshes the section.</summary>
    /// <exception cref="MeshingException">The section cannot be meshed, with the place.</exception>
    /// <exception cref="ArgumentOutOfRangeException">An option is out of its range.</exception>
    /// <exception cref="OperationCanceledException">The work was cancelled.</exception>
    public static Mesh Mesh(CrossSection section, SizeField size, MeshOptions? options = null, CancellationToken cancellation = default)
    {
        options ??= new MeshOptions();
        Check(options);
        OpenCircle? circle = section.HasRim ? null : CircleAround(section, options.OpenCircleRatio);
        (List<Point> corners, List<BoundaryCurve> curves) = Boundary(section, circle);
        Corners.Classify(curves);
        Func<Point, double> wanted = circle is null
            ? size.At
            : p => Math.Min(size.At(p), options.OpenDiscSize * circle.Radius);
        double turn = options.LargestTurnDegrees * Math.PI / 180;
        List<(int Curve, double From, double To)> cuts = Polygonisation.Cut(curves, wanted, turn, cancellation);
        PlanarMesh inside = PlanarMesh.Start(corners, curves, cuts, []);
        RefinementLimits limits = new(options.SmallestAngleDegrees, options.MostTriangles, PiecesFixed: false);
        Refinement refinement = Refinement.Of(inside, size, limits);
        refinement.Run(cancellation);
        PlanarMesh? disc = circle is null ? null : OpenDisc.Fill(circle, options.OpenDiscSize * circle.Radius, inside, refinement, limits, cancellation);
        return MeshAssembly.Join(section, inside, circle, disc);
    }

    private static void Check(MeshOptions o)
    {
        Require(o.SmallestAngleDegrees is >= 0 and <= 30, o.SmallestAngleDegrees, "smallest angle of 0 to 30 degrees");
        Require(o.LargestTurnDegrees is > 0 and <= 45, o.LargestTurnDegrees, "largest turn above 0, up to 45 degrees");
        Require(o.OpenCircleRatio is >= 1.02 and <= 100, o.OpenCircleRatio, "ratio of the open circle of 1.02 to 100");
        Require(o.OpenDiscSize is > 0 and <= 0.5, o.OpenDiscSize, "size in the open disc above 0, up to 0.5 of its radius");
        Require(o.MostTriangles > 0, o.MostTriangles, "limit of at least one triangle");
    }

    private static void Require(bool holds, double value, string allowed)
    {
        if (!holds)
        {
            throw new ArgumentOutOfRangeException(
                nameof(value), FormattableString.Invariant($"Meshing needs a {allowed}; got {value}."));
        }
    }

    private static OpenCircle CircleAround(CrossSection section, double ratio)
    {
        const int samples = 32;
        List<Point> places = [];
        foreach (SectionEdge e in section.Edges)
        {
            int pieces = e.Curve is Line ? 1 : samples;
            for (int i = 0; i <= pieces; i++)
            {
                places.Add(e.Curve.At((double)i / pieces));
            }
        }

        OpenCircle smallest = SmallestCircle.Around(places);
        return new OpenCircle(smallest.Centre, ratio * smallest.Radius);
    }

    private static (List<Point> Corners, List<BoundaryCurve> Curves) Boundary(CrossSection section, OpenCircle? circle)
    {
        List<Point> corners = [.. section.Vertices];
        List<BoundaryCurve> curves = new(section.Edges.Count + 1);
        for (int i = 0; i < section.Edges.Count; i++)
        {
            SectionEdge e = section.Edges[i];
            curves.Add(new BoundaryCurve(e.Curve, i, e.Start, e.End, e.Left, e.Right));
        }

        if (circle is not null)
        {
            CircularArc rim = new(circle.Centre, circle.Radius, 0, Math.Tau);
            curves.Add(new BoundaryCurve(rim, -1, corners.Count, corners.Count, CrossSection.Air, CrossSection.Outside));
            corners.Add(rim.Start);
        }

        return (corners, curves);
    }
}

/// <summary>A section could not be meshed.</summary>
public sealed class MeshingException(string message, Point at) : Exception(message)
{
    /// <summary>Where, metres.</summary>
    public Point At { get; } = at;
}
