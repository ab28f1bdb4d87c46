namespace PoleField.Cli.Case;

/// <summary>A unit by its written name: SI value = number · <paramref name="Times"/> / <paramref name="Over"/> + <paramref name="Plus"/>.</summary>
/// <remarks>Factor and divisor are whole numbers wherever they can be, so that 4.5 mm is 0.0045 m to the last bit.</remarks>
/// <param name="Name">As written; empty for a bare number.</param>
/// <param name="Times">Factor.</param>
/// <param name="Over">Divisor.</param>
/// <param name="Plus">Offset, SI.</param>
/// <param name="Listed">False for second spellings, which are read but not offered.</param>
internal sealed record Unit(string Name, double Times = 1, double Over = 1, double Plus = 0, bool Listed = true)
{
    public double ToSi(double number) => (number * Times / Over) + Plus;

    public double FromSi(double value) => (value - Plus) * Over / Times;
}

/// <summary>A kind of quantity: the units it may be written in, and the one it is shown in.</summary>
internal sealed class Dimension
{
    private Dimension(string name, string example, string shown, params Unit[] units)
    {
        Name = name;
        Example = example;
        Units = units;
        Shown = units.First(u => u.Name == shown);
    }

    public static Dimension Length { get; } = new("a length", "3 mm", "mm",
        new("um", 1, 1e6), new("mm", 1, 1e3), new("cm", 1, 100), new("m"), new("in", 254, 1e4), new("mil", 254, 1e7),
        new("\u00b5m", 1, 1e6, Listed: false), new("\u03bcm", 1, 1e6, Listed: false));

    public static Dimension Field { get; } = new("a flux density", "1.2 T", "T",
        new("T"), new("mT", 1, 1e3), new("uT", 1, 1e6), new("G", 1, 1e4), new("kG", 1, 10),
        new("\u00b5T", 1, 1e6, Listed: false), new("\u03bcT", 1, 1e6, Listed: false));

    public static Dimension Gradient { get; } = new("a field gradient", "300 T/m", "T/m",
        new("T/m"), new("mT/mm"), new("T/cm", 100), new("T/mm", 1e3), new("G/cm", 1, 100), new("kG/cm", 10));

    /// <summary>Ampere-turns may stand bare, in amperes.</summary>
    public static Dimension AmpereTurns { get; } = new("ampere-turns", "2500 A", "A",
        new("A"), new("kA", 1e3), new("mA", 1, 1e3), new(string.Empty));

    public static Dimension Current { get; } = new("a current", "2.4 kA", "A",
        new("A"), new("kA", 1e3), new("mA", 1, 1e3));

    public static Dimension CurrentDensity { get; } = new("a current density", "5 A/mm^2", "A/mm^2",
        new("A/mm^2", 1e6), new("A/cm^2", 1e4), new("A/m^2"),
        new("A/mm2", 1e6, Listed: false), new("A/mm\u00b2", 1e6, Listed: false));

    public static Dimension Temperature { get; } = new("a temperature", "478 K", "K",
        new("K"), new("degC", Plus: 273.15), new("\u00b0C", Plus: 273.15, Listed: false));

    public static Dimension Mass { get; } = new("a mass", "39 u", "u",
        new("u", PhysicalConstants.AtomicMass), new("kg"));

    public static Dimension Moment { get; } = new("a magnetic moment", "1 muB", "muB",
        new("muB", PhysicalConstants.BohrMagneton), new("J/T"),
        new("\u00b5B", PhysicalConstants.BohrMagneton, Listed: false), new("\u03bcB", PhysicalConstants.BohrMagneton, Listed: false));

    public static Dimension Speed { get; } = new("a speed", "900 m/s", "m/s",
        new("m/s"), new("km/s", 1e3));

    public static Dimension Angle { get; } = new("an angle", "0.5 mrad", "mrad",
        new("deg", Math.PI, 180), new("rad"), new("mrad", 1, 1e3), new("urad", 1, 1e6), new("\u00b5rad", 1, 1e6, Listed: false));

    /// <summary>A direction may stand bare, in degrees.</summary>
    public static Dimension Direction { get; } = new("a direction", "90 deg", "deg",
        new("deg", Math.PI, 180), new("rad"), new("mrad", 1, 1e3), new(string.Empty, Math.PI, 180));

    public static Dimension Ratio { get; } = new("a ratio", "2 %", "%",
        new("%", 1, 100), new("ppm", 1, 1e6), new(string.Empty));

    private static IReadOnlyList<Dimension> All { get; } =
        [Length, Field, Gradient, Current, CurrentDensity, Temperature, Mass, Moment, Speed, Angle, Ratio];

    /// <summary>Name with its article, for sentences.</summary>
    public string Name { get; }

    /// <summary>A value as it would be written.</summary>
    public string Example { get; }

    /// <summary>Unit that results are shown in.</summary>
    public Unit Shown { get; }

    /// <summary>All spellings.</summary>
    public IReadOnlyList<Unit> Units { get; }

    /// <summary>True when a number without unit is allowed.</summary>
    public bool AllowsBare => Units.Any(u => u.Name.Length == 0);

    /// <summary>The units to offer, as a list in words.</summary>
    public string Allowed =>
        string.Join(", ", Units.Where(u => u.Listed && u.Name.Length > 0).Select(u => u.Name)) + (AllowsBare ? ", or none" : string.Empty);

    public Unit? Find(string name) => Units.FirstOrDefault(u => u.Name == name);

    /// <summary>The kind of quantity a unit belongs to, if it belongs to any.</summary>
    public static Dimension? Owning(string unit) =>
        unit.Length == 0 ? null : All.FirstOrDefault(d => d.Find(unit) is not null);
}
