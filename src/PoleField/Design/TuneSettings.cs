using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Design;

/// <summary>What may move, what is wanted, what must hold.</summary>
public sealed record TuneSettings
{
    /// <summary>Faces that may move; empty when dimensions are tuned.</summary>
    public IReadOnlyList<TuneStretch> Stretches { get; init; } = [];

    /// <summary>Dimensions that may change instead of faces; null for faces.</summary>
    public DrawnDimensions? Dimensions { get; init; }

    /// <summary>Largest normal move of faces, metres.</summary>
    public double Reach { get; init; } = 0.4e-3;

    /// <summary>Modes per stretch.</summary>
    public int Freedoms { get; init; } = 12;

    /// <summary>Smallest radius of concave curvature that a tool can cut, metres; 0 for any.</summary>
    public double SmallestRadius { get; init; }

    /// <summary>Make |B|·G uniform instead of G.</summary>
    public bool OfProduct { get; init; }

    /// <summary>What must hold.</summary>
    public IReadOnlyList<TuneHold> Holds { get; init; } = [];

    /// <summary>Where an earlier run stopped; null to start from the section as drawn.</summary>
    public TuneState? Start { get; init; }

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

/// <summary>Dimensions and the drawing they make.</summary>
/// <param name="Each">The dimensions that may change.</param>
/// <param name="Draw">
/// Section for values of them, in their order. Curves and their parameters must follow the values smoothly. It throws
/// <see cref="InputException"/> for values that make no drawing.
/// </param>
public sealed record DrawnDimensions(IReadOnlyList<TuneDimension> Each, Func<IReadOnlyList<double>, CrossSection> Draw);

/// <summary>A dimension that may change.</summary>
/// <param name="Name">Name.</param>
/// <param name="Value">As drawn, in a unit of its own.</param>
/// <param name="Low">Smallest value.</param>
/// <param name="High">Largest value.</param>
public sealed record TuneDimension(string Name, double Value, double Low, double High);

/// <summary>How a dimension changed, in its own unit.</summary>
/// <param name="Name">Name.</param>
/// <param name="Before">As drawn.</param>
/// <param name="After">Tuned.</param>
public sealed record TunedDimension(string Name, double Before, double After);

/// <summary>What tuning keeps on one side of a bound.</summary>
public enum HeldQuantity
{
    /// <summary>|B| at the beam's centre, T.</summary>
    Field,

    /// <summary>Size of the gradient at the beam's centre, T/m.</summary>
    Gradient,

    /// <summary>Smallest distance from the aperture to a part, metres.</summary>
    Clearance,

    /// <summary>Largest flux density in iron, T.</summary>
    IronField,
}

/// <summary>A bound that tuning keeps.</summary>
/// <param name="Of">What is bounded.</param>
/// <param name="AtLeast">True for a lower bound.</param>
/// <param name="Bound">The bound, &gt; 0; SI.</param>
public sealed record TuneHold(HeldQuantity Of, bool AtLeast, double Bound);

/// <summary>Where tuning stands: enough to go on from it.</summary>
/// <param name="Names">The freedoms.</param>
/// <param name="Values">Their values.</param>
/// <param name="Damping">Of the next step.</param>
/// <param name="Steps">History.</param>
/// <param name="Solves">Number of field solves.</param>
public sealed record TuneState(
    IReadOnlyList<string> Names, IReadOnlyList<double> Values, double Damping, IReadOnlyList<TuneStep> Steps, int Solves);

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

/// <summary>How a stretch of face moved.</summary>
/// <param name="Layer">Layer.</param>
/// <param name="Points">Its places in rising arc length.</param>
public sealed record FaceMoves(string Layer, IReadOnlyList<FaceMove> Points);

/// <summary>A tuned magnet, not yet solved to full accuracy.</summary>
public sealed record TuneResult
{
    /// <summary>The magnet with its new shape.</summary>
    public required Magnet Magnet { get; init; }

    /// <summary>Where tuning ended, with its history.</summary>
    public required TuneState State { get; init; }

    /// <summary>How each face moved.</summary>
    public required IReadOnlyList<FaceMoves> Moves { get; init; }

    /// <summary>How each dimension changed; empty when faces were tuned.</summary>
    public IReadOnlyList<TunedDimension> Dimensions { get; init; } = [];

    /// <summary>What kept it from becoming better, in words; never empty.</summary>
    public required IReadOnlyList<string> Limits { get; init; }

    /// <summary>True when it was stopped from outside.</summary>
    public bool Interrupted { get; init; }
}
