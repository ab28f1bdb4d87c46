namespace PoleField.Drawing;

/// <summary>A unit of length as drawings and case files name it.</summary>
/// <param name="Name">Short name: "mm", "um", "cm", "m", "in", ...</param>
/// <param name="Metres">Length of one unit, metres, &gt; 0.</param>
public sealed record LengthUnit(string Name, double Metres)
{
    /// <summary>Millimetre.</summary>
    public static LengthUnit Millimetre { get; } = new("mm", 1e-3);
}

/// <summary>Where the unit of a drawing came from.</summary>
public enum UnitOrigin
{
    /// <summary>Stated by the case file.</summary>
    CaseFile,

    /// <summary>The drawing's $INSUNITS.</summary>
    InsertUnits,

    /// <summary>The drawing's $MEASUREMENT.</summary>
    Measurement,

    /// <summary>Nobody said; millimetres assumed.</summary>
    Assumed,
}
