using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>What a drawing file says: header, layers, blocks and the entities of the drawing itself.</summary>
internal sealed class DxfDocument
{
    /// <summary>Version of the format, such as AC1015.</summary>
    public string? Version { get; set; }

    /// <summary>$INSUNITS.</summary>
    public long? InsertUnits { get; set; }

    /// <summary>$MEASUREMENT: 0 imperial, 1 metric.</summary>
    public long? Measurement { get; set; }

    /// <summary>Layers of the table, by name without regard to case.</summary>
    public Dictionary<string, DxfLayer> Layers { get; } = new(StringComparer.OrdinalIgnoreCase);

    /// <summary>Blocks, by name without regard to case.</summary>
    public Dictionary<string, DxfBlock> Blocks { get; } = new(StringComparer.OrdinalIgnoreCase);

    /// <summary>Entities of the drawing.</summary>
    public List<DxfItem> Entities { get; } = [];
}

/// <summary>A layer of the table.</summary>
internal sealed record DxfLayer(string Name, bool IsFrozen, bool IsOff, string LineType);

/// <summary>A block: entities that INSERTs show.</summary>
internal sealed class DxfBlock(string name, Point basePoint, bool isExternal)
{
    /// <summary>Name.</summary>
    public string Name => name;

    /// <summary>The point that INSERTs place.</summary>
    public Point Base => basePoint;

    /// <summary>True when the content is in another file.</summary>
    public bool IsExternal => isExternal;

    /// <summary>Content.</summary>
    public List<DxfItem> Items { get; } = [];
}

/// <summary>An entity.</summary>
internal abstract record DxfItem(string Kind, DxfPlace Place)
{
    /// <summary>Layer as written.</summary>
    public string Layer => Place.Layer ?? "0";

    /// <summary>Line type as written; null means that of the layer.</summary>
    public string? LineType { get; init; }

    /// <summary>Marked invisible.</summary>
    public bool IsInvisible { get; init; }

    /// <summary>On a paper sheet.</summary>
    public bool IsOnPaper { get; init; }

    /// <summary>Why the entity cannot be used if it is visible (what it is called, text, what to do); null when it can.</summary>
    public (string What, string Text, string Fix)? Problem { get; init; }
}

/// <summary>An entity that is curves, in the coordinates of the block or drawing it is in.</summary>
internal sealed record DxfShape(string Kind, DxfPlace Place, IReadOnlyList<Curve> Curves) : DxfItem(Kind, Place)
{
    /// <summary>Number of pieces that had no length.</summary>
    public int Dropped { get; init; }

    /// <summary>Height above the drawing plane.</summary>
    public double Height { get; init; }

    /// <summary>True when the curve was made through fit points.</summary>
    public bool IsFitted { get; init; }
}

/// <summary>Copies of a block.</summary>
/// <param name="Place">Where it stands in the file.</param>
/// <param name="Block">Name of the block.</param>
/// <param name="ToParent">Maps coordinates relative to the block's base point to those of what holds the INSERT.</param>
/// <param name="Columns">Number of columns and the shift from one to the next.</param>
/// <param name="Rows">Number of rows and the shift from one to the next.</param>
internal sealed record DxfInsert(
    DxfPlace Place, string Block, Affine ToParent, (long Count, Point Shift) Columns, (long Count, Point Shift) Rows)
    : DxfItem("INSERT", Place);

/// <summary>An entity of a kind that is not read.</summary>
internal sealed record DxfOther(string Kind, DxfPlace Place) : DxfItem(Kind, Place);
