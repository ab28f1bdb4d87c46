// Truth: central differences of full re-solves on new meshes with parts moved, currents and polarisation changed (independent of
// the adjoint), and the identity that moving everything one way is moving the beam the other way.
using PoleField.Beam;
using PoleField.Design;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Tests.Verification;
using Xunit;

namespace PoleField.Tests.Design;

public class PoleSensitivityTests
{
    private static readonly DesignQuantity[] Quantities = Enum.GetValues<DesignQuantity>();
    private static readonly Aperture Beam = Drawn.Beam(0.3, 1.2, 2.4, 0.6);
    private static readonly Lazy<Sensitivity> Saturated = new(() => Sensitivity.Of(Solve(Poles())));
    private static readonly Lazy<IReadOnlyList<QuantityDerivatives>> Derivatives = new(() => Saturated.Value.Derivatives(Quantities));

    [Fact]
    public void TheIronIsSaturated()
    {
        FieldSample nose = Assert.NotNull(Solve(Poles()).Solution.At(new Point(0, -1e-3)));
        Assert.InRange(nose.Magnitude, 1.9, 2.6);
    }

    [Theory]
    [InlineData(0, 20, 0, 0)]
    [InlineData(0, 0, 20, 0)]
    [InlineData(1, 20, 0, 0)]
    [InlineData(1, 0, 20, 0)]
    [InlineData(2, 0, 200, 0)]
    [InlineData(0, 0, 0, 4)]
    [InlineData(1, 0, 0, 4)]
    public void MovedPartsAgreeWithDifferencesOfReSolves(int part, double y, double z, double milliradian)
    {
        PartDerivatives[] own = [.. Derivatives.Value.Select(d => d.Parts[part])];
        Point pivot = own[0].Pivot;
        double[] more = Values(Solve(Poles(part, y, z, milliradian, pivot)));
        double[] less = Values(Solve(Poles(part, -y, -z, -milliradian, pivot)));

        AssertAgree(more, less, own.Select(p => (1e-6 * y * p.Shift.Y) + (1e-6 * z * p.Shift.Z) + (1e-3 * milliradian * p.Turn)));
    }

    [Fact]
    public void CurrentsAgreeWithDifferencesOfReSolves()
    {
        const double step = 0.005;
        double[] more = Values(Solve(Poles().WithCurrentsScaled(1 + step)));
        double[] less = Values(Solve(Poles().WithCurrentsScaled(1 - step)));

        AssertAgree(more, less, Derivatives.Value.Select(d => step * d.Parts.Sum(p => p.AmpereTurns)));
    }

    [Fact]
    public void PolarisationAgreesWithDifferencesOfReSolves()
    {
        const double step = 0.005;
        Magnet Scaled(double factor)
        {
            Magnet m = Poles();
            return m with { Roles = [.. m.Roles.Select(r => r.Kind == "iron" ? r with { Material = r.Material.WithSaturationScaled(factor) } : r)] };
        }

        AssertAgree(
            Values(Solve(Scaled(1 + step))), Values(Solve(Scaled(1 - step))), Derivatives.Value.Select(d => step * d.Parts.Sum(p => p.Saturation)));
    }

    [Fact]
    public void MovingEverythingIsMovingTheBeamTheOtherWay()
    {
        foreach (QuantityDerivatives d in Derivatives.Value)
        {
            Point all = d.Parts.Aggregate(default(Point), (sum, p) => sum + p.Shift);
            double off = (all + d.BeamPlace).Length / d.Parts.Max(p => p.Shift.Length);
            Assert.True(off < 1e-3, FormattableString.Invariant($"{d.Quantity}: all parts {all}, beam {d.BeamPlace}, off by {off:g3}"));
        }
    }

    private static void AssertAgree(double[] more, double[] less, IEnumerable<double> linear)
    {
        double[] predicted = [.. linear];
        for (int q = 0; q < predicted.Length; q++)
        {
            double difference = 0.5 * (more[q] - less[q]);

            // What a new mesh changes by itself, seen where a move changes the quantity hardly at all.
            double noise = 1e-5 * Math.Abs(more[q]);
            Assert.True(
                Math.Abs(predicted[q] - difference) < (1e-3 * Math.Abs(difference)) + noise,
                FormattableString.Invariant($"{Quantities[q]} ({more[q]:g4}): predicted {predicted[q]:g6}, re-solved {difference:g6}"));
        }
    }

    private static double[] Values(FixedMeshSolve solve) => [.. Quantities.Select(q => q.Value(solve.Measures))];

    private static FixedMeshSolve Solve(Magnet magnet) =>
        FixedMeshSolve.Of(magnet, new FixedMeshOptions(Beam, 1) { Order = 4, Fineness = 0.5 });

    // Two bars with round ends in a background field, a current on each side; one of the parts moved.
    private static Magnet Poles(int moved = -1, double y = 0, double z = 0, double milliradian = 0, Point pivot = default)
    {
        Affine map = Affine.Shift(new Point(1e-3 * y, 1e-3 * z)).After(Affine.Turn(1e3 * pivot, 1e-3 * milliradian));
        var drawn = new Drawn();
        void Add(int part, string layer, IEnumerable<Curve> curves) =>
            drawn.Closed(layer, [.. curves.Select(c => part == moved ? c.Transformed(map) : c)]);
        Add(0, "RIDGE", Bar(new Point(0, -12), new Point(0, -3), 3));
        Add(1, "GROOVE", Bar(new Point(-5, 5.5), new Point(5, 5.5), 3));
        Add(2, "COIL LEFT", Outline.Rectangle(new Point(-12, -10), 6, 10).Curves);
        Add(3, "COIL RIGHT", Outline.Rectangle(new Point(12, -10), 6, 10).Curves);
        return drawn.Part("RIDGE", MaterialLibrary.Get("mild-steel")).Part("GROOVE", MaterialLibrary.Get("cobalt-iron-49"))
            .Part("COIL LEFT", Material.Air, 4000).Part("COIL RIGHT", Material.Air, -4000)
            .Magnet(new Point(0, 0.7));
    }

    private static Curve[] Bar(Point from, Point to, double radius)
    {
        Point side = radius * (to - from).Unit().Perpendicular;
        double angle = Math.Atan2(-side.Z, -side.Y);
        CircularArc cap = new CircularArc(to, radius, angle, Math.PI).WithEnds(to - side, to + side);
        CircularArc foot = new CircularArc(from, radius, angle + Math.PI, Math.PI).WithEnds(from + side, from - side);
        return [cap, new Line(to + side, from + side), foot, new Line(from - side, to - side)];
    }
}
