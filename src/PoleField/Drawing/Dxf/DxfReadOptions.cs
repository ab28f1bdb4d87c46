namespace PoleField.Drawing;

/// <summary>How a drawing is read.</summary>
public sealed record DxfReadOptions
{
    /// <summary>Unit of length; null to believe the drawing ($INSUNITS, then $MEASUREMENT, then millimetres).</summary>
    public LengthUnit? Unit { get; init; }

    /// <summary>Sizes beyond which a file is refused.</summary>
    public DxfLimits Limits { get; init; } = new();
}

/// <summary>Sizes beyond which a drawing is taken for damaged or hostile and refused.</summary>
public sealed record DxfLimits
{
    /// <summary>Bytes of the file.</summary>
    public long FileBytes { get; init; } = 256L << 20;

    /// <summary>Bytes of one value.</summary>
    public int ValueBytes { get; init; } = 1 << 20;

    /// <summary>Pairs of group code and value.</summary>
    public long Pairs { get; init; } = 50_000_000;

    /// <summary>Curves after expansion of all blocks; a spline counts its knots times (degree + 1), the memory it takes.</summary>
    public int Curves { get; init; } = 2_000_000;

    /// <summary>Copies of blocks, empty ones included.</summary>
    public int BlockCopies { get; init; } = 1_000_000;

    /// <summary>Blocks within blocks.</summary>
    public int BlockDepth { get; init; } = 64;

    /// <summary>Rows times columns of one INSERT.</summary>
    public int ArrayCells { get; init; } = 100_000;

    /// <summary>Vertices of all polylines and splines as drawn, before expansion of blocks.</summary>
    public int Vertices { get; init; } = 2_000_000;

    /// <summary>Control or fit points of one spline.</summary>
    public int SplinePoints { get; init; } = 100_000;

    /// <summary>Largest coordinate, metres.</summary>
    public double Coordinate { get; init; } = 1e6;

    /// <summary>Faults after which reading stops.</summary>
    public int Faults { get; init; } = 50;
}
