// Truth: closed form of two opposite line currents (Biot and Savart), written independently in Verification/TwoWires; the
// tabulated k of the mid-plane; bare round conductors, whose outside field is exactly that of wires (Ampère's law).
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Materials;
using PoleField.Tests.Verification;
using Xunit;

namespace PoleField.Tests.Beam;

public sealed class TwoWireFitTests
{
    private const double A = 0.003;

    [Fact]
    public void TheAnalyticFieldIsThatOfTwoWires()
    {
        var wires = new TwoWireField(A, new Point(0.0002, -0.0004), 5000);
        var truth = new TwoWires(A, 5000);
        foreach (Point p in new[] { new Point(0, 0.0036), new Point(0.0012, 0.0031), new Point(-0.002, 0.005) })
        {
            BeamValues v = wires.At(p);
            Point shifted = p - wires.Midpoint;
            Point exact = truth.Field(shifted);
            Assert.Equal(exact.Y, v.By, 1e-12);
            Assert.Equal(exact.Z, v.Bz, 1e-12);
            Assert.Equal(truth.Gradient(shifted), v.Gradient, 1e-9 * Math.Abs(v.Gradient));
        }
    }

    // Columns z/a and k of the closed form's table.
    [Theory]
    [InlineData(1.0, 1.000000)]
    [InlineData(1.2, 0.983607)]
    [InlineData(1.3, 0.966543)]
    [InlineData(2.0, 0.800000)]
    public void TheShapeFactorIsTheTabulatedOne(double height, double k) =>
        Assert.Equal(k, new TwoWireField(A, default, -1000).ShapeFactor(new Point(0, height * A)), 1e-6);

    [Theory]
    [InlineData(0.003, 0.0, 0.0, 10_000)]
    [InlineData(0.0024, 0.0003, -0.0005, -3000)]
    [InlineData(0.006, -0.001, 0.001, 800)]
    public void ExactWiresAreFoundWhereverTheyAre(double a, double y, double z, double current)
    {
        var truth = new TwoWireField(a, new Point(y, z), current);

        TwoWireComparison found = TwoWireComparison.Of(Ribbon, truth.At, new StatedWires());

        Assert.Equal(a, found.Wires.HalfSpacing, 1e-9 * a);
        Assert.Equal(current, found.Wires.Current, 1e-9 * Math.Abs(current));
        Assert.InRange(found.Wires.Midpoint.DistanceTo(new Point(y, z)), 0, 1e-9 * a);
        Assert.InRange(found.Gradient.Max, 0, 1e-10);
    }

    [Fact]
    public void WhatIsStatedStays()
    {
        var truth = new TwoWireField(A, new Point(0, 0.0001), 5000);

        TwoWireComparison spacing = TwoWireComparison.Of(Ribbon, truth.At, new StatedWires(0.0031));
        TwoWireComparison both = TwoWireComparison.Of(Ribbon, truth.At, new StatedWires(A, new Point(0, 0.0001)));

        Assert.Equal(0.0031, spacing.Wires.HalfSpacing);
        Assert.InRange(spacing.Gradient.Max, 1e-4, 0.05);
        Assert.Equal((A, new Point(0, 0.0001)), (both.Wires.HalfSpacing, both.Wires.Midpoint));
        Assert.Equal(5000, both.Wires.Current, 1e-6);
    }

    [Fact]
    public void AUniformFieldHasNoWires()
    {
        InputException fault = Assert.Throws<InputException>(
            () => TwoWireComparison.Of(Ribbon, p => new BeamValues(p, 0, 1.0, 0, 0), new StatedWires()));

        Assert.Equal("no-two-wire-field", fault.Findings[0].What);
    }

    [Fact]
    public void AFieldThatIsNoWireFieldDeviatesByWhatIsAdded()
    {
        // 1 % of sextupole on top, which no wires can follow over this ribbon: 0.01 B0 (ζ − ζ0)³/w³ with w the half width.
        var wires = new TwoWireField(A, default, 10_000);
        double b0 = wires.At(Ribbon.Centre).Field;
        BeamValues Bent(Point p)
        {
            BeamValues v = wires.At(p);
            var d = new System.Numerics.Complex(p.Y, p.Z - Ribbon.Centre.Z);
            const double w = 0.0015;
            System.Numerics.Complex f = 0.01 * b0 * d * d * d / (w * w * w);
            System.Numerics.Complex slope = 0.03 * b0 * d * d / (w * w * w);
            return v with { By = v.By + f.Imaginary, Bz = v.Bz + f.Real, DByDz = v.DByDz + slope.Real, DBzDz = v.DBzDz - slope.Imaginary };
        }

        TwoWireComparison found = TwoWireComparison.Of(Ribbon, Bent, new StatedWires());

        Assert.InRange(found.Field.Max, 0.001, 0.012);
        Assert.InRange(found.Field.Rms, 0, found.Field.Max);
    }

    [Fact]
    public void RoundConductorsOfTheSolverAreWiresWithinTheErrorBar()
    {
        SolvedMagnet solved = MagnetSolver.Solve(
            new Drawn()
                .Circle("WIRE RIGHT", 3, 0, 1.0)
                .Circle("WIRE LEFT", -3, 0, 1.0)
                .Part("WIRE RIGHT", Material.Air, 10_000)
                .Part("WIRE LEFT", Material.Air, -10_000)
                .Magnet(),
            Drawn.Beam(0, 3.6, 3, 0.3),
            new SolveOptions { Accuracy = 1e-6, Threads = 2 });

        TwoWireComparison found = TwoWireComparison.Of(solved.Field);

        Assert.Equal(1.0, found.Wires.HalfSpacing / A, 1e-5);
        Assert.Equal(1.0, found.Wires.Current / 10_000, 1e-5);
        Assert.InRange(found.Field.Max, 0, solved.Record.AccuracyReached);
        Assert.InRange(found.Gradient.Max, 0, solved.Record.AccuracyReached);
        Assert.Equal(found.TwoWireShapeFactor, found.ShapeFactor, 1e-5);
    }

    private static Aperture Ribbon => Aperture.Rectangle(new Point(0, 0.0036), 0.003, 0.0003);
}
