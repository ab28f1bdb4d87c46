using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>What to write in the case file for a layer of a starting sketch.</summary>
/// <param name="Layer">Layer of the sketch.</param>
/// <param name="Material">Name of a built-in material.</param>
/// <param name="Share">Ampere-turns of each closed outline on the layer as a share of the total, positive along +x; 0 for iron.</param>
public sealed record SuggestedPart(string Layer, string Material, double Share);

/// <summary>A pole pair drawn from a closed form, with what the closed form says about it (iron of infinite permeability, faces uncut).</summary>
/// <param name="Sketch">The drawing, mm.</param>
/// <param name="Parts">Layers that are parts, with material and share of the ampere-turns.</param>
/// <param name="Beam">Beam centre, mm.</param>
/// <param name="FieldPerAmpereTurn">B at the beam centre per ampere-turn of the total, T/A.</param>
/// <param name="GradientPerField">G/B at the beam centre, 1/m, negative where the field falls with z.</param>
public sealed record StartingSketch(
    Sketch Sketch, IReadOnlyList<SuggestedPart> Parts, Point Beam, double FieldPerAmpereTurn, double GradientPerField)
{
    /// <summary>Layer of the beam's outline in every family.</summary>
    public const string BeamLayer = "BEAM";

    /// <summary>Total ampere-turns that give a field, T, at the beam centre.</summary>
    public double AmpereTurnsFor(double field) => field / FieldPerAmpereTurn;

    /// <summary>Ampere-turns of each closed outline on the part's layer that give a field, T, at the beam centre.</summary>
    public double AmpereTurnsFor(double field, SuggestedPart part) => part.Share * AmpereTurnsFor(field);
}

/// <summary>A family of pole pairs with its dimensions; drawing it checks them.</summary>
public abstract record PoleFamily
{
    private protected PoleFamily()
    {
    }

    /// <summary>Name of the family as typed by the user.</summary>
    public abstract string Name { get; }

    /// <summary>One line on the field it makes.</summary>
    public abstract string Description { get; }

    /// <summary>Draws the pair.</summary>
    /// <exception cref="InputException">Dimensions contradict each other; carries all faults.</exception>
    public abstract StartingSketch Draw();
}

/// <summary>The families by name, with dimensions to start from.</summary>
public static class PoleFamilies
{
    /// <summary>All families with their default dimensions, in the order to show them.</summary>
    public static IReadOnlyList<PoleFamily> All { get; } =
        [new TwoWirePair(), new FlatGradientPair(), new ShiftedQuadrupolePair(), new RoundWirePair()];

    /// <summary>The family of that name with default dimensions.</summary>
    /// <exception cref="InputException">There is none; lists the names.</exception>
    public static PoleFamily Get(string name) => All.FirstOrDefault(f => f.Name == name) ?? throw new InputException(
        [new Finding(Severity.Fault, "unknown-family", $"There is no pole family '{name}'.", $"Known are: {string.Join(", ", All.Select(f => f.Name))}.")]);
}
