namespace PoleField.Beam;

/// <summary>An atom with a ²S½ ground state: everything its moment in a field depends on.</summary>
/// <param name="Name">Symbol and mass number: "K-39".</param>
/// <param name="MassUnits">Mass, u.</param>
/// <param name="NuclearSpin">Nuclear spin I, ½ or more.</param>
/// <param name="Splitting">Hyperfine splitting of the ground state, Hz.</param>
/// <param name="ElectronG">g_J.</param>
public sealed record Atom(string Name, double MassUnits, double NuclearSpin, double Splitting, double ElectronG)
{
    // Masses: atomic mass evaluation; splittings and g_J: Arimondo, Inguscio and Violino, Rev. Mod. Phys. 49 (1977) 31, and
    // later handbooks. All recalled from memory; the last digits matter for nothing here. Copper and silver g_J are rounded.
    private static readonly Atom[] Table =
    [
        new("H-1", 1.0078250319, 0.5, 1420.4057518e6, 2.002284),
        new("Li-7", 7.0160034366, 1.5, 803.5040866e6, 2.002301),
        new("Na-23", 22.989769282, 1.5, 1771.6261288e6, 2.002296),
        new("K-39", 38.9637064864, 1.5, 461.7198597e6, 2.002294),
        new("Cu-63", 62.9295977, 1.5, 11733.81739e6, 2.0022),
        new("Rb-85", 84.9117897379, 2.5, 3035.732439e6, 2.002331),
        new("Rb-87", 86.909180531, 1.5, 6834.6826109e6, 2.002331),
        new("Ag-107", 106.9050915, 0.5, 1712.512111e6, 2.00233),
        new("Ag-109", 108.9047558, 0.5, 1976.932075e6, 2.00233),
        new("Cs-133", 132.905451961, 3.5, 9192.63177e6, 2.00254),
    ];

    /// <summary>The built-in atoms, by mass.</summary>
    public static IReadOnlyList<Atom> All { get; } = Array.AsReadOnly(Table);

    /// <summary>Mass, kg.</summary>
    public double Mass => MassUnits * PhysicalConstants.AtomicMass;

    /// <summary>Field h·splitting/(g_J μB) above which the electron's moment is decoupled from the nucleus, T.</summary>
    public double CriticalField => PhysicalConstants.Planck * Splitting / (ElectronG * PhysicalConstants.BohrMagneton);

    /// <summary>The built-in atom of that name, without regard to case; null when there is none.</summary>
    public static Atom? Find(string name) => Table.FirstOrDefault(a => a.Name.Equals(name, StringComparison.OrdinalIgnoreCase));

    /// <summary>The atom as a beam species, all its states equally filled.</summary>
    public Species ToSpecies() => Species.Of(this);
}
