// Truth: closed forms: two opposite line currents have |B| = μ0 I a/(π (r² − a²)) on their own line, which falls as 1/r² far
// away; copper's heat ρ j² A with ρ = 1/58 µΩ·m at 20 °C, 0.393 % more per kelvin.
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Tests.Verification;
using Xunit;

namespace PoleField.Tests.Beam;

public sealed class CoilAndStrayFieldTests
{
    private static readonly Box Bounds = new(new Point(-0.05, -0.05), new Point(0.05, 0.05));

    [Theory]
    [InlineData(StrayField.ImplantLevel)]
    [InlineData(StrayField.AttractionLevel)]
    public void TwoWiresReachAsFarAsTheirClosedForm(double level)
    {
        const double a = 0.03, current = 10_000;
        double exact = Math.Sqrt((a * a) + (PhysicalConstants.Mu0 * current * a / (Math.PI * level)));

        double? reach = StrayField.Reach(p => new TwoWires(a, current).Magnitude(p), Bounds, level);

        Assert.InRange(reach!.Value, exact, 1.001 * exact);
    }

    [Fact]
    public void FarAwayAQuarterOfTheLevelReachesTwiceAsFar()
    {
        double Reach(double level) => StrayField.Reach(p => new TwoWires(0.001, 1e6).Magnitude(p), Bounds, level)!.Value;

        Assert.Equal(2.0, Reach(0.25e-3) / Reach(1e-3), 1e-3);
    }

    [Fact]
    public void AWeakFieldReachesNoFartherThanTheMagnetAndAnEndlessOneIsNotCalledSmall()
    {
        Assert.Equal(0.5 * Bounds.Diagonal, StrayField.Reach(_ => 1e-6, Bounds, 0.5e-3));
        Assert.Null(StrayField.Reach(_ => null, Bounds, 0.5e-3));
        Assert.Null(StrayField.Reach(_ => 1e-3, Bounds, 0.5e-3));
    }

    [Fact]
    public void OverTheLengthIsPerMetreTimesTheLength()
    {
        Magnet bare = new Drawn().Rectangle("COIL", 0, 0, 20, 10).Part("COIL", Material.Air, 1000).Magnet();
        Magnet magnet = bare with { Roles = [bare.Roles[0] with { Fill = 0.5 }] };
        var circuit = new CircuitReport(1000, 900, 100, 14, 4.5e-6);
        OperationSetup setup = OperationSetup.Default with { Length = 0.2, Celsius = 50, StrayLevels = [1e-3, 1e3] };

        var operation = OperationReport.Of(magnet, circuit, p => 1e-3 / (100 * p.SquaredLength), setup);

        Assert.Equal(172.4138 * 0.2, operation.OverLength(operation.ColdHeatPerMetre)!.Value, 1e-4);
        Assert.Equal(1 + (0.00393 * 30), operation.WarmHeatPerMetre!.Value / operation.ColdHeatPerMetre!.Value, 1e-9);
        Assert.Equal(4.5e-3, operation.LinkagePerMetre!.Value, 1e-12);                 // 4.5 µH/m times 1000 A
        Assert.InRange(operation.Stray[0].Distance!.Value, 0.1, 0.1001);              // 1e-3/(100 r²) = 1e-3 at 0.1 m
        Assert.False(operation.Stray[0].IsBound);
        Assert.Equal((0.5 * magnet.Section.Bounds.Diagonal, true), (operation.Stray[1].Distance!.Value, operation.Stray[1].IsBound));
        Assert.Null((operation with { Setup = OperationSetup.Default }).OverLength(14));
        Assert.Empty(OperationReport.Of(magnet with { AppliedField = new Point(0, 1e-3) }, circuit, _ => 1e-3, setup).Stray);
    }

    [Fact]
    public void HeatIsThatOfEvenCurrentInCopper()
    {
        Magnet bare = new Drawn()
            .Rectangle("COIL", 0, 0, 20, 10)
            .Rectangle("BACK", 40, 0, 20, 10)
            .Part("COIL", Material.Air, 1000)
            .Part("BACK", Material.Air, -1000)
            .Magnet();
        Magnet magnet = bare with { Roles = [bare.Roles[0] with { Fill = 0.5 }, bare.Roles[1]] };

        CoilReport coil = Assert.Single(CoilReport.Of(magnet)); // without a stated fill nothing is known

        // 1000 A in 100 mm² of copper: 10 A/mm², 1e14/58e6 W/m³ · 1e-4 m² = 172.41 W/m.
        Assert.Equal(10e6, coil.CurrentDensity, 1e-3);
        Assert.Equal(172.4138, coil.HeatPerMetre(), 1e-4);
        Assert.Equal(172.4138 * 1.2358, coil.HeatPerMetre(80), 1e-3);
        Assert.Throws<ArgumentOutOfRangeException>(() => coil.HeatPerMetre(-200));
    }
}
