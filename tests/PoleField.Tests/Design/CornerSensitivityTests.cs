// Truth: central differences of full re-solves on new meshes with parts and faces moved (independent of the shape derivative), on poles
// with sharp lips, linear and saturated; and the identity that the densities along a part's faces add up to its shift.
using PoleField.Beam;
using PoleField.Design;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Tests.Verification;
using Xunit;

namespace PoleField.Tests.Design;

public class CornerSensitivityTests
{
    // Spreads have kinks; their chain rule is tried on round poles.
    private static readonly DesignQuantity[] Quantities =
        [.. Enum.GetValues<DesignQuantity>().Where(q => q is not (DesignQuantity.GradientSpread or DesignQuantity.ProductSpread))];

    private static readonly Aperture Beam = Drawn.Beam(0.3, 1.2, 2.4, 0.6);

    [Theory]
    [InlineData(true, 0)]
    [InlineData(false, 1)]
    public void SharpPolesMovedAsAWholeAgreeWithReSolves(bool saturated, int part)
    {
        IReadOnlyList<QuantityDerivatives> all = Sensitivity.Of(Solve(Poles(saturated)), 2).Derivatives(Quantities);
        Point pivot = all[0].Parts[part].Pivot;
        foreach ((double y, double z, double milliradian) in new[] { (20.0, 30.0, 0.0), (0, 0, 6) })
        {
            double[] Differences(double times)
            {
                double[] more = Values(Solve(Poles(saturated, part, times * y, times * z, times * milliradian, pivot)));
                double[] less = Values(Solve(Poles(saturated, part, -times * y, -times * z, -times * milliradian, pivot)));
                return [.. more.Zip(less, (a, b) => (a - b) / (2 * times))];
            }

            // Richardson's step takes out what is of third order in the move.
            double[] found = [.. Differences(1).Zip(Differences(2), (a, b) => ((4 * a) - b) / 3)];
            for (int q = 0; q < Quantities.Length; q++)
            {
                PartDerivatives own = all[q].Parts[part];
                double predicted = (1e-6 * y * own.Shift.Y) + (1e-6 * z * own.Shift.Z) + (1e-3 * milliradian * own.Turn);

                // What a new mesh changes by itself, seen where a move changes the quantity hardly at all.
                double noise = 1e-5 * Math.Abs(all[q].Value);
                Assert.True(
                    Math.Abs(predicted - found[q]) < (1e-3 * Math.Abs(found[q])) + noise,
                    FormattableString.Invariant($"{Quantities[q]} by {y} {z} {milliradian}: predicted {predicted:g6}, re-solved {found[q]:g6} of {all[q].Value:g4}"));
            }
        }
    }

    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void ModesAcrossSharpCornersAgreeWithReSolves(bool saturated)
    {
        Magnet magnet = Poles(saturated);
        IReadOnlyList<Face> faces = Face.Of(magnet);
        Face block = faces.Single(f => f.Layer == "BLOCK");

        // From the middle of the lower side around its right-hand lip: the second mode is greatest at the corner.
        double from = Arc(block, new Point(0, 4e-3)), to = Arc(block, new Point(5e-3, 6e-3));
        FaceModes modes = FaceModes.On(block, Math.Min(from, to), Math.Max(from, to), 3, evenWanted: false);
        var freedoms = new FaceFreedoms(magnet.Section, faces, [modes], new TuneSettings { Reach = 1e-3 });
        double[] at = saturated ? [5e-5, -8e-5, 6e-5] : [0, 0, 0];
        FixedMeshSolve solve = Solved(at);
        var linear = LinearisedField.Of(solve);
        var motion = MeshMotion.Of(solve.Solution.Problem.Space, solve.Chi, freedoms.VelocitiesAt(at, solve.Solution.Magnet.Section));
        BeamValues centre = solve.Measures.Centre;
        double[] predicted = [.. MotionResponses.Of(linear, motion, 2).Select(r => BeamChange.OfGradient(centre, r.Field.At(centre.At)))];
        const double step = 2e-5;
        for (int k = 0; k < 3; k++)
        {
            double[] more = [.. at], less = [.. at];
            more[k] += step;
            less[k] -= step;
            double found = (Solved(more).Measures.Centre.Gradient - Solved(less).Measures.Centre.Gradient) / (2 * step);
            Assert.True(
                Math.Abs(predicted[k] - found) < 1e-3 * predicted.Max(Math.Abs),
                FormattableString.Invariant($"mode {k} of {string.Join(" ", predicted)}: re-solved {found}"));
        }

        FixedMeshSolve Solved(double[] moves) => Solve(magnet with { Section = freedoms.SectionAt(moves) });
    }

    [Theory]
    [InlineData(true)]
    public void DensitiesAlongAPartAddUpToItsShift(bool saturated)
    {
        Sensitivity s = Sensitivity.Of(Solve(Poles(saturated)));
        QuantityDerivatives gradient = s.Derivatives([DesignQuantity.Gradient])[0];
        for (int part = 0; part < 2; part++)
        {
            Point sum = default;
            for (int i = 0; i < s.Points.Count; i++)
            {
                FacePoint p = s.Points[i];
                sum += s.Section.Regions[p.Inner].Part == part ? (gradient.Density[i] * p.Length) * p.Outward : default;
            }

            // Traces at sharp corners are what limits the sum.
            Point shift = gradient.Parts[part].Shift;
            Assert.True((sum - shift).Length < 0.07 * shift.Length, FormattableString.Invariant($"part {part}: {sum} for {shift}"));
        }
    }

    private static double Arc(Face face, Point near)
    {
        Face.FaceEdge edge = face.Edges.MinBy(e => e.Edge.Curve.DistanceTo(near))!;
        return edge.ArcLengthAt(edge.Edge.Curve.ClosestParameter(near));
    }

    private static double[] Values(FixedMeshSolve solve) => [.. Quantities.Select(q => q.Value(solve.Measures))];

    private static FixedMeshSolve Solve(Magnet magnet) =>
        FixedMeshSolve.Of(magnet, new FixedMeshOptions(Beam, 2) { Order = 4, Fineness = 0.6 });

    // A wedge with a flat nose below a block with square lips, in a background field.
    private static Magnet Poles(bool saturated, int moved = -1, double y = 0, double z = 0, double milliradian = 0, Point pivot = default)
    {
        Affine map = Affine.Shift(new Point(1e-3 * y, 1e-3 * z)).After(Affine.Turn(1e3 * pivot, 1e-3 * milliradian));
        var drawn = new Drawn();
        void Add(int part, string layer, params Point[] corners) =>
            drawn.Polygon(layer, [.. corners.Select(c => part == moved ? map.Apply(c) : c)]);
        Add(0, "WEDGE", new(-1.5, -0.5), new(-5, -9), new(5, -9), new(2, -0.5));
        Add(1, "BLOCK", new(-4, 4), new(5, 4), new(5, 10), new(-4, 10));
        return saturated
            ? drawn.Part("WEDGE", MaterialLibrary.Get("mild-steel")).Part("BLOCK", MaterialLibrary.Get("cobalt-iron-49")).Magnet(new Point(0, 0.9))
            : drawn.Linear("WEDGE", 800).Linear("BLOCK", 800).Magnet(new Point(0, 0.3));
    }
}
