using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>What the case asks of the drawing.</summary>
public sealed record SectionRequest
{
    /// <summary>Layers that are parts, in the order of the case file.</summary>
    public required IReadOnlyList<string> PartLayers { get; init; }

    /// <summary>Group key per part layer (its material): parts of equal key may overlap or touch without fault. Same order as <see cref="PartLayers"/>.</summary>
    public required IReadOnlyList<string> MaterialKeys { get; init; }

    /// <summary>Layer of the beam's closed outline, if the sketch holds it.</summary>
    public string? BeamLayer { get; init; }

    /// <summary>Layer of the closed outline that bounds the model, if the surroundings are not open.</summary>
    public string? RimLayer { get; init; }

    /// <summary>The sketch shows y ≥ 0 only and is completed by its mirror image.</summary>
    public bool MirrorLeftRight { get; init; }

    /// <summary>Part layers that carry current: in a half model they must keep clear of y = 0.</summary>
    public IReadOnlyList<string> CurrentLayers { get; init; } = [];

    /// <summary>End points closer than this are one point, metres.</summary>
    public double Join { get; init; } = 2e-6;
}

/// <summary>A part as the drawing shows it.</summary>
/// <param name="Layer">Layer.</param>
/// <param name="Outlines">Number of closed outlines.</param>
/// <param name="Area">Exact area, m², holes and enclosed other parts subtracted.</param>
/// <param name="Bounds">Box around it, metres.</param>
public sealed record PartShape(string Layer, int Outlines, double Area, Box Bounds);

/// <summary>What became of a sketch: the section when it is sound, and in any case all that was seen.</summary>
public sealed record SectionReading
{
    /// <summary>The section; null when <see cref="Findings"/> holds a fault.</summary>
    public CrossSection? Section { get; init; }

    /// <summary>The beam's outline, when the request named its layer and it is sound.</summary>
    public Outline? Beam { get; init; }

    /// <summary>The parts that were found, as far as they are sound.</summary>
    public required IReadOnlyList<PartShape> Parts { get; init; }

    /// <summary>Layers that hold curves and were not asked for, with their numbers of curves.</summary>
    public required IReadOnlyList<(string Layer, int Curves)> IgnoredLayers { get; init; }

    /// <summary>Everything healed (notes), doubtful (warnings) and wrong (faults).</summary>
    public required IReadOnlyList<Finding> Findings { get; init; }

    /// <summary>True when there is a section to work with.</summary>
    public bool IsSound => Section is not null;
}
