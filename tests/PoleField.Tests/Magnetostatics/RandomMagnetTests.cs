// Truth: laws that hold for every magnet, drawn at random — the energy falls with every Newton step (it is strictly convex and
// the steps are searched on it); ∫ H·B dS = ∫ J A dS (Green's identity where A or H vanishes on the rim); the circulation of
// H round every part is its current.
using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Meshing;
using PoleField.Tests.House;
using PoleField.Tests.Meshing;
using Xunit;

namespace PoleField.Tests.Magnetostatics;

public class RandomMagnetTests
{
    private const int MostNewtonSteps = 40;
    private const double Rounding = 1e-9;
    private const double NewtonsRemainder = 1e-7; // the last step is below 1e-6 and ends at about its square, but for kinks of a curve

    // POLEFIELD_RANDOM_MAGNETS asks for more of them.
    [Fact]
    public void RandomMagnetsKeepTheLaws()
    {
        int count = RandomRuns.Count("POLEFIELD_RANDOM_MAGNETS", 60);
        string[] broken = [.. Enumerable.Range(0, count).Select(FaultOf).Where(fault => fault.Length > 0)];

        Assert.True(broken.Length == 0, FormattableString.Invariant($"{broken.Length} of {count}: {string.Join("\n", broken.Take(20))}"));
    }

    private static string FaultOf(int seed)
    {
        using CancellationTokenSource late = new(TimeSpan.FromMinutes(2));
        try
        {
            Magnet magnet = Draw(seed);
            Mesh mesh = Mesher.Mesh(magnet.Section, SizeField.Uniform(0.4), cancellation: late.Token);
            FiniteElementSpace space = FiniteElementSpace.Create(mesh, MeshEdges.Of(mesh), 2 + (seed % 3));
            var equations = new FieldEquations(FieldProblem.Create(magnet, space));
            (double[] potential, IReadOnlyList<NewtonStep> history) = FieldSolver.Solve(equations, cancellation: late.Token);
            Check(magnet, equations, new FieldSolution(equations.Problem, potential, history));
            return "";
        }
        catch (Exception e) when (e is Xunit.Sdk.XunitException or FieldNotConvergedException or MeshingException or OperationCanceledException)
        {
            return FormattableString.Invariant($"seed {seed}: {e.Message.ReplaceLineEndings(" ")}");
        }
    }

    private static void Check(Magnet magnet, FieldEquations equations, FieldSolution solution)
    {
        FieldState state = equations.Evaluate(solution.Potential);
        double scale = Math.Abs(state.FieldProduct);
        Assert.True(double.IsFinite(state.Energy) && solution.History.Count <= MostNewtonSteps, FormattableString.Invariant($"energy {state.Energy}, {solution.History.Count} steps"));
        for (int k = 1; k < solution.History.Count; k++)
        {
            double rise = solution.History[k].Energy - solution.History[k - 1].Energy;
            Assert.True(rise <= Rounding * (scale + Math.Abs(state.Energy)), FormattableString.Invariant($"step {k} raises the energy by {rise} of {state.Energy}"));
        }

        if (magnet.Roles.All(r => r.Remanence == default))
        {
            double linkage = Circuit.Energies(solution).Linkage;
            Assert.True(Math.Abs(linkage - state.FieldProduct) <= NewtonsRemainder * scale, FormattableString.Invariant($"∫ J A = {linkage}, ∫ H·B = {state.FieldProduct}"));
        }

        // A function that is 1 on a part and all within it and 0 on the vertices away from it gathers the part's equations:
        // the circulation of H round it less its current. √(∫H·B/μ0) is a magnet's own unit of ampere-turns.
        double unit = Math.Sqrt(scale / PhysicalConstants.Mu0) + magnet.Roles.Max(r => Math.Abs(r.AmpereTurns));
        for (int region = 1; region < magnet.Section.Regions.Count; region++)
        {
            double excess = ResidualWithin(equations.Problem.Space, state.Residual, region);
            Assert.True(Math.Abs(excess) <= NewtonsRemainder * unit, FormattableString.Invariant($"circulation round region {region} is off by {excess} A of {unit} A"));
        }
    }

    private static double ResidualWithin(FiniteElementSpace space, double[] residual, int region)
    {
        var inside = new bool[space.NodeCount];
        for (int e = 0; e < space.ElementCount; e++)
        {
            if (space.Mesh.Regions[e] == region)
            {
                foreach (int node in space.NodesOf(e))
                {
                    inside[node] = true;
                }
            }
        }

        return Enumerable.Range(0, residual.Length).Where(n => inside[n]).Sum(n => residual[n]);
    }

    // Currents sum to nothing, so that the energy of open surroundings is finite.
    private static Magnet Draw(int seed)
    {
        var random = new Random(seed);
        CrossSection section = RandomSection.Make(seed);
        PartRole[] roles = [.. section.Parts.Select(name => Role(random, name))];
        int[] coils = [.. Enumerable.Range(0, roles.Length).Where(k => roles[k].AmpereTurns != 0)];
        if (coils.Length == 1 && !section.HasRim)
        {
            roles[coils[0]] = roles[coils[0]] with { AmpereTurns = 0 };
        }
        else if (coils.Length > 1)
        {
            roles[coils[^1]] = roles[coils[^1]] with { AmpereTurns = -coils.SkipLast(1).Sum(k => roles[k].AmpereTurns) };
        }

        return new Magnet { Section = section, Roles = roles };
    }

    private static PartRole Role(Random random, string name)
    {
        // Currents over six decades: from the curves' first rows to fields no magnet has.
        double current = Math.Pow(10, 1 + (6 * random.NextDouble())) * (random.Next(2) == 0 ? 1 : -1);
        return random.Next(8) switch
        {
            0 or 1 or 2 => new PartRole(name, Material.Air) { AmpereTurns = current },
            3 => new PartRole(name, new Material("linear", new LinearLaw(Math.Pow(10, 5 * random.NextDouble())), "", "", "")),
            4 => new PartRole(name, Material.Air) { Remanence = Point.Polar(1.4 * random.NextDouble(), Math.Tau * random.NextDouble()) },
            _ => new PartRole(name, MaterialLibrary.Get(MaterialLibrary.Names[random.Next(MaterialLibrary.Names.Count)])),
        };
    }
}
