// Truth: the promises of Mesh, judged by MeshCheck (itself tested on broken meshes); angle and length bounds asked for;
// exact areas of the sections.
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Meshing;
using PoleField.Tests.House;
using Xunit;

namespace PoleField.Tests.Meshing;

public sealed class MesherTests
{
    private const double AngleAsked = 26;

    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void ProblemPKeepsEveryPromise(bool box)
    {
        SizeField size = SizeField.FromSources(0.03, 0.35, [(ProblemP.Beam, 2e-4)]);

        Mesh mesh = Mesher.Mesh(ProblemP.Section(box), size);

        AssertSound(mesh);
        Assert.True(MeshQuality.Of(mesh).SmallestAngleDegrees >= 25);
        Assert.Equal(box, mesh.Circle is null);
        AssertEdgesFollow(mesh, size);
    }

    [Theory]
    [InlineData(20)]
    [InlineData(7)]
    public void NoEdgeTurnsMoreThanItMay(double degrees)
    {
        Mesh mesh = Mesher.Mesh(
            ProblemP.Section(box: false), SizeField.Uniform(0.05), new MeshOptions { LargestTurnDegrees = degrees });

        double[] turns = [.. mesh.CurveEdges.Where(e => e.Curve is CircularArc)
            .Select(e => Math.Abs(((CircularArc)e.Curve).Sweep) * (e.TB - e.TA) * 180 / Math.PI)];
        Assert.InRange(turns.Max(), degrees / 2, degrees * (1 + 1e-6));
    }

    [Fact]
    public void SameInputGivesTheSameBytes()
    {
        SizeField size = SizeField.FromSources(0.02, 0.35, [(ProblemP.Beam, 3e-4)]);

        Mesh first = Mesher.Mesh(ProblemP.Section(box: false), size);
        Mesh second = Mesher.Mesh(ProblemP.Section(box: false), size);

        Assert.True(first.Vertices.SequenceEqual(second.Vertices));
        Assert.True(first.Triangles.SequenceEqual(second.Triangles));
        Assert.True(first.Regions.SequenceEqual(second.Regions));
        Assert.True(first.CurveEdges.Select(e => (e.A, e.B, e.TA, e.TB, e.SectionEdge))
            .SequenceEqual(second.CurveEdges.Select(e => (e.A, e.B, e.TA, e.TB, e.SectionEdge))));
    }

    [Theory]
    [InlineData(1.0)]
    [InlineData(0.2)]
    [InlineData(0.05)]
    public void ACircleInACircleApproachesItsArea(double size)
    {
        SectionFixture s = new();
        s.Circle(s.Region("wire"), CrossSection.Air, new Point(0.3, 0.1), 0.5).Circle(CrossSection.Air, CrossSection.Outside, default, 2);

        Mesh mesh = Mesher.Mesh(s.Build(), SizeField.Uniform(size));

        AssertSound(mesh);
        Assert.True(MeshQuality.Of(mesh).SmallestAngleDegrees >= 25);

        // Chords turn by at most 20 degrees: each sector of turn a loses (a − sin a)/a of its area, at most a²/6.
        double turn = Math.Min(Math.PI / 9, 1.4 * size / 0.5);
        Assert.InRange(AreaOf(mesh, 1) / (Math.PI * 0.25), 1 - (turn * turn / 6), 1);
    }

    [Theory]
    [InlineData(0.1)]
    [InlineData(0.01)]
    [InlineData(0.001)]
    public void ThinRingsAreMeshedThough(double gap)
    {
        // Chords of 20 degrees have a sagitta of 0.015: without care the rings' chords would cross.
        SectionFixture s = new();
        int ring = s.Region("ring"), core = s.Region("core");
        s.Circle(ring, CrossSection.Air, default, 1).Circle(core, ring, default, 1 - gap, startAngle: 1);

        Mesh mesh = Mesher.Mesh(s.Build(), SizeField.Uniform(0.5));

        AssertSound(mesh);
        Assert.True(MeshQuality.Of(mesh).SmallestAngleDegrees >= 25);
    }

    [Theory]
    [InlineData(45)]
    [InlineData(15)]
    [InlineData(5)]
    [InlineData(0.7)]
    public void SharpWedgesEndRefinement(double degrees)
    {
        SectionFixture s = new();
        Point tip = new(0.1, 0.2);
        s.Polygon(s.Region("wedge"), CrossSection.Air, tip, tip + new Point(1, 0), tip + Point.Polar(0.9, degrees * Math.PI / 180));

        Mesh mesh = Mesher.Mesh(s.Build(), SizeField.Uniform(0.4));

        AssertSound(mesh);
        Assert.InRange(mesh.TriangleCount, 50, 20_000);
        Assert.True(SmallestAngleOff(mesh, [1]) >= 25);
    }

    [Theory]
    [InlineData(60)]
    [InlineData(10)]
    public void AnArcMeetsALineAtASharpAngle(double degrees)
    {
        // A circular segment whose chord makes the given angle with its arc at both ends.
        double angle = degrees * Math.PI / 180;
        CircularArc arc = CircularArc.FromBulge(new Point(1, 0), new Point(-1, 0), Math.Tan(angle / 2));
        SectionFixture s = new();
        int part = s.Region("segment");
        s.Edge(new Line(new Point(-1, 0), new Point(1, 0)), part, CrossSection.Air).Edge(arc, part, CrossSection.Air);

        Mesh mesh = Mesher.Mesh(s.Build(), SizeField.Uniform(0.5));

        AssertSound(mesh);
        Assert.True(SmallestAngleOff(mesh, degrees < 60 ? [1] : []) >= 25);
    }

    [Theory]
    [InlineData(4)]
    [InlineData(0.8)]
    public void AnArcLeavesALineAtATinyAngle(double degrees)
    {
        // The arc bends away from the line; beyond the corner thin triangles would fold if the chords stayed long.
        CircularArc arc = new(Point.Polar(1, (degrees * Math.PI / 180) + (Math.PI / 2)), 1, (degrees * Math.PI / 180) - (Math.PI / 2), 1);
        Point tip = arc.Start, side = tip + new Point(1, 0);
        SectionFixture s = new();
        int part = s.Region("sliver");
        s.Edge(new Line(tip, side), part, CrossSection.Air).Edge(new Line(side, arc.End), part, CrossSection.Air)
            .Edge(arc.Reversed(), part, CrossSection.Air);

        Mesh mesh = Mesher.Mesh(s.Build(), SizeField.Uniform(0.5));

        AssertSound(mesh);
        Assert.True(SmallestAngleOff(mesh, [part]) >= 25);
    }

    [Fact]
    public void ACircleThatTouchesALineIsMeshedWithStraightFirstPieces()
    {
        SectionFixture s = new();
        int round = s.Region("round"), plate = s.Region("plate");
        Point touch = new(0, 0);
        s.Edge(new CircularArc(new Point(0, 1), 1, -Math.PI / 2, Math.Tau).WithEnds(touch, touch), round, CrossSection.Air);
        s.Polygon(plate, CrossSection.Air, new Point(-2, -1), new Point(2, -1), new Point(2, 0), touch, new Point(-2, 0));

        Mesh mesh = Mesher.Mesh(s.Build(), SizeField.Uniform(0.5));

        AssertSound(mesh);
        Assert.Contains(mesh.CurveEdges, e => e.SectionEdge == 0 && e.Curve is Line);
    }

    [Fact]
    public void TouchingPartsShareTheirBorder()
    {
        SectionFixture s = new();
        int left = s.Region("left"), right = s.Region("right");
        Point a = new(0, 0), b = new(0, 1);
        s.Edge(new Line(a, b), left, right);
        s.Edge(new Line(b, new Point(-1, 1)), left, CrossSection.Air).Edge(new Line(new Point(-1, 1), new Point(-1, 0)), left, CrossSection.Air)
            .Edge(new Line(new Point(-1, 0), a), left, CrossSection.Air);
        s.Edge(new CircularArc(new Point(0, 0.5), 0.5, -Math.PI / 2, Math.PI).WithEnds(a, b), right, CrossSection.Air);

        Mesh mesh = Mesher.Mesh(s.Build(), SizeField.Uniform(0.2));

        AssertSound(mesh);
        Assert.True(MeshQuality.Of(mesh).SmallestAngleDegrees >= 25);
        Assert.Equal(1, AreaOf(mesh, left), 1e-12);
    }

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(3)]
    public void APatchworkOfTouchingPartsFillsItsRim(int seed)
    {
        const int cells = 7;
        Random random = new(seed);
        Point[,] corner = new Point[cells + 1, cells + 1];
        for (int i = 0; i <= cells; i++)
        {
            for (int j = 0; j <= cells; j++)
            {
                corner[i, j] = new Point(i + (0.7 * (random.NextDouble() - 0.5)), j + (0.7 * (random.NextDouble() - 0.5)));
            }
        }

        SectionFixture s = new();
        int[,] region = new int[cells, cells];
        for (int k = 0; k < cells * cells; k++)
        {
            region[k / cells, k % cells] = s.Region(FormattableString.Invariant($"cell {k}"));
        }

        int At(int i, int j) => i >= 0 && j >= 0 && i < cells && j < cells ? region[i, j] : CrossSection.Outside;
        for (int i = 0; i <= cells; i++)
        {
            for (int j = 0; j < cells; j++)
            {
                s.Edge(new Line(corner[i, j], corner[i, j + 1]), At(i - 1, j), At(i, j));
                s.Edge(new Line(corner[j, i], corner[j + 1, i]), At(j, i), At(j, i - 1));
            }
        }

        Mesh mesh = Mesher.Mesh(s.Build(), SizeField.FromSources(1, 0.35, [(new Point(3, 3), 0.05)]));

        AssertSound(mesh);
        Assert.Equal(cells * cells, mesh.Regions.Distinct().Count());
    }

    [Theory]
    [InlineData(0.1)]
    [InlineData(0.004)]
    public void CurvesOfAnyKindAreFollowedThroughTheirInflections(double gap)
    {
        // A wavy slit of air between two parts: the chords of one wave may not cross the other.
        SineCurve lower = new(new Point(0, 0), 0.3), upper = new(new Point(0, gap), 0.3);
        SectionFixture s = new();
        int below = s.Region("below"), above = s.Region("above");
        s.Edge(lower, CrossSection.Air, below).Edge(upper, above, CrossSection.Air);
        s.Edge(new Line(lower.End, new Point(2, -1)), CrossSection.Air, below).Edge(new Line(new Point(2, -1), new Point(0, -1)), CrossSection.Air, below)
            .Edge(new Line(new Point(0, -1), lower.Start), CrossSection.Air, below);
        s.Edge(new Line(upper.End, new Point(2, 1)), above, CrossSection.Air).Edge(new Line(new Point(2, 1), new Point(0, 1)), above, CrossSection.Air)
            .Edge(new Line(new Point(0, 1), upper.Start), above, CrossSection.Air);

        Mesh mesh = Mesher.Mesh(s.Build(), SizeField.Uniform(0.3));

        AssertSound(mesh);
        Assert.True(MeshQuality.Of(mesh).SmallestAngleDegrees >= 22); // corners of waves and walls are sharper than 60 degrees
    }

    [Fact]
    public void CirclesThatTouchAreMeshed()
    {
        Point touch = new(0, 0);
        SectionFixture s = new();
        s.Edge(new CircularArc(new Point(1, 0), 1, Math.PI, Math.Tau).WithEnds(touch, touch), s.Region("right"), CrossSection.Air);
        s.Edge(new CircularArc(new Point(-0.3, 0), 0.3, 0, Math.Tau).WithEnds(touch, touch), s.Region("left"), CrossSection.Air);

        Mesh mesh = Mesher.Mesh(s.Build(), SizeField.Uniform(0.2));

        AssertSound(mesh);
        Assert.InRange(mesh.TriangleCount, 300, 5_000);
    }

    [Fact]
    public void ARimThatBulgesInwardsAndOutwardsIsFollowed()
    {
        // A square whose right side bulges out and whose left side bulges in.
        Point a = new(0, 0), b = new(2, 0), c = new(2, 2), d = new(0, 2);
        SectionFixture s = new();
        s.Edge(new Line(a, b), 0, -1).Edge(CircularArc.FromBulge(b, c, 0.4), 0, -1);
        s.Edge(new Line(c, d), 0, -1).Edge(CircularArc.FromBulge(d, a, -0.4), 0, -1);

        // Parts whose corners come close to the arcs make refinement split them after the first cut.
        int part = s.Region("part");
        s.Polygon(part, CrossSection.Air, new Point(0.43, 1), new Point(0.9, 0.7), new Point(0.9, 1.3));
        s.Polygon(part, CrossSection.Air, new Point(2.37, 1), new Point(1.9, 1.3), new Point(1.9, 0.7));
        Mesh mesh = Mesher.Mesh(s.Build(), SizeField.Uniform(1));

        AssertSound(mesh);
        Assert.True(MeshQuality.Of(mesh).SmallestAngleDegrees >= 25);
    }

    [Fact]
    public void SectionsThatCrossThemselvesAreRefusedWithThePlace()
    {
        SectionFixture s = new();
        int part = s.Region("bow");
        s.Polygon(part, CrossSection.Air, new Point(0, 0), new Point(2, 2), new Point(2, 0), new Point(0, 2));

        MeshingException refusal = Assert.Throws<MeshingException>(() => Mesher.Mesh(s.Build(), SizeField.Uniform(0.5)));

        Assert.True(refusal.At.DistanceTo(new Point(1, 1)) < 1.5);
    }

    [Fact]
    public void TooManyTrianglesAreRefusedWithThePlace()
    {
        SizeField size = SizeField.FromSources(0.1, 0.35, [(ProblemP.Beam, 1e-6)]);
        MeshOptions few = new() { MostTriangles = 700 };

        MeshingException refusal = Assert.Throws<MeshingException>(() => Mesher.Mesh(ProblemP.Section(), size, few));

        Assert.Contains("700", refusal.Message, StringComparison.Ordinal);
        Assert.True(ProblemP.Section().Bounds.Contains(refusal.At));
    }

    [Fact]
    public void CancellationEndsTheWork()
    {
        using CancellationTokenSource source = new();
        source.Cancel();

        Assert.ThrowsAny<OperationCanceledException>(
            () => Mesher.Mesh(ProblemP.Section(), SizeField.Uniform(5e-4), cancellation: source.Token));
    }

    // POLEFIELD_RANDOM_SECTIONS asks for more of them.
    [Fact]
    public void RandomSectionsKeepEveryPromiseAndEnd()
    {
        int count = RandomRuns.Count("POLEFIELD_RANDOM_SECTIONS", 300);
        string[] broken = [.. Enumerable.Range(0, count).Select(FaultOf).Where(fault => fault.Length > 0)];

        Assert.True(broken.Length == 0, FormattableString.Invariant($"{broken.Length} of {count}: {string.Join("\n", broken.Take(20))}"));
    }

    private static string FaultOf(int seed)
    {
        using CancellationTokenSource late = new(TimeSpan.FromMinutes(1));
        try
        {
            CrossSection section = RandomSection.Make(seed);
            SizeField size = SizeField.FromSources(0.5, 0.35, [(default, 0.05), (new Point(1, 0.5), 0.02)]);
            Mesh mesh = Mesher.Mesh(section, size, cancellation: late.Token);
            AssertSound(mesh, $"seed {seed}");
            double smallest = SmallestAngleOff(mesh, RandomSection.SharpRegions(section));
            Assert.True(smallest >= 25, FormattableString.Invariant($"smallest angle {smallest}"));
            AssertEdgesFollow(mesh, size);
            return "";
        }
        catch (Exception e) when (e is Xunit.Sdk.XunitException or MeshingException or InvalidOperationException or ArgumentException or OperationCanceledException)
        {
            return FormattableString.Invariant($"seed {seed}: {e.Message.ReplaceLineEndings(" ")}");
        }
    }

    internal static void AssertSound(Mesh mesh, string name = "") =>
        Assert.Equal("", name.Length > 0 && MeshCheck.Of(mesh).Count > 0
            ? name + ": " + MeshCheck.Of(mesh)[0].What + " " + MeshCheck.Of(mesh)[0].Text
            : string.Join("; ", MeshCheck.Of(mesh).Take(5).Select(f => f.What + " " + f.Text)));

    internal static double AreaOf(Mesh mesh, int region)
    {
        double area = 0;
        for (int t = 0; t < mesh.TriangleCount; t++)
        {
            if (mesh.Regions[t] == region)
            {
                Point a = mesh.Vertices[mesh.Triangles[3 * t]];
                area += 0.5 * (mesh.Vertices[mesh.Triangles[(3 * t) + 1]] - a).Cross(mesh.Vertices[mesh.Triangles[(3 * t) + 2]] - a);
            }
        }

        return area;
    }

    // Smallest angle of all triangles but those inside the given (sharp) regions.
    private static double SmallestAngleOff(Mesh mesh, IReadOnlyCollection<int> sharpRegions)
    {
        double smallest = 180;
        for (int h = 0; h < mesh.Triangles.Count; h++)
        {
            if (!sharpRegions.Contains(mesh.Regions[h / 3]))
            {
                int t = h - (h % 3);
                Point p = mesh.Vertices[mesh.Triangles[h]];
                Point u = mesh.Vertices[mesh.Triangles[t + ((h + 1) % 3)]] - p;
                Point v = mesh.Vertices[mesh.Triangles[t + ((h + 2) % 3)]] - p;
                smallest = Math.Min(smallest, Math.Atan2(u.Cross(v), u.Dot(v)) * 180 / Math.PI);
            }
        }

        return smallest;
    }

    // No edge of the first disc is longer than 1.3 times what is wanted at its middle, and a little for the growth along it.
    private static void AssertEdgesFollow(Mesh mesh, SizeField size)
    {
        double worst = 0;
        for (int h = 0; h < mesh.Triangles.Count; h++)
        {
            if (mesh.Regions[h / 3] != Mesh.Exterior)
            {
                Point a = mesh.Vertices[mesh.Triangles[h]];
                Point b = mesh.Vertices[mesh.Triangles[h - (h % 3) + ((h + 1) % 3)]];
                worst = Math.Max(worst, a.DistanceTo(b) / size.At(Point.Between(a, b, 0.5)));
            }
        }

        Assert.InRange(worst, 0, 1.5);
    }
}
