using PoleField.Materials;

namespace PoleField.Cli;

/// <summary>The built-in materials: all names, and a material when it is asked for, so that no run reads curves it does not use.</summary>
/// <param name="Names">Names, air first.</param>
/// <param name="Get">The material of a name in the list.</param>
internal sealed record MaterialShelf(IReadOnlyList<string> Names, Func<string, Material> Get)
{
    /// <summary>The library's own materials.</summary>
    public static MaterialShelf OfLibrary() => new(
        [Material.Air.Name, .. MaterialLibrary.Names.Where(n => n != Material.Air.Name)], MaterialLibrary.Get);

    /// <summary>A shelf of given materials.</summary>
    public static MaterialShelf Of(params IReadOnlyList<Material> materials) =>
        new([.. materials.Select(m => m.Name)], name => materials.First(m => m.Name == name));
}
