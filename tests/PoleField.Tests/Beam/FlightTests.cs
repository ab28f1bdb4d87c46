// Truth: closed forms: a uniform gradient moves a particle by μ G L (L/2 + D)/(m v²); an effusive thin beam in it has the
// density ∝ s⁻³ exp(−s_α/s) with its peak at s_α/3, s_α = μ G L (L/2 + D)/(2kT); Breit and Rabi's formula against an
// independent table of its values; Langevin's function; worked examples for potassium, silver and cobalt clusters.
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Materials;
using PoleField.Tests.Verification;
using Xunit;

namespace PoleField.Tests.Beam;

public sealed class FlightTests
{
    private const double MuB = PhysicalConstants.BohrMagneton;

    [Theory]
    [InlineData(0.070, 0.32)]
    [InlineData(0.25, 0.0)]
    public void AUniformGradientMovesAParticleByTheClosedForm(double length, double drift)
    {
        const double gradient = 150, speed = 600;
        double mass = 39 * PhysicalConstants.AtomicMass;
        var trajectory = new Trajectory(Quadrupole(gradient), mass, length, drift);

        double moved = trajectory.At(Start, speed, _ => MuB)!.Value.Z - Start.Z;

        double exact = MuB * gradient * length * ((length / 2) + drift) / (mass * speed * speed);
        Assert.Equal(1.0, moved / exact, 1e-6);
    }

    [Fact]
    public void TheIntegratorIsOfFourthOrderInANonuniformGradient()
    {
        FlightField wires = FlightField.Over(
            new Box(new Point(-0.001, 0.003), new Point(0.001, 0.008)), new TwoWireField(0.003, default, 20_000).At);
        var trajectory = new Trajectory(wires, 7 * PhysicalConstants.AtomicMass, 0.12, 0.1);
        Point from = new(0.0004, 0.0045);
        Point At(int steps) => trajectory.At(from, 900, _ => -MuB, steps)!.Value;

        double coarse = At(4).DistanceTo(At(64));
        double fine = At(8).DistanceTo(At(64));

        Assert.InRange(Math.Log2(coarse / fine), 3.4, 5.5);
        Assert.InRange(fine / At(64).DistanceTo(from), 0, 1e-5);
    }

    [Fact]
    public void TheTableIsTheFieldItIsMadeFromWithinItsOwnError()
    {
        var wires = new TwoWireField(0.003, default, 20_000);
        var room = new Box(new Point(-0.001, 0.0033), new Point(0.001, 0.005));
        FlightField table = FlightField.Over(room, wires.At, 2);
        double field = wires.At(new Point(0, 0.0033)).Field;
        var random = new Random(5);
        double worst = 0;
        for (int k = 0; k < 500; k++)
        {
            Point p = room.Min + new Point(random.NextDouble() * room.Width, random.NextDouble() * room.Height);
            worst = Math.Max(worst, Math.Abs(table.At(p).Field - wires.At(p).Field) / field);
            Assert.Equal(1.0, table.At(p).Gradient / wires.At(p).Gradient, 1e-6);
        }

        Assert.InRange(worst, 0, table.Error);
        Assert.InRange(table.Error, 1e-16, 1e-6); // of a field as smooth as this
    }

    [Fact]
    public void TheTableSaysWhenAFieldIsTooSharpForIt()
    {
        // A wire a hair's breadth beside the room: no table of this size can follow.
        var wires = new TwoWireField(0.001001, default, 20_000);

        FlightField table = FlightField.Over(new Box(new Point(-0.001, -0.001), new Point(0.001, 0.001)), wires.At);

        Assert.True(table.Error > 1e-4);
    }

    // Smallest and largest |μ|/μB of the non-stretched states, computed apart from this program.
    [Theory]
    [InlineData("H-1", 0.05, 0.70309, 0.70309)]
    [InlineData("Na-23", 0.1, 0.78158, 0.92436)]
    [InlineData("K-39", 0.3, 0.99964, 1.00008)]
    [InlineData("Rb-87", 0.3, 0.64532, 0.89527)]
    [InlineData("Cs-133", 1.0, 0.94625, 0.98643)]
    [InlineData("Cu-63", 0.3, 0.24277, 0.81554)]
    [InlineData("Ag-107", 0.05, 0.63400, 0.63400)]
    public void HyperfineMomentsAreBreitAndRabis(string name, double field, double smallest, double largest)
    {
        Atom atom = Atom.Find(name)!;
        Species species = atom.ToSpecies();
        double[] free = [.. species.States.Select(s => Math.Abs(s.Moment(field)) / MuB)
            .Where(m => Math.Abs(m - (atom.ElectronG / 2)) > 1e-12)];

        Assert.Equal(2 * ((2 * atom.NuclearSpin) + 1), species.States.Count);
        Assert.Equal(species.States.Count - 2, free.Length);
        Assert.Equal(1.0, species.States.Sum(s => s.Share), 1e-12);
        Assert.Equal(smallest, free.Min(), 6e-6);
        Assert.Equal(largest, free.Max(), 6e-6);
        Assert.Equal(0.0, species.States.Sum(s => s.Moment(field)) / MuB, 1e-12); // no mean moment: as many up as down
    }

    [Theory]
    [InlineData("K-39", 0.016476)]
    [InlineData("Cs-133", 0.327980)]
    public void CriticalFieldsAreTheTabulatedOnes(string name, double field) =>
        Assert.Equal(field, Atom.Find(name)!.CriticalField, 1e-6);

    [Fact]
    public void RelaxedClustersHaveLangevinsMoment()
    {
        Species cobalt = Species.Relaxed(50 * 58.933 * PhysicalConstants.AtomicMass, 100 * MuB, 100);
        MomentState state = Assert.Single(cobalt.States);

        Assert.Equal(21.74, state.Moment(1.0) / MuB, 0.01);
        Assert.Equal(100 * MuB / (3 * PhysicalConstants.Boltzmann * 100) * 1e-3 * 100 * MuB, state.Moment(1e-3), 1e-6 * state.Moment(1e-3));
        Assert.Equal(state.Moment(0.0298), state.Moment(0.0297) * 298 / 297, 1e-5 * state.Moment(0.0298)); // no step where the series ends

    }

    // Fifty cobalt atoms of 2 muB each at 100 K in 1 T, 300 T/m over 0.25 m, drift 1 m. Flown in a hundredth of the gradient,
    // so that the field a cluster meets stays 1 T: a hundredth of the deflection.
    [Theory]
    [InlineData(600, 9.66)]
    [InlineData(1019.1, 3.35)]
    public void ClustersFlyAsFarAsTheirMeanMomentSays(double speed, double expectedMillimetres)
    {
        const double gradient = 3;
        Species cobalt = Species.Relaxed(50 * 58.933 * PhysicalConstants.AtomicMass, 100 * MuB, 100);
        var start = new Point(0, 1 / gradient);
        FlightField field = FlightField.Over(new Box(start - new Point(1e-3, 1e-3), start + new Point(1e-3, 1e-3)), Linear(gradient));

        double moved = new Trajectory(field, cobalt.Mass, 0.25, 1.0).At(start, speed, cobalt.States[0].Moment)!.Value.Z - start.Z;

        Assert.Equal(expectedMillimetres, 1e3 * 100 * moved, 0.01);
    }

    // Potassium at 478.15 K, 70 mm and 320 mm: s_α of the closed form in mm.
    [Theory]
    [InlineData(58.4, 1.019)]
    [InlineData(164.2, 2.866)]
    [InlineData(200, 3.491)]
    [InlineData(298.6, 5.212)]
    public void AThinEffusiveBeamPeaksAtAThirdOfTheMeanDeflection(double gradient, double expected)
    {
        double mass = Atom.Find("K-39")!.Mass;
        FlightSetup setup = Setup(Species.WithFixedMoment(mass, MuB), SpeedDistribution.Effusive(478.15, mass)) with { SlitHeight = 1e-6 };

        FlightReport flight = Flight.Through(Quadrupole(gradient), Thin, Start, setup, 2);

        double scale = MuB * gradient * setup.Lever / (2 * PhysicalConstants.Boltzmann * 478.15);
        Assert.Equal(expected, 1e3 * scale, 1e-3);
        Assert.Equal(1.0, flight.Splitting!.Value / (2 * scale / 3), 0.015);
        Assert.Equal(2.0 / 3, flight.Strongest.AtMostProbable!.Value / scale, 1e-4);  // α² / (3α²/2)

        // The density itself, one side of it: half the beam, s⁻³ exp(−s_α/s)·s_α².
        foreach (PatternPoint p in flight.Pattern.Where(p => p.Z > 0.2 * scale && p.Z < 2 * scale))
        {
            double exact = 0.5 * scale * scale / (p.Z * p.Z * p.Z) * Math.Exp(-scale / p.Z);
            Assert.Equal(exact, p.Intensity, 0.01 / scale);
        }
    }

    [Fact]
    public void SilverOfTheFirstApparatusSplitsByAFifthOfAMillimetre()
    {
        // 35 mm, 1000 T/m, 1273 K, no drift; m v² = 3kT is the most probable speed of the flux. ±0.108 mm.
        double mass = Atom.Find("Ag-107")!.Mass;
        FlightSetup setup = Setup(Species.WithFixedMoment(mass, MuB), SpeedDistribution.Effusive(1273, mass)) with
        {
            Length = 0.035,
            Drift = 0,
        };

        FlightReport flight = Flight.Through(Quadrupole(1000), Thin, Start, setup);

        Assert.Equal(0.108e-3, flight.Strongest.AtMostProbable!.Value, 0.0005e-3);
    }

    [Fact]
    public void ThePatternHoldsTheWholeBeamThatArrives()
    {
        double mass = Atom.Find("K-39")!.Mass;
        FlightSetup setup = Setup(Atom.Find("K-39")!.ToSpecies(), SpeedDistribution.Narrow(900, 0.05));

        FlightReport flight = Flight.Through(Quadrupole(150), Thin, Start, setup);

        double bin = flight.Pattern[1].Z - flight.Pattern[0].Z;
        Assert.Equal(0.0, flight.ClippedShare, 1e-12);
        Assert.Equal(1.0, flight.Pattern.Sum(p => p.WithoutField) * bin, 1e-9);
        Assert.InRange(flight.Pattern.Sum(p => p.Intensity) * bin, 0.95, 1.0 + 1e-9);
        double one = MuB * 2.002294 / 2 * 150 * setup.Lever / (mass * 900 * 900);
        Assert.Equal(1.0, flight.Splitting!.Value / (2 * one), 0.01);
    }

    [Fact]
    public void WhatHitsTheWallIsCountedAsClipped()
    {
        // Pulled particles slower than √(μ G L² / 2 m h) reach the wall at height h inside the magnet: u of the flux below it.
        double mass = Atom.Find("K-39")!.Mass;
        const double gradient = 300, wall = 0.3e-3;
        FlightSetup setup = Setup(Species.WithFixedMoment(mass, MuB), SpeedDistribution.Effusive(478.15, mass)) with
        {
            SlitHeight = 1e-6,
            SlitWidth = 1e-6,
        };
        var room = new Box(Start - new Point(0.001, wall), Start + new Point(0.001, wall));

        FlightReport flight = Flight.Through(FlightField.Over(room, Linear(gradient)), Thin, Start, setup);

        double u = MuB * gradient * setup.Length * setup.Length / (2 * wall) / (2 * PhysicalConstants.Boltzmann * 478.15);
        Assert.Equal(1 - ((1 + u) * Math.Exp(-u)), flight.ClippedShare, 2e-4);
    }

    [Fact]
    public void ARealMagnetIsFlownThroughAsItsGradientSays()
    {
        SolvedMagnet solved = MagnetSolver.Solve(
            new Drawn()
                .Circle("WIRE RIGHT", 3, 0, 1.0)
                .Circle("WIRE LEFT", -3, 0, 1.0)
                .Part("WIRE RIGHT", Material.Air, 10_000)
                .Part("WIRE LEFT", Material.Air, -10_000)
                .Magnet(),
            Drawn.Beam(0, 3.6, 1, 0.1),
            new SolveOptions { Accuracy = 1e-4, Threads = 2 });
        double mass = 39 * PhysicalConstants.AtomicMass;
        FlightSetup setup = Setup(Species.WithFixedMoment(mass, MuB), SpeedDistribution.Narrow(2000, 0));

        FlightReport flight = Flight.Through(solved, setup, new SolveOptions { Threads = 1 });

        Assert.Equal(flight.Pattern, Flight.Through(solved, setup, new SolveOptions { Threads = 2 }).Pattern); // to the last bit
        Assert.True(flight.Findings.Count == 0, string.Join("\n", flight.Findings.Select(f => f.Text)));

        // So fast that the particle stays where it is: the gradient at the beam counts alone.
        double exact = MuB * new TwoWires(0.003, 10_000).Gradient(new Point(0, 0.0036)) * setup.Lever / (mass * 4e6);
        Assert.Equal(1.0, flight.States[0].AtMostProbable!.Value / exact, 0.01);
        Assert.InRange(flight.Margin, 1e-6, 3e-3);
        Assert.True(flight.RoomTo.Z > 0.0037);
        Assert.Equal(0.0, flight.ClippedShare, 1e-9);
    }

    private static Point Start => new(0, 0.02);

    private static Box Thin => new(Start - new Point(1e-9, 1e-5), Start + new Point(1e-9, 1e-5));

    private static FlightSetup Setup(Species species, SpeedDistribution speeds) =>
        new() { Species = species, Speeds = speeds, Length = 0.07, Drift = 0.32 };

    // |B| = G r: on the axis above the centre the gradient is G, along z alone.
    private static FlightField Quadrupole(double gradient) =>
        FlightField.Over(new Box(new Point(-0.001, 0.001), new Point(0.001, 0.2)), Linear(gradient));

    private static Func<Point, BeamValues> Linear(double gradient) =>
        p => new BeamValues(p, -gradient * p.Y, gradient * p.Z, 0, gradient);
}
