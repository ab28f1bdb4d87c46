// Truth: the field of two opposite line currents (circles through both wires are its equipotentials; values for a = 3 mm recomputed by
// hand from the closed form), areas of rectangles, trapezia and circle segments, the stated dimensions of the model problem.
using PoleField.Drawing;
using PoleField.Geometry;
using Xunit;

namespace PoleField.Tests.Drawing.Families;

public sealed class TwoWirePairTests
{
    [Fact]
    public void DefaultsAreTheModelProblem()
    {
        Sketch sketch = new TwoWirePair().Draw().Sketch;
        double t = 3 / Math.Sqrt(2);
        double centre = Math.Sqrt((3.6 * 3.6) - 9);
        double land = 3.6 * Math.Sin(Math.PI / 3);
        double landZ = centre + 1.8;

        FamilyAssert.HasCorners(sketch, "RIDGE", (t, t), (15, (2 * t) - 15), (15, -41), (-t, t), (-15, (2 * t) - 15), (-15, -41));
        FamilyAssert.HasCorners(sketch, "GROOVE", (land, landZ), (4.5, landZ), (15, landZ + 10.5), (15, 49), (-land, landZ), (-4.5, landZ));
        FamilyAssert.HasCorners(sketch, "YOKE", (50, -41), (50, 49), (-50, 49), (75, -66), (75, 74), (-75, -66));
        FamilyAssert.HasCorners(sketch, "COIL RIGHT", (18, -38), (44, -38), (44, -14), (18, -14), (18, 22), (44, 46));
        FamilyAssert.HasCorners(sketch, "COIL LEFT", (-18, -38), (-44, -14), (-18, 22), (-44, 46));
        FamilyAssert.HasCorners(sketch, "BEAM", (-1.5, 3.45), (1.5, 3.75));

        CircularArc nose = Assert.Single(FamilyAssert.Arcs(sketch, "RIDGE"));
        Assert.Equal(3, nose.Radius, 1e-12);
        Assert.Equal(0, nose.Centre.Length, 1e-12);
        CircularArc groove = Assert.Single(FamilyAssert.Arcs(sketch, "GROOVE"));
        Assert.Equal(3.6, groove.Radius, 1e-12);
        Assert.Equal(centre, groove.Centre.Z, 1e-12);
    }

    // (R1/a, R2/a, NI/I, B a/(μ0 NI) at 1.2 a, G a²/(μ0 NI) at 1.2 a) from the closed form.
    [Theory]
    [InlineData(1.10, 1.907547, 1.876275)]
    [InlineData(1.25, 1.273770, 1.252888)]
    [InlineData(1.427, 1.031918, 1.015002)]
    [InlineData(1.50, 0.974560, 0.958584)]
    public void FieldPerAmpereTurnIsTheClosedForm(double grooveRadius, double field, double gradient)
    {
        StartingSketch pair = new TwoWirePair { GrooveRadius = 3 * grooveRadius, GrooveHalfAngle = 70, LandEdge = 6 }.Draw();
        double unit = PhysicalConstants.Mu0 / 3e-3;

        Assert.Equal(1, pair.FieldPerAmpereTurn / (field * unit), 1e-6);
        Assert.Equal(1, -pair.FieldPerAmpereTurn * pair.GradientPerField / (gradient * unit / 3e-3), 1e-6);
    }

    [Fact]
    public void AmpereTurnsGiveTheWantedFieldWithTheRightSigns()
    {
        StartingSketch pair = new TwoWirePair { GrooveRadius = 3.75 }.Draw();

        // 3000 ampere-turns give 1.6007 T at 1.2 a for R2 = 1.25 a, a = 3 mm; each coil layer has two outlines.
        Assert.Equal(3000, pair.AmpereTurnsFor(1.6007), 0.2);
        Assert.Equal(1500, pair.AmpereTurnsFor(1.6007, pair.Parts.Single(p => p.Layer == "COIL LEFT")), 0.1);
        Assert.Equal(-1500, pair.AmpereTurnsFor(1.6007, pair.Parts.Single(p => p.Layer == "COIL RIGHT")), 0.1);
        Assert.Equal(0, pair.AmpereTurnsFor(1.6007, pair.Parts.Single(p => p.Layer == "RIDGE")));
    }

    [Theory]
    [InlineData(3.0, 3.6, 60)]
    [InlineData(3.4, 3.75, 90)]
    [InlineData(4.0, 4.2, 110)]
    public void FacesAreEquipotentialsOfTheTwoWires(double ridgeRadius, double grooveRadius, double angle)
    {
        TwoWirePair dimensions = new() { RidgeRadius = ridgeRadius, GrooveRadius = grooveRadius, GrooveHalfAngle = angle };
        Sketch sketch = dimensions.Draw().Sketch;

        AssertPotential(Assert.Single(FamilyAssert.Arcs(sketch, "RIDGE")), dimensions.RidgeApex);
        AssertPotential(Assert.Single(FamilyAssert.Arcs(sketch, "GROOVE")), dimensions.GrooveApex);
    }

    [Fact]
    public void AreasAreThoseOfTheFigures()
    {
        Sketch sketch = new TwoWirePair().Draw().Sketch;
        double t = 3 / Math.Sqrt(2);
        double foot = (2 * t) - 15;

        // Body 30 × (foot + 41), trapezium between widths 30 and 2 t of height 15 − t, circle segment of a quarter circle of radius 3.
        double ridge = (30 * (foot + 41)) + ((15 + t) * (15 - t)) + ((9 * Math.PI / 4) - 4.5);

        // Body, trapezium between widths 30 and 9 of height 10.5, less the segment of 120 degrees of radius 3.6 above the land.
        double landZ = Math.Sqrt((3.6 * 3.6) - 9) + 1.8;
        double segment = 0.5 * 3.6 * 3.6 * ((2 * Math.PI / 3) - Math.Sin(2 * Math.PI / 3));
        double groove = (30 * (49 - landZ - 10.5)) + (19.5 * 10.5) - segment;

        Assert.Equal(ridge, Assert.Single(FamilyAssert.Outlines(sketch, "RIDGE")).Area, 1e-10);
        Assert.Equal(groove, Assert.Single(FamilyAssert.Outlines(sketch, "GROOVE")).Area, 1e-10);
        Assert.Equal([9000.0, 21000.0], FamilyAssert.Outlines(sketch, "YOKE").Select(o => o.Area).Order());
        Assert.Equal([624.0, 624.0], FamilyAssert.Outlines(sketch, "COIL LEFT").Select(o => o.Area));
        Assert.Equal(0.9, Assert.Single(FamilyAssert.Outlines(sketch, "BEAM")).Area, 1e-12);
    }

    [Fact]
    public void CutErrorFallsAsTheStripSays()
    {
        double[] errors = [.. new[] { 45.0, 60, 90, 110 }.Select(angle => new TwoWirePair { GrooveHalfAngle = angle }.FieldErrorOfCut)];

        // At 60 degrees by hand: τ = 0.641, Δσ = 0.584.
        Assert.Equal(0.0096, errors[1], 2e-4);
        Assert.Equal(errors.OrderDescending(), errors);
    }

    [Fact]
    public void EveryWrongDimensionIsNamedAtOnce()
    {
        TwoWirePair wrong = new()
        {
            HalfSpacing = 4,
            RidgeRadius = 3,
            GrooveRadius = -1,
            Beam = new BeamExtent(double.NaN, 0.3),
            Frame = new YokeFrame { CoilOuter = 60, Thickness = 0 },
        };

        InputException refused = Assert.Throws<InputException>(() => wrong.Draw());

        Assert.Equal(4, refused.Findings.Count);
        Assert.All(refused.Findings, f => Assert.StartsWith("two-wire: ", f.Text, StringComparison.Ordinal));
    }

    public static TheoryData<string> Contradictions => ["reach", "radius", "angle", "land", "beam-low", "beam-high", "beam-wide", "pole", "frame", "gap"];

    [Theory]
    [MemberData(nameof(Contradictions))]
    public void ContradictionIsRefused(string which)
    {
        TwoWirePair good = new();
        TwoWirePair wrong = which switch
        {
            "reach" => good with { RidgeReach = 3.1 },
            "radius" => good with { GrooveRadius = 2.9 },
            "angle" => good with { GrooveHalfAngle = 124 },
            "land" => good with { LandEdge = 3 },
            "beam-low" => good with { BeamPlace = 1.01 },
            "beam-high" => good with { BeamPlace = 1.8 },
            "beam-wide" => good with { Beam = new BeamExtent(7, 0.3) },
            "pole" => good with { LandEdge = 15 },
            "frame" => good with { Frame = good.Frame with { InnerBottom = -10, LowerCoil = (-9, -2) } },
            _ => good with { GrooveHalfAngle = 120, RidgeReach = 2.9, LandEdge = 14 },
        };

        Assert.Single(Assert.Throws<InputException>(wrong.Draw).Findings);
    }

    private static void AssertPotential(CircularArc face, double apex)
    {
        // The wires are seen under the same angle from all of the face.
        double wanted = 2 * Math.Atan(3 / apex);
        for (int i = 0; i <= 40; i++)
        {
            Point p = face.At(i / 40.0);
            double seen = Math.Atan2(p.Z, p.Y - 3) - Math.Atan2(p.Z, p.Y + 3);
            Assert.Equal(wanted, seen, 1e-12);
        }
    }
}
