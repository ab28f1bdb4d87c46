// Truth: identities of magnetostatics — energy and co-energy sum to ∫ H·B dS, which is ∫ J A dS; the co-energy's derivative
// by the current is the flux linkage; ∮ H·dl is the current enclosed — and closed forms: the energy μ0 I²/(16π) inside a
// round conductor, and energy and flux of a steel ring round it, where H = I/(2πr) whatever the curve.
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Numerics;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class EnergyTests(VerificationRecord record)
{
    private const double Current = 1000;
    private static readonly Aperture Beam = Drawn.Beam(0, 25, 4, 2);

    private static readonly VerificationCase Identities = new(
        "Identities of energy and circulation, steel ring with return, 1000 A",
        "W + W' = ∫ H·B dS = ∫ J A dS; dW'/dI is the flux linkage; ∮ H·dl the enclosed current.");

    private static readonly VerificationCase Stored = new(
        "Energy and ampere-turns of a steel ring, built-in curve mild-steel, 1000 A", "Closed form: H = I/(2πr), ∫∫ H dB dS by quadrature.");

    [Fact]
    public void CoEnergyIsTheIntegralOfTheLinkage()
    {
        const double change = 0.01;

        (SolvedMagnet solved, FieldState state) = Ring(1.0);
        (double energy, double linkage) = Circuit.Energies(solved.Solution);
        double up = -Ring(1 + change).State.Energy;
        double down = -Ring(1 - change).State.Energy;

        // The residual vanishes along A itself to the square of Newton's last decrement; the energies agree to rounding.
        record.Check(Identities, "∫ J A dS against ∫ H·B dS, J/m", state.FieldProduct, linkage, Allowed.Relative(1e-9, "Newton's last step, rounding"));
        record.Check(Identities, "energy and co-energy against ∫ H·B dS, J/m", state.FieldProduct, energy - state.Energy, Allowed.Relative(1e-9, "Newton's last step, rounding"));

        // The central difference leaves out the third derivative: (change)²/6 of a number of order one.
        record.Check(Identities, "dW'/dI against the flux linkage, Wb/m", linkage / Current, (up - down) / (2 * change * Current), Allowed.Relative(change * change / 6, "third derivative left out"));
    }

    [Fact]
    public void RingAndConductorStoreTheClosedFormsEnergy()
    {
        SolvedMagnet solved = Ring(1.0).Solved;
        MagneticLaw law = MaterialLibrary.Get("mild-steel").Law;
        double energy = 0, flux = 0;
        GaussRule rule = GaussRule.Legendre(8);
        const int pieces = 200;
        for (int i = 0; i < pieces * rule.Nodes.Length; i++)
        {
            double r = 0.010 + (0.010 * ((i / rule.Nodes.Length) + rule.Nodes[i % rule.Nodes.Length]) / pieces);
            double w = 0.010 / pieces * rule.Weights[i % rule.Nodes.Length];
            double b = law.FluxDensityAt(Current / (Math.Tau * r));
            energy += w * Math.Tau * r * law.At(b).Energy;
            flux += w * b;
        }

        var local = new OneOrderUp(solved);
        record.Check(Stored, "energy in the ring, J/m", energy, local.Of(s => EnergyIn(s, 0)));
        record.Check(Stored, "∫ H·B in the ring by the ampere-turns it is said to spend, J/m", Current * flux, local.Of(s => PartReports.Of(s)[0].MmfDrop!.Value * Circuit.Energies(s).Linkage / Current));
        record.Check(Stored, "energy in the conductor, J/m", PhysicalConstants.Mu0 * Current * Current / (16 * Math.PI), local.Of(s => EnergyIn(s, 1)));
    }

    [Fact]
    public void CirculationRoundAConductorIsItsCurrent() => record.Check(
        Identities, "∮ H·dl on an off-centre circle, A", Current, new OneOrderUp(Ring(1.0).Solved).Of(Circulation));

    private static double Circulation(FieldSolution solution)
    {
        GaussRule rule = GaussRule.Legendre(6);
        double sum = 0;
        const int pieces = 180;
        for (int i = 0; i < pieces * rule.Nodes.Length; i++)
        {
            // Off the centre and in air: not a line of the field.
            double angle = Math.Tau * ((i / rule.Nodes.Length) + rule.Nodes[i % rule.Nodes.Length]) / pieces;
            FieldSample s = solution.At(new Point(0.003, 0) + Point.Polar(0.0055, angle))!.Value;
            sum += rule.Weights[i % rule.Nodes.Length] * Math.Tau * 0.0055 / pieces * new Point(s.By, s.Bz).Dot(Point.Polar(1, angle).Perpendicular);
        }

        return PhysicalConstants.Nu0 * sum;
    }

    private static (SolvedMagnet Solved, FieldState State) Ring(double factor)
    {
        Magnet magnet = new Drawn()
            .Circle("RING", 0, 0, 20).Circle("RING", 0, 0, 10).Circle("WIRE", 0, 0, 2)
            .Circle("RETURN", 0, 0, 32).Circle("RETURN", 0, 0, 30)
            .Part("RING", MaterialLibrary.Get("mild-steel")).Part("WIRE", Material.Air, Current).Part("RETURN", Material.Air, -Current)
            .Magnet().WithCurrentsScaled(factor);
        SolvedMagnet solved = MagnetSolver.Solve(magnet, Beam, new SolveOptions { Accuracy = 1e-5 });
        return (solved, new FieldEquations(solved.Solution.Problem).Evaluate(solved.Solution.Potential));
    }

    internal static double EnergyIn(FieldSolution solution, int part)
    {
        FiniteElementSpace space = solution.Problem.Space;
        var table = new ShapeTable(space.Reference, TriangleQuadrature.Collapsed(6));
        double energy = 0;
        for (int e = 0; e < space.ElementCount; e++)
        {
            int region = space.Mesh.Regions[e];
            if (region < 0 || solution.Magnet.Section.Regions[region].Part != part)
            {
                continue;
            }

            for (int q = 0; q < table.Count; q++)
            {
                FieldSample s = solution.Sample(e, table.Quadrature.Xi[q], table.Quadrature.Eta[q]);
                energy += table.Quadrature.Weights[q] * space.JacobianAt(e, table.XiRow(q), table.EtaRow(q)).Determinant
                    * solution.Problem.PhysicsOf(e).Law.At(s.Magnitude).Energy;
            }
        }

        return energy;
    }
}
