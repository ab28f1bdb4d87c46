namespace PoleField.Materials;

/// <summary>One measured pair.</summary>
/// <param name="FieldStrength">H, A/m.</param>
/// <param name="FluxDensity">B, T.</param>
/// <param name="Line">Line of the file it stands on, from 1; 0 when it comes from no file.</param>
public readonly record struct BhRow(double FieldStrength, double FluxDensity, int Line = 0)
{
    /// <summary>Polarisation J = B − μ0 H, T.</summary>
    public double Polarisation => FluxDensity - (PhysicalConstants.Mu0 * FieldStrength);
}

/// <summary>A magnetisation table as it was written down: it may be wrong. <see cref="BhCurve.FromTable"/> judges it.</summary>
/// <param name="Name">Name for messages (the file's, when there is one).</param>
/// <param name="Rows">Pairs in the order of the table.</param>
/// <param name="SaturationPolarisation">Js, T, that the curve must approach; null when nobody stated it.</param>
public sealed record BhTable(string Name, IReadOnlyList<BhRow> Rows, double? SaturationPolarisation = null);

/// <summary>What may be done to a table before a curve is laid through it.</summary>
public sealed record BhCurveOptions
{
    /// <summary>Take the table as it is.</summary>
    public static BhCurveOptions Default { get; } = new();

    /// <summary>
    /// Straighten measuring noise: the slope dH/dB is made to fall to one minimum and to rise from there (pool adjacent
    /// violators). Without it a row whose slope contradicts physics is a fault.
    /// </summary>
    public bool Smooth { get; init; }

    /// <summary>
    /// Replace everything below the maximum of B/H by the chord through the origin: a magnet that was energised before
    /// is not on its virgin curve.
    /// </summary>
    public bool AnhystereticStart { get; init; }

    /// <summary>Saturation polarisation Js, T, in place of the table's own; null keeps the table's.</summary>
    public double? SaturationPolarisation { get; init; }
}
