// Truth: central differences of re-solves with moved faces; closed forms of a moved circle and of B-splines; and for the tuned
// magnet a new solve at full accuracy, which knows nothing of the tuning's own meshes and sample points.
using PoleField.Beam;
using PoleField.Design;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Tests.Verification;
using Xunit;

namespace PoleField.Tests.Design;

public class TuningTests
{
    private const double Radius = 10e-3;

    [Fact]
    public void ACircleMovedOutwardsIsALargerCircle()
    {
        Magnet magnet = Cylinder();
        CrossSection moved = MovedSection.Of(magnet.Section, Face.Of(magnet), _ => 1e-3, 1e-3);

        Region iron = moved.Regions.Single(r => r.Part == 0);
        Assert.Equal(1.0, iron.Area / (Math.PI * 121e-6), 1e-6);
        Assert.Equal(magnet.Section.Edges.Count, moved.Edges.Count);
        Assert.Empty(CrossSectionCheck.Faults(moved));
    }

    [Fact]
    public void CornersGoWhereBothFacesWantThem()
    {
        Magnet magnet = new Drawn().Rectangle("IRON", 0, 0, 10, 6).Linear("IRON", 100).Magnet();
        CrossSection moved = MovedSection.Of(magnet.Section, Face.Of(magnet), _ => 1e-3, 1e-3);

        Assert.Equal(12e-3 * 8e-3, moved.Regions[1].Area, 1e-12);
    }

    [Fact]
    public void FacesMovedByTheNormalPartOfAShiftAreShiftedWithTheirCorners()
    {
        Magnet magnet = new Drawn().Rectangle("IRON", 0, 0, 10, 6).Linear("IRON", 100).Magnet();
        var shift = new Point(2e-5, -3e-5);
        CrossSection moved = MovedSection.Of(magnet.Section, Face.Of(magnet), p => shift.Dot(p.Outward), 1e-3);

        foreach ((SectionEdge before, SectionEdge after) in magnet.Section.Edges.Zip(moved.Edges).Where(e => e.First.Left > 0 || e.First.Right > 0))
        {
            for (double t = 0; t <= 1; t += 1.0 / 16)
            {
                Assert.InRange(after.Curve.DistanceTo(before.Curve.At(t) + shift), 0, 1e-12);
            }
        }
    }

    [Fact]
    public void ModesVanishAtTheirEndsAndAddUpToOneBetween()
    {
        Face face = Assert.Single(Face.Of(Cylinder()));
        FaceModes modes = FaceModes.On(face, 0.01, 0.02, 9, evenWanted: false);
        double[] ones = [.. Enumerable.Repeat(1.0, 9)];

        Assert.Equal(0, modes.Move(ones, 0.01 + 1e-9), 1e-9);
        Assert.Equal(1.0, modes.Move(ones, 0.015), 1e-12);
        Assert.InRange(Enumerable.Range(0, 1000).Max(k => modes.Move(ones, 0.01 + (k * 1e-5))), 0, 1 + 1e-12);
    }

    [Fact]
    public void DerivativesByModesAgreeWithReSolves()
    {
        Magnet magnet = Cylinder();
        IReadOnlyList<Face> faces = Face.Of(magnet);
        double top = 0.25 * faces[0].Length;
        FaceModes modes = FaceModes.On(faces[0], top - 8e-3, top + 8e-3, 3, evenWanted: true);
        Assert.True(modes.IsSymmetric);
        double[] at = [4e-4, -3e-4, 5e-4];
        var freedoms = new FaceFreedoms(magnet.Section, faces, [modes], new TuneSettings { Reach = 1e-3 });
        double[] rows = GradientBy(Solved(at), freedoms, at);
        const double step = 2e-5;
        for (int k = 0; k < 3; k++)
        {
            double[] more = [.. at], less = [.. at];
            more[k] += step;
            less[k] -= step;
            double difference = (Solved(more).Measures.Centre.Gradient - Solved(less).Measures.Centre.Gradient) / (2 * step);
            Assert.True(
                Math.Abs(rows[k] - difference) < 1e-3 * rows.Max(Math.Abs),
                FormattableString.Invariant($"mode {k} of {string.Join(" ", rows)}: re-solved {difference}"));
        }

        FixedMeshSolve Solved(double[] moves) => FixedMeshSolve.Of(
            magnet with { Section = freedoms.SectionAt(moves) },
            new FixedMeshOptions(Drawn.Beam(0, 15, 3, 1), 1) { Order = 4, Fineness = 0.6 });
    }

    [Fact]
    public void TunedPolesHaveAUniformGradientWhenSolvedAnew()
    {
        // The two-wire field's rms over this aperture is 3.8 % at best; a flat field of 0.4 % exists (ln|B| harmonic).
        Magnet magnet = PolePairTests.Poles();
        Aperture aperture = Drawn.Beam(0, 3.6, 3.0, 0.3);
        BeamReport before = MagnetSolver.Solve(magnet, aperture).Report;
        double least = 0.97 * Math.Abs(before.Beam.Gradient);
        TuneResult tuned = Tuning.Run(magnet, aperture, new TuneSettings
        {
            Stretches =
            [
                new TuneStretch("IRON", new Point(-2.9e-3, 0.7e-3), new Point(2.9e-3, 0.7e-3)),
                new TuneStretch("IRON", new Point(-3.5e-3, 3.5e-3), new Point(3.5e-3, 3.5e-3)),
            ],
            Reach = 1e-3,
            Holds = [new(HeldQuantity.Gradient, true, least), new(HeldQuantity.Clearance, true, 0.25e-3)],
            MostSteps = 5,
        });
        BeamReport after = MagnetSolver.Solve(tuned.Magnet, aperture).Report;

        Assert.InRange(before.Gradient.Rms, 0.03, 0.05);
        Assert.InRange(after.Gradient.Rms, 0, 0.006);
        Assert.InRange(Math.Abs(after.Beam.Gradient), least, 2 * least);
        Assert.InRange(after.Clearance, 0.25e-3, 1e-3);
        Assert.InRange(tuned.Moves.Max(m => m.Points.Max(p => Math.Abs(p.Move))), 1e-5, 1e-3);
        Assert.Equal(0, after.Beam.By / after.Beam.Bz, 1e-5);
    }

    private static double[] GradientBy(FixedMeshSolve solve, ShapeFreedoms freedoms, double[] values)
    {
        var linear = LinearisedField.Of(solve);
        var motion = MeshMotion.Of(solve.Solution.Problem.Space, solve.Chi, freedoms.VelocitiesAt(values, solve.Solution.Magnet.Section));
        BeamValues centre = solve.Measures.Centre;
        return [.. MotionResponses.Of(linear, motion, 1).Select(r => BeamChange.OfGradient(centre, r.Field.At(centre.At)))];
    }

    private static Magnet Cylinder() => new Drawn().Circle("ROOM", 0, 0, 30).Circle("IRON", 0, 0, 1000 * Radius)
        .Part("IRON", MaterialLibrary.Get("mild-steel")).Part("ROOM", Material.Air).Magnet(new Point(0, 1));
}
