using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Tests.Meshing;

/// <summary>
/// The model problem: a round nose (radius 3 mm) facing a round groove (radius 3.6 mm) in one iron frame with four coils.
/// Lengths are stated in millimetres and kept in metres.
/// </summary>
internal static class ProblemP
{
    public const int Iron = 1;
    public const int LowerRightCoil = 2;
    public const int UpperRightCoil = 3;
    public const int LowerLeftCoil = 4;
    public const int UpperLeftCoil = 5;

    public const double NoseRadius = 3e-3;
    public const double GrooveRadius = 3.6e-3;

    /// <summary>The beam's place, 1.2 nose radii above the nose's centre.</summary>
    public static Point Beam { get; } = Millimetres(0, 3.6);

    /// <summary>A box of 2 mm × 1 mm in which the beam flies; it clears the iron.</summary>
    public static Outline Aperture { get; } = Outline.Rectangle(Millimetres(0, 4.1), 2e-3, 1e-3);

    /// <summary>The section with the benchmark's far box, or with open surroundings.</summary>
    public static CrossSection Section(bool box = true)
    {
        SectionFixture s = new();
        int iron = s.Region("iron");
        if (box)
        {
            s.Rectangle(CrossSection.Air, CrossSection.Outside, Millimetres(-250, -246), Millimetres(250, 254));
        }

        s.Rectangle(iron, CrossSection.Air, Millimetres(-75, -66), Millimetres(75, 74));
        foreach (Curve c in Window())
        {
            s.Edge(c, CrossSection.Air, iron);
        }

        Coil(s, "coil lower right", 18, -38);
        Coil(s, "coil upper right", 18, 22);
        Coil(s, "coil lower left", -44, -38);
        Coil(s, "coil upper left", -44, 22);
        return s.Build();
    }

    private static void Coil(SectionFixture s, string name, double y, double z) =>
        s.Rectangle(s.Region(name), CrossSection.Air, Millimetres(y, z), Millimetres(y + 26, z + 24));

    // The air's outline inside the frame, counter-clockwise.
    private static IEnumerable<Curve> Window()
    {
        double t = 3 / Math.Sqrt(2);
        double groove = Math.Sqrt((3.6 * 3.6) - 9);
        double half = 3.6 * Math.Sin(Math.PI / 3);
        double land = groove + (3.6 * Math.Cos(Math.PI / 3));
        CircularArc nose = new CircularArc(default, NoseRadius, 0.75 * Math.PI, -0.5 * Math.PI)
            .WithEnds(Millimetres(-t, t), Millimetres(t, t));
        CircularArc hollow = new CircularArc(Millimetres(0, groove), GrooveRadius, Math.PI / 6, Math.PI * 2 / 3)
            .WithEnds(Millimetres(half, land), Millimetres(-half, land));
        return
        [
            .. Chain(
                Millimetres(-50, 49), Millimetres(-50, -41), Millimetres(-15, -41), Millimetres(-15, (2 * t) - 15), nose.Start),
            nose,
            .. Chain(
                nose.End, Millimetres(15, (2 * t) - 15), Millimetres(15, -41), Millimetres(50, -41), Millimetres(50, 49),
                Millimetres(15, 49), Millimetres(15, land + 10.5), Millimetres(4.5, land), hollow.Start),
            hollow,
            .. Chain(
                hollow.End, Millimetres(-4.5, land), Millimetres(-15, land + 10.5), Millimetres(-15, 49), Millimetres(-50, 49)),
        ];
    }

    private static IEnumerable<Line> Chain(params Point[] places) =>
        places.Zip(places.Skip(1), (a, b) => new Line(a, b));

    private static Point Millimetres(double y, double z) => new(1e-3 * y, 1e-3 * z);
}
