namespace PoleField.Materials;

/// <summary>
/// A permanent magnet on its linear recoil line B = Br + μ0 μrec H. Valid while the working point stays above the knee of
/// the demagnetisation curve, which depends on grade and temperature: the maker's sheet decides.
/// </summary>
/// <param name="Name">Name as used in case files.</param>
/// <param name="Remanence">Br at 20 °C, T.</param>
/// <param name="RecoilPermeability">μrec, relative, ≥ 1.</param>
/// <param name="TemperatureCoefficient">Relative change of Br per kelvin, 1/K (negative).</param>
/// <param name="Description">What it is, in words.</param>
/// <param name="Source">Where the numbers come from.</param>
public sealed record MagnetGrade(
    string Name, double Remanence, double RecoilPermeability, double TemperatureCoefficient, string Description, string Source)
{
    /// <summary>Temperature at which <see cref="Remanence"/> is stated, °C.</summary>
    public const double ReferenceTemperature = 20;

    /// <summary>Coercivity of the flux density HcB = Br/(μ0 μrec), A/m.</summary>
    public double Coercivity => Remanence / (PhysicalConstants.Mu0 * RecoilPermeability);

    /// <summary>Greatest energy product Br²/(4 μ0 μrec), J/m³.</summary>
    public double EnergyProduct => 0.25 * Remanence * Coercivity;

    /// <summary>Br, T, at a temperature in °C, by the linear coefficient.</summary>
    public double RemanenceAt(double celsius) => Remanence * (1 + (TemperatureCoefficient * (celsius - ReferenceTemperature)));
}
