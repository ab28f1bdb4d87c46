// Truth: along an equipotential ∫B·dl vanishes (the wanted field integrated along the drawn face by Gauss quadrature); the field is
// current-free; hyperbolas (R − z)² − y² = constant; a face's radius of curvature at its apex is B/|G| there.
using System.Numerics;
using PoleField.Drawing;
using PoleField.Geometry;
using Xunit;

namespace PoleField.Tests.Drawing.Families;

public sealed class EquipotentialPairTests
{
    private const double R = 3;

    [Theory]
    [InlineData(1e-3)]
    [InlineData(1e-5)]
    public void FlatGradientFacesAreEquipotentials(double tolerance)
    {
        FlatGradientPair dimensions = new() { Tolerance = tolerance };
        Sketch sketch = dimensions.Draw().Sketch;

        AssertEquipotential(Face(sketch, "RIDGE"), s => FlatField(s), -dimensions.RidgeDistance, tolerance);
        AssertEquipotential(Face(sketch, "GROOVE"), s => FlatField(s), dimensions.GrooveDistance, tolerance);
    }

    [Theory]
    [InlineData(1e-3)]
    [InlineData(1e-5)]
    public void ShiftedQuadrupoleFacesAreHyperbolas(double tolerance)
    {
        ShiftedQuadrupolePair dimensions = new() { Tolerance = tolerance };
        Sketch sketch = dimensions.Draw().Sketch;

        foreach ((string layer, double apex) in new[] { ("RIDGE", -dimensions.RidgeDistance), ("GROOVE", dimensions.GrooveDistance) })
        {
            double half = R - apex;
            foreach (Point p in Face(sketch, layer).SelectMany(Samples))
            {
                // Distance to the hyperbola to first order: (value − constant)/|gradient of the value|.
                double value = ((R - p.Z) * (R - p.Z)) - (p.Y * p.Y) - (half * half);
                Assert.InRange(Math.Abs(value) / (2 * new Point(p.Y, R - p.Z).Length), 0, tolerance);
            }

            AssertEquipotential(Face(sketch, layer), s => 1 - (s / R), apex, tolerance);
        }
    }

    [Theory]
    [InlineData("flat-gradient")]
    [InlineData("shifted-quadrupole")]
    public void FacesAreSmoothAndFewArcs(string name)
    {
        Sketch sketch = PoleFamilies.Get(name).Draw().Sketch;

        foreach (string layer in new[] { "RIDGE", "GROOVE" })
        {
            List<Curve> face = Face(sketch, layer);
            Assert.InRange(face.Count, 4, 64);
            for (int i = 1; i < face.Count; i++)
            {
                Point before = face[i - 1].Derivative(1).Unit();
                Point after = face[i].Derivative(0).Unit();
                Assert.Equal(0, before.Cross(after), 1e-9);
                Assert.True(before.Dot(after) > 0);
            }
        }
    }

    [Theory]
    [InlineData(-0.8)]
    [InlineData(1.8)]
    public void ApexIsCurvedAsTheFieldFalls(double apex)
    {
        // κ = |∂ ln B/∂z| on the axis: (1 + t + t²/2)/R for the flat gradient, 1/(R − z) for the quadrupole.
        double t = apex / R;

        AssertApexRadius(new FlatGradientField(R), apex, R / (1 + t + (t * t / 2)));
        AssertApexRadius(new ShiftedQuadrupoleField(R), apex, R - apex);
    }

    [Fact]
    public void FlatGradientIsFlat()
    {
        // |B| and its gradient from the field itself, in units of B and B/R at the beam.
        static double Gradient(double z, double y) =>
            (FlatGradientField.Field(new Complex(z + 1e-5, y)).Magnitude - FlatGradientField.Field(new Complex(z - 1e-5, y)).Magnitude) / 2e-5;

        Assert.Equal(-1, Gradient(0, 0), 1e-9);

        // No first order along z, no second order along y: halving the step divides the change by 4 and by 16.
        double alongZ = (Gradient(0.1, 0) + Gradient(-0.1, 0) + 2) / (Gradient(0.05, 0) + Gradient(-0.05, 0) + 2);
        double slope = (Gradient(0.01, 0) - Gradient(-0.01, 0)) / 0.02;
        double alongY = (Gradient(0, 0.2) + 1) / (Gradient(0, 0.1) + 1);
        Assert.Equal(0, slope, 1e-3);
        Assert.Equal(4, alongZ, 0.2);
        Assert.Equal(16, alongY, 1.6);
    }

    [Fact]
    public void PotentialIsTheIntegralOfTheField()
    {
        foreach (Complex t in new Complex[] { new(0.6, 0), new(-0.9, 1.6), new(0.3, -1.2), new(1.5, 1.7) })
        {
            Complex integral = Line(s => FlatGradientField.Field(s), Complex.Zero, t);
            Assert.Equal(0, (FlatGradientField.Potential(t) - integral).Magnitude, 1e-12);
        }
    }

    [Fact]
    public void AmpereTurnsAreThePotentialDifference()
    {
        ShiftedQuadrupolePair quadrupole = new();
        FlatGradientPair flat = new();

        // Quadrupole: NI = B/(2 R μ0) ((R + g1)² − (R − g2)²), here for 1 T, lengths in metres.
        double expected = ((3.8 * 3.8) - (1.2 * 1.2)) * 1e-3 / (2 * R * PhysicalConstants.Mu0);
        double integral = 1e-3 * R * Line(s => FlatGradientField.Field(s), -flat.RidgeDistance / R, flat.GrooveDistance / R).Real;

        Assert.Equal(1, quadrupole.Draw().AmpereTurnsFor(1) / expected, 1e-12);
        Assert.Equal(1, flat.Draw().AmpereTurnsFor(1) * PhysicalConstants.Mu0 / integral, 1e-12);
        Assert.Equal(-1 / (1e-3 * R), flat.Draw().GradientPerField, 1e-9);
    }

    [Fact]
    public void EveryWrongDimensionIsNamedAtOnce()
    {
        FlatGradientPair wrong = new() { RidgeDistance = 3.5, GrooveDistance = 9, RidgeReach = 8, LandEdge = 1, Tolerance = 1 };

        Assert.Equal(5, Assert.Throws<InputException>(wrong.Draw).Findings.Count);
        Assert.Throws<InputException>((new ShiftedQuadrupolePair() with { GrooveDistance = 3 }).Draw);
        Assert.Throws<InputException>((new ShiftedQuadrupolePair() with { Beam = new BeamExtent(3, 2) }).Draw);
    }

    // The face alone: everything between the two ends of the flanks is arcs or short lines near the axis.
    private static List<Curve> Face(Sketch sketch, string layer)
    {
        double reach = layer == "RIDGE" ? new FlatGradientPair().RidgeReach : new FlatGradientPair().GrooveReach;
        return [.. FamilyAssert.Outlines(sketch, layer)[0].Curves.Where(c => Math.Abs(c.Start.Y) <= reach && Math.Abs(c.End.Y) <= reach)];
    }

    private static IEnumerable<Point> Samples(Curve c) => Enumerable.Range(0, 11).Select(i => c.At(i / 10.0));

    private static Complex FlatField(Complex s)
    {
        Complex t = s / R;
        return Complex.Exp(-(t + (t * t / 2) + (t * t * t / 6)));
    }

    private static void AssertEquipotential(List<Curve> face, Func<Complex, Complex> field, double apex, double tolerance)
    {
        double reference = Line(field, 0, apex).Real;
        double worst = 0;
        foreach (Point p in face.SelectMany(Samples))
        {
            Complex s = new(p.Z, p.Y);
            worst = Math.Max(worst, Math.Abs(Line(field, 0, s).Real - reference) / field(s).Magnitude);
        }

        // Not only within the tolerance: the arcs are as few as it allows.
        Assert.InRange(worst, tolerance / 50, tolerance);
    }

    private static void AssertApexRadius(WantedField field, double apex, double radius)
    {
        // Slope near the apex: dz/dy = −y/radius.
        const double y = 1e-5;
        FacePoint p = field.Equipotential(apex, 1)(y);
        Assert.Equal(1, -(p.Tangent.Z / p.Tangent.Y) * radius / y, 1e-6);
        Assert.Equal(apex, p.Place.Z, 1e-9);
    }

    // ∫ f ds along a straight line, 16 pieces of five-point Gauss quadrature.
    private static Complex Line(Func<Complex, Complex> f, Complex from, Complex to)
    {
        (double, double)[] rule =
        [
            (0, 128.0 / 225), (Math.Sqrt(5 - (2 * Math.Sqrt(10.0 / 7))) / 3, (322 + (13 * Math.Sqrt(70))) / 900),
            (Math.Sqrt(5 + (2 * Math.Sqrt(10.0 / 7))) / 3, (322 - (13 * Math.Sqrt(70))) / 900),
        ];
        const int pieces = 16;
        Complex step = (to - from) / pieces;
        Complex sum = 0;
        for (int i = 0; i < pieces; i++)
        {
            Complex middle = from + ((i + 0.5) * step);
            foreach ((double x, double w) in rule)
            {
                sum += x == 0 ? w * f(middle) : w * (f(middle + (0.5 * x * step)) + f(middle - (0.5 * x * step)));
            }
        }

        return 0.5 * step * sum;
    }
}
