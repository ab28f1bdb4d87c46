namespace PoleField.Materials;

/// <summary>What a column of a magnetisation file holds.</summary>
/// <param name="Quantity">'H' field strength, 'B' flux density, 'J' polarisation.</param>
/// <param name="Factor">Factor to A/m or T.</param>
internal readonly record struct BhColumn(char Quantity, double Factor)
{
    /// <summary>Units of field strength and their size in A/m; the oersted is 1000/(4π) A/m.</summary>
    private static IReadOnlyDictionary<string, double> FieldStrengthUnits { get; } = new Dictionary<string, double>(StringComparer.Ordinal)
    {
        ["A_per_m"] = 1,
        ["A/m"] = 1,
        ["kA_per_m"] = 1e3,
        ["kA/m"] = 1e3,
        ["A_per_cm"] = 100,
        ["A/cm"] = 100,
        ["Oe"] = 1000 / (4 * Math.PI),
        ["kOe"] = 1e6 / (4 * Math.PI),
    };

    /// <summary>Units of flux density and polarisation and their size in T.</summary>
    private static IReadOnlyDictionary<string, double> FluxDensityUnits { get; } = new Dictionary<string, double>(StringComparer.Ordinal)
    {
        ["T"] = 1,
        ["mT"] = 1e-3,
        ["G"] = 1e-4,
        ["kG"] = 0.1,
    };

    /// <summary>The units a quantity may be stated in, for messages.</summary>
    public static string UnitsOf(char quantity) => string.Join(", ", UnitTable(quantity).Keys);

    /// <summary>
    /// Reads a column's name: H, B or J and a unit, as in <c>H_A_per_m</c>, <c>H (kA/m)</c>, <c>B [T]</c>.
    /// </summary>
    /// <param name="name">The field of the header.</param>
    /// <param name="column">The column, when it is one of these with a known unit.</param>
    /// <returns>The quantity the name speaks of even if the unit is missing or unknown; null for any other column.</returns>
    public static char? TryParse(string name, out BhColumn? column)
    {
        column = null;
        string text = name.Trim();
        if (text.Length == 0 || !"HBJhbj".Contains(text[0], StringComparison.Ordinal) || (text.Length > 1 && char.IsLetterOrDigit(text[1])))
        {
            return null;
        }

        char quantity = char.ToUpperInvariant(text[0]);
        string unit = text[1..].Trim(' ', '_', '(', ')', '[', ']', '/');
        if (UnitTable(quantity).TryGetValue(unit, out double factor))
        {
            column = new BhColumn(quantity, factor);
        }

        return quantity;
    }

    private static IReadOnlyDictionary<string, double> UnitTable(char quantity) => quantity == 'H' ? FieldStrengthUnits : FluxDensityUnits;
}
