using PoleField.Cli.Case;
using PoleField.Drawing;

namespace PoleField.Cli.Sketching;

/// <summary>A dimension of a family of pole pairs as an option of the command line. Values are in the shown unit: mm, degrees, or bare.</summary>
/// <param name="Name">Option, such as "--ridge-radius".</param>
/// <param name="Meaning">What it is.</param>
/// <param name="Kind">Length, direction or ratio.</param>
/// <param name="Get">Reads it.</param>
/// <param name="Set">The family with another value.</param>
internal sealed record FamilyOption(
    string Name, string Meaning, Dimension Kind, Func<PoleFamily, double> Get, Func<PoleFamily, double, PoleFamily> Set)
{
    /// <summary>True when it grows with the family's leading length, unless it is given.</summary>
    public bool Scales { get; init; }

    /// <summary>Its name in a case file: the option without its dashes in front.</summary>
    public string Key => Name[2..];

    /// <summary>A length that keeps its proportion to the family's leading length.</summary>
    public static FamilyOption Length<T>(string name, string meaning, Func<T, double> get, Func<T, double, PoleFamily> set)
        where T : PoleFamily => Of(name, meaning, Dimension.Length, get, set) with { Scales = true };

    /// <summary>Any other dimension.</summary>
    public static FamilyOption Of<T>(string name, string meaning, Dimension kind, Func<T, double> get, Func<T, double, PoleFamily> set)
        where T : PoleFamily => new(name, meaning, kind, f => get((T)f), (f, value) => set((T)f, value));

    /// <summary>The value in the shown unit, from SI.</summary>
    public double FromSi(double value) => Kind == Dimension.Ratio ? value : Kind.Shown.FromSi(value);

    /// <summary>The value with its unit, as it would be typed.</summary>
    public string Written(PoleFamily family)
    {
        string unit = Kind == Dimension.Ratio ? string.Empty : " " + Kind.Shown.Name;
        return Text.Numbers.Short(Get(family)) + unit;
    }
}
