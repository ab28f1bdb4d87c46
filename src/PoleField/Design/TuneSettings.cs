using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Design;

/// <summary>What may move, what is wanted, what must hold.</summary>
public sealed record TuneSettings
{
    /// <summary>Faces that may move.</summary>
    public required IReadOnlyList<TuneStretch> Stretches { get; init; }

    /// <summary>Largest normal move, metres.</summary>
    public required double Reach { get; init; }

    /// <summary>Modes per stretch.</summary>
    public int Freedoms { get; init; } = 12;

    /// <summary>Smallest radius of concave curvature that a tool can cut, metres; 0 for any.</summary>
    public double SmallestRadius { get; init; }

    /// <summary>Make |B|·G uniform instead of G.</summary>
    public bool OfProduct { get; init; }

    /// <summary>The size of the gradient at the beam must not fall below this, T/m; 0 for any.</summary>
    public double LeastGradient { get; init; }

    /// <summary>The clearance must not fall below this, metres; 0 for any.</summary>
    public double LeastClearance { get; init; }

    /// <summary>Most steps.</summary>
    public int MostSteps { get; init; } = 14;

    /// <summary>Threads, at least 1.</summary>
    public int Threads { get; init; } = 1;
}

/// <summary>A layer's air-facing outline near the beam, or the stretch of it between two places.</summary>
/// <param name="Layer">Layer.</param>
/// <param name="From">One end, metres; null for all that matters to the beam.</param>
/// <param name="To">The other end, metres.</param>
public sealed record TuneStretch(string Layer, Point? From = null, Point? To = null);

/// <summary>One step of tuning.</summary>
/// <param name="Number">From 0, the start.</param>
/// <param name="Rms">Rms over the aperture of what is tuned.</param>
/// <param name="Gradient">At the beam, T/m.</param>
/// <param name="Clearance">Metres.</param>
/// <param name="Accepted">False when the step was taken back.</param>
public readonly record struct TuneStep(int Number, double Rms, double Gradient, double Clearance, bool Accepted);

/// <summary>Outward move at a place of a face as it was.</summary>
/// <param name="ArcLength">Along the face, metres.</param>
/// <param name="At">Place on the old face, metres.</param>
/// <param name="Outward">Unit normal of the old face.</param>
/// <param name="Move">Outward move, metres.</param>
public readonly record struct FaceMove(double ArcLength, Point At, Point Outward, double Move);

/// <summary>A tuned magnet, not yet solved to full accuracy.</summary>
/// <param name="Magnet">The magnet with its new faces.</param>
/// <param name="Steps">History.</param>
/// <param name="Solves">Number of field solves.</param>
/// <param name="Moves">For each stretch its layer and moves.</param>
public sealed record TuneResult(
    Magnet Magnet, IReadOnlyList<TuneStep> Steps, int Solves, IReadOnlyList<(string Layer, IReadOnlyList<FaceMove> Points)> Moves);
