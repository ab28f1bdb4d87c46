using PoleField.Magnetostatics;

namespace PoleField.Beam;

/// <summary>What a part with current takes in copper: an even current density in the copper share of its outlines.</summary>
/// <param name="Layer">Layer.</param>
/// <param name="CopperArea">Copper of all its outlines, m².</param>
/// <param name="CurrentDensity">Size of the current density in the copper, A/m².</param>
public sealed record CoilReport(string Layer, double CopperArea, double CurrentDensity)
{
    // Copper at 20 °C: the international annealed copper standard, 1/58 µΩ·m and 0.393 % per kelvin (IEC 60028, recalled
    // from memory).
    private const double Resistivity = 1.0 / 58e6;
    private const double PerKelvin = 0.00393;
    private const double ReferenceCelsius = 20;

    /// <summary>The coils of a magnet whose copper share is stated, in the order of its parts.</summary>
    public static IReadOnlyList<CoilReport> Of(Magnet magnet)
    {
        var coils = new List<CoilReport>();
        for (int part = 0; part < magnet.Roles.Count; part++)
        {
            PartRole role = magnet.Roles[part];
            double[] areas = [.. magnet.Section.Regions.Where(r => r.Part == part).Select(r => r.Area)];
            if (role.AmpereTurns != 0 && role.Fill is { } fill && areas.Length > 0)
            {
                double copper = fill * areas.Sum();
                coils.Add(new CoilReport(role.Layer, copper, Math.Abs(role.AmpereTurns) * areas.Length / copper));
            }
        }

        return coils;
    }

    /// <summary>Heat per metre of length, without the ends, W/m.</summary>
    /// <param name="celsius">Temperature of the copper, °C, −50 to 250.</param>
    /// <exception cref="ArgumentOutOfRangeException">The temperature is outside the range in which the straight law holds.</exception>
    public double HeatPerMetre(double celsius = ReferenceCelsius)
    {
        if (!(celsius >= -50) || celsius > 250)
        {
            throw new ArgumentOutOfRangeException(nameof(celsius), celsius, "Copper's straight law is used from -50 to 250 °C.");
        }

        double resistivity = Resistivity * (1 + (PerKelvin * (celsius - ReferenceCelsius)));
        return resistivity * CurrentDensity * CurrentDensity * CopperArea;
    }
}
