using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Output.Figures;

namespace PoleField.Tests.Output;

/// <summary>
/// Two round conductors along x with opposite, evenly spread currents: outside them the field is that of two line currents,
/// |B| = μ0 I a/(π r1 r2); inside one its own field grows in proportion to the distance from its middle. Parts of
/// permeability one lie around them so that pictures have something to name.
/// </summary>
internal static class TwoConductorScene
{
    public const double HalfSpacing = 6e-3;
    public const double Radius = 2e-3;
    public const double Current = 30e3;

    private const double Mu0 = 4e-7 * Math.PI;

    public static Aperture Aperture { get; } = Aperture.Rectangle(new Point(0, 5.2e-3), 3e-3, 0.6e-3);

    /// <summary>A, By, Bz in closed form.</summary>
    public static (double A, double By, double Bz) Field(Point p)
    {
        (double a1, Point b1) = Conductor(p - new Point(-HalfSpacing, 0), -Current);
        (double a2, Point b2) = Conductor(p - new Point(HalfSpacing, 0), Current);
        return (a1 + a2, b1.Y + b2.Y, b1.Z + b2.Z);
    }

    /// <summary>Values and derivatives outside the conductors in closed form.</summary>
    public static BeamValues At(Point p)
    {
        (_, double by, double bz) = Field(p);
        return new BeamValues(p, by, bz, Derivative(p, 0), Derivative(p, 1));
    }

    public static FieldScene Scene(int cells = 200)
    {
        CrossSection section = Section();
        return new FieldScene
        {
            Section = section,
            Triangles = Triangles(section, cells),
            AmpereTurns = [.. section.Parts.Select(n => n == "COIL LEFT" ? -Current : n == "COIL RIGHT" ? Current : 0)],
            IsIron = [.. section.Parts.Select(n => !n.StartsWith("COIL", StringComparison.Ordinal))],
            Aperture = Aperture,
            Caption = "Two round conductors with opposite currents of 30 kA.",
        };
    }

    public static CrossSection Section()
    {
        SectionMaker maker = new();
        int yoke = maker.Region("YOKE", Box.Around(new Point(-18e-3, -12e-3), new Point(18e-3, 16e-3)));
        int ridge = maker.Region("RIDGE", Box.Around(new Point(-2.5e-3, -8e-3), new Point(2.5e-3, 4e-3)));
        int groove = maker.Region("GROOVE", Box.Around(new Point(-8e-3, 5.5e-3), new Point(8e-3, 12e-3)));
        int left = maker.Region("COIL LEFT", Box.Around(new Point(-8e-3, -2e-3), new Point(-4e-3, 2e-3)));
        int right = maker.Region("COIL RIGHT", Box.Around(new Point(4e-3, -2e-3), new Point(8e-3, 2e-3)));
        maker.Polygon(yoke, CrossSection.Air, (-18, -12), (18, -12), (18, 16), (-18, 16));
        maker.Polygon(CrossSection.Air, yoke, (-14, -8), (14, -8), (14, 12), (-14, 12));
        maker.Chain(ridge, new Line(Mm(-2.5, -8), Mm(2.5, -8)), new Line(Mm(2.5, -8), Mm(2.5, 1.5)), CircularArc.FromBulge(Mm(2.5, 1.5), Mm(-2.5, 1.5), 1), new Line(Mm(-2.5, 1.5), Mm(-2.5, -8)));
        maker.Chain(groove, new Line(Mm(-8, 5.5), Mm(-3.4, 5.5)), CircularArc.FromBulge(Mm(-3.4, 5.5), Mm(3.4, 5.5), -0.6), new Line(Mm(3.4, 5.5), Mm(8, 5.5)), new Line(Mm(8, 5.5), Mm(8, 12)), new Line(Mm(8, 12), Mm(-8, 12)), new Line(Mm(-8, 12), Mm(-8, 5.5)));
        maker.Chain(left, new CircularArc(new Point(-HalfSpacing, 0), Radius, 0, Math.Tau));
        maker.Chain(right, new CircularArc(new Point(HalfSpacing, 0), Radius, 0, Math.Tau));
        return maker.Finish();
    }

    public static IReadOnlyList<FieldTriangle> Triangles(CrossSection section, int cells)
    {
        Box box = section.Bounds.Inflated(6e-3);
        List<FieldTriangle> triangles = [];
        for (int i = 0; i < cells; i++)
        {
            for (int j = 0; j < cells; j++)
            {
                Point a = Grid(i, j), b = Grid(i + 1, j), c = Grid(i + 1, j + 1), d = Grid(i, j + 1);
                triangles.Add(Triangle(a, b, c));
                triangles.Add(Triangle(a, c, d));
            }
        }

        return triangles;

        Point Grid(int i, int j) => box.Min + new Point(box.Width * i / cells, box.Height * j / cells);
    }

    private static FieldTriangle Triangle(Point a, Point b, Point c)
    {
        int region = RegionAt((1 / 3.0) * (a + b + c));
        return new FieldTriangle(a, b, c, Sample(a, region), Sample(b, region), Sample(c, region), region);
    }

    private static FieldSample Sample(Point p, int region)
    {
        (double potential, double by, double bz) = Field(p);
        return new FieldSample(potential, by, bz, Math.Sqrt((by * by) + (bz * bz)) / Mu0, region);
    }

    private static int RegionAt(Point p)
    {
        (double y, double z) = (1e3 * p.Y, 1e3 * p.Z);
        bool inYoke = Math.Abs(y) < 18 && z > -12 && z < 16 && !(Math.Abs(y) < 14 && z > -8 && z < 12);
        bool inRidge = Math.Abs(y) < 2.5 && z > -8 && (z < 1.5 || Math.Sqrt((y * y) + ((z - 1.5) * (z - 1.5))) < 2.5);
        double rise = 2 * 3.4 / (4 * 0.6) * (1 + 0.36); // radius of the groove's arc from its bulge
        double centre = 5.5 + (0.6 * 3.4) - rise;
        bool inArc = Math.Sqrt((y * y) + ((z - centre) * (z - centre))) < rise && z > 5.5;
        bool inGroove = Math.Abs(y) < 8 && z > 5.5 && z < 12 && !inArc;
        bool left = p.DistanceTo(new Point(-HalfSpacing, 0)) < Radius;
        bool right = p.DistanceTo(new Point(HalfSpacing, 0)) < Radius;
        return inYoke ? 1 : inRidge ? 2 : inGroove ? 3 : left ? 4 : right ? 5 : CrossSection.Air;
    }

    private static (double A, Point B) Conductor(Point fromMiddle, double current)
    {
        double r = fromMiddle.Length;
        double k = Mu0 * current / (2 * Math.PI);
        double a = r > Radius ? -k * Math.Log(r / Radius) : 0.5 * k * (1 - (r * r / (Radius * Radius)));
        double slopeOverR = -k / Math.Max(r * r, Radius * Radius);
        return (a, new Point(slopeOverR * fromMiddle.Z, -slopeOverR * fromMiddle.Y));
    }

    private static double Derivative(Point p, int component)
    {
        // Exact derivative by z of the line currents' field: d/dz of z/r² and of y/r².
        double sum = 0;
        foreach ((double place, double current) in new[] { (-HalfSpacing, -Current), (HalfSpacing, Current) })
        {
            Point d = p - new Point(place, 0);
            double k = Mu0 * current / (2 * Math.PI);
            double r4 = d.SquaredLength * d.SquaredLength;
            sum += component == 0
                ? -k * ((d.Y * d.Y) - (d.Z * d.Z)) / r4
                : -k * 2 * d.Y * d.Z / r4;
        }

        return sum;
    }

    private static Point Mm(double y, double z) => new(1e-3 * y, 1e-3 * z);

    private sealed class SectionMaker
    {
        private readonly List<Point> _vertices = [];
        private readonly List<SectionEdge> _edges = [];
        private readonly List<string> _parts = [];
        private readonly List<Region> _regions = [new Region(-1, double.PositiveInfinity, Box.Empty)];

        public int Region(string part, Box bounds)
        {
            _parts.Add(part);
            _regions.Add(new Region(_parts.Count - 1, bounds.Width * bounds.Height, bounds));
            return _regions.Count - 1;
        }

        public void Polygon(int inside, int outside, params (double Y, double Z)[] corners)
        {
            Point[] p = [.. corners.Select(c => Mm(c.Y, c.Z))];
            Add(inside, outside, [.. p.Select((a, i) => new Line(a, p[(i + 1) % p.Length]))]);
        }

        public void Chain(int inside, params Curve[] curves) => Add(inside, CrossSection.Air, curves);

        public CrossSection Finish() => new(_vertices, _edges, _regions, _parts, hasRim: false);

        private void Add(int inside, int outside, Curve[] curves)
        {
            int first = _vertices.Count;
            _vertices.AddRange(curves.Select(c => c.Start));
            for (int i = 0; i < curves.Length; i++)
            {
                _edges.Add(new SectionEdge(first + i, first + ((i + 1) % curves.Length), curves[i], inside, outside));
            }
        }
    }
}
