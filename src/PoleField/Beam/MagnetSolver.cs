using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Beam;

/// <summary>Mesh, solve, estimate, refine until the asked accuracy is reached.</summary>
public static class MagnetSolver
{
    /// <summary>Solves a magnet for the beam in an aperture.</summary>
    /// <exception cref="InputException">
    /// The aperture touches something that is not air, or lies outside the model; or the mesh has more unknowns than allowed.
    /// </exception>
    /// <exception cref="MeshingException">The section cannot be meshed.</exception>
    /// <exception cref="FieldNotConvergedException">The field did not converge.</exception>
    public static SolvedMagnet Solve(
        Magnet magnet,
        Aperture aperture,
        SolveOptions? options = null,
        Action<SolveProgress>? progress = null,
        CancellationToken cancellation = default)
    {
        var settings = new RunSettings(options ?? new SolveOptions(), progress, cancellation);
        return new AdaptiveRun(magnet, BeamPlace.In(magnet, aperture), settings).ToAccuracy();
    }

    /// <summary>
    /// Solves other currents, materials or background on the mesh of a solved magnet of the same section, starting from its
    /// field. Nothing is refined: the record says which accuracy the mesh gives.
    /// </summary>
    /// <param name="magnet">Magnet with the section of <paramref name="near"/>.</param>
    /// <param name="near">A solved magnet whose field is not far off.</param>
    /// <param name="options">As for <see cref="Solve"/>; the order may differ.</param>
    /// <param name="progress">Called at each step.</param>
    /// <param name="cancellation">Checked at each step.</param>
    /// <exception cref="ArgumentException">The sections differ.</exception>
    /// <exception cref="FieldNotConvergedException">The field did not converge.</exception>
    public static SolvedMagnet SolveOnMeshOf(
        Magnet magnet,
        SolvedMagnet near,
        SolveOptions? options = null,
        Action<SolveProgress>? progress = null,
        CancellationToken cancellation = default) =>
        SolveOnMeshOf(magnet, near, 1.0, new RunSettings(options ?? new SolveOptions(), progress, cancellation));

    /// <inheritdoc cref="SolveOnMeshOf(Magnet, SolvedMagnet, SolveOptions?, Action{SolveProgress}?, CancellationToken)"/>
    /// <param name="magnet">Magnet with the section of <paramref name="near"/>.</param>
    /// <param name="near">A solved magnet.</param>
    /// <param name="scale">Newton starts at this many times the potential of <paramref name="near"/>.</param>
    /// <param name="settings">Options, progress and cancellation.</param>
    internal static SolvedMagnet SolveOnMeshOf(Magnet magnet, SolvedMagnet near, double scale, RunSettings settings)
    {
        if (!ReferenceEquals(magnet.Section, near.Solution.Magnet.Section))
        {
            throw new ArgumentException("A mesh serves only the section it was made for.", nameof(magnet));
        }

        return new AdaptiveRun(magnet, BeamPlace.In(magnet, near.Field.Aperture), settings).OnMeshOf(near.Solution, scale);
    }
}
