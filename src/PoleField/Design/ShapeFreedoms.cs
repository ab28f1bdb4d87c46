using PoleField.Drawing;

namespace PoleField.Design;

/// <summary>What may change of a section's shape: some numbers, each in a range.</summary>
internal abstract class ShapeFreedoms
{
    /// <summary>Name of each freedom; the same names, the same freedoms.</summary>
    public abstract IReadOnlyList<string> Names { get; }

    /// <summary>Smallest and largest value of each.</summary>
    public abstract IReadOnlyList<(double Low, double High)> Ranges { get; }

    /// <summary>Values of the section as it was drawn.</summary>
    public abstract double[] AsDrawn { get; }

    /// <summary>Number of freedoms.</summary>
    public int Count => Names.Count;

    /// <summary>The section for values in their ranges.</summary>
    /// <exception cref="ArgumentException">There is no such shape.</exception>
    public abstract CrossSection SectionAt(double[] values);

    /// <summary>How the curves of <see cref="SectionAt"/> move with the values.</summary>
    public abstract BoundaryVelocities VelocitiesAt(double[] values, CrossSection section);

    /// <summary>True when a hollow of the section has become too sharp for the tool.</summary>
    public virtual bool NeedsSmallerTool(CrossSection section) => false;

    /// <summary>For each face that may move its layer and how far each of its places moved.</summary>
    public abstract IReadOnlyList<FaceMoves> MovesOf(double[] values, CrossSection section);
}
