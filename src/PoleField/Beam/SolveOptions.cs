using PoleField.Magnetostatics;

namespace PoleField.Beam;

/// <summary>How to solve.</summary>
public sealed record SolveOptions
{
    /// <summary>Relative accuracy of field and gradient over the aperture, 1e-7 to 1e-2.</summary>
    public double Accuracy { get; init; } = 1e-4;

    /// <summary>Order of the elements, 2 to 4.</summary>
    public int Order { get; init; } = 3;

    /// <summary>Most refined meshes.</summary>
    public int MostAdaptiveSteps { get; init; } = 12;

    /// <summary>
    /// Memory a solve takes for each unknown of its mesh, bytes, the error estimate in the next order included: 2,700 measured at
    /// 2e5 unknowns (saturated pole pair, order 3), more on larger meshes as the factor grows.
    /// </summary>
    public const int BytesPerUnknown = 4000;

    /// <summary>Most unknowns: a first mesh with more is refused, refinement ends before it.</summary>
    public int MostUnknowns { get; init; } = 3_000_000;

    /// <summary>Threads, at least 1.</summary>
    public int Threads { get; init; } = Environment.ProcessorCount;
}

/// <summary>One line of progress: what is being done and how far it is.</summary>
/// <param name="What">"mesh", "solve", "estimate", ...</param>
/// <param name="AdaptiveStep">Number of the mesh, from 1; 0 where there is none.</param>
/// <param name="Unknowns">Unknowns, 0 while unknown.</param>
/// <param name="NewtonStep">Newton step within the solve.</param>
/// <param name="Residual">Relative size of the last Newton step; not a number before the first.</param>
/// <param name="Accuracy">Relative error bar of the last mesh; not a number before the first.</param>
public readonly record struct SolveProgress(
    string What, int AdaptiveStep, int Unknowns, int NewtonStep, double Residual, double Accuracy)
{
    /// <summary>Progress of something that is no solve.</summary>
    public static SolveProgress Of(string what) => new(what, 0, 0, 0, double.NaN, double.NaN);

    /// <summary>The same as part of something larger.</summary>
    public SolveProgress Within(string whole) => this with { What = $"{whole}: {What}" };
}

/// <summary>A solved magnet: the field everywhere, the beam's field and the report.</summary>
/// <param name="Solution">Finite-element solution.</param>
/// <param name="Field">Exactly harmonic field in the aperture.</param>
/// <param name="Report">The answer.</param>
/// <param name="Record">How it was reached.</param>
public sealed record SolvedMagnet(FieldSolution Solution, BeamField Field, BeamReport Report, SolveRecord Record);
