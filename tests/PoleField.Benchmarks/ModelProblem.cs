using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Meshing;
using PoleField.Tests.Meshing;
using PoleField.Tests.Verification;

namespace PoleField.Benchmarks;

/// <summary>
/// The model problem of all timings: a saturated nose and groove in one frame, in a box with A = 0 on its rim. Its field and
/// gradient at the beam are known to eight digits (order 6, 784,045 unknowns, another program in another language).
/// </summary>
internal static class ModelProblem
{
    /// <summary>Bz at the beam, T.</summary>
    public const double Field = 1.62389503;

    /// <summary>dBz/dz at the beam, T/m.</summary>
    public const double Gradient = -488.73228;

    private const double TurnsPerCoil = 1500; // A

    public static CrossSection Section { get; } = ProblemP.Section();

    public static Aperture Aperture { get; } = Aperture.Rectangle(ProblemP.Beam, 1.5e-3, 0.3e-3);

    public static Magnet Magnet { get; } = new() { Section = Section, Roles = [.. Section.Parts.Select(Role)] };

    /// <summary>The mesh that the pole's rules give, every size times a factor.</summary>
    public static Mesh Mesh(double factor) => Mesher.Mesh(
        Section, MeshSizing.For(Section, Aperture.Outline, [Section.Parts.ToList().IndexOf("iron")], factor));

    private static PartRole Role(string part) => part == "iron"
        ? new PartRole(part, new Material("saturating", new FroehlichLaw(2.15, 2000), "model", "stated", "exact"))
        : new PartRole(part, Material.Air)
        {
            AmpereTurns = part.Contains("right", StringComparison.Ordinal) ? -TurnsPerCoil : TurnsPerCoil,
        };
}
