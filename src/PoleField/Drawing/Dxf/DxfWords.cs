namespace PoleField.Drawing;

/// <summary>What entities and group codes are called in messages, and why some entities are not read.</summary>
internal static class DxfWords
{
    private const string NotOutline = "is not an outline";

    /// <summary>True for entities whose curves are read.</summary>
    public static bool IsRead(string kind) => kind
        is "LINE" or "ARC" or "CIRCLE" or "ELLIPSE" or "LWPOLYLINE" or "POLYLINE" or "VERTEX" or "SPLINE" or "INSERT";

    /// <summary>Meaning of a number of an entity.</summary>
    public static string Meaning(string kind, int code) => (kind, code) switch
    {
        ("LINE", 10) => "x of the start point",
        ("LINE", 20) => "y of the start point",
        ("LINE", 11) => "x of the end point",
        ("LINE", 21) => "y of the end point",
        ("ELLIPSE", 11) => "x of the major half axis",
        ("ELLIPSE", 21) => "y of the major half axis",
        ("ARC" or "CIRCLE" or "ELLIPSE", 10) => "x of the centre",
        ("ARC" or "CIRCLE" or "ELLIPSE", 20) => "y of the centre",
        ("ARC" or "CIRCLE", 40) => "radius",
        ("ARC", 50) => "start angle",
        ("ARC", 51) => "end angle",
        ("ELLIPSE", 40) => "ratio of the half axes",
        ("ELLIPSE", 41) => "start parameter",
        ("ELLIPSE", 42) => "end parameter",
        ("SPLINE", 10) => "x of a control point",
        ("SPLINE", 20) => "y of a control point",
        ("SPLINE", 11) => "x of a fit point",
        ("SPLINE", 21) => "y of a fit point",
        ("SPLINE", 40) => "a knot",
        ("SPLINE", 41) => "a weight",
        ("SPLINE", 71) => "degree",
        ("LWPOLYLINE" or "VERTEX", 10) => "x of a vertex",
        ("LWPOLYLINE" or "VERTEX", 20) => "y of a vertex",
        ("LWPOLYLINE" or "VERTEX", 42) => "bulge of a vertex",
        ("INSERT", 10) => "x of the insertion point",
        ("INSERT", 20) => "y of the insertion point",
        ("INSERT", 41) => "x scale",
        ("INSERT", 42) => "y scale",
        ("INSERT", 50) => "rotation",
        ("INSERT", 70) => "number of columns",
        ("INSERT", 71) => "number of rows",
        (_, 70) => "flags",
        (_, 210 or 220 or 230) => "extrusion direction",
        _ => FormattableString.Invariant($"value of group {code}"),
    };

    /// <summary>Why an entity is not read, what to do, and whether an outline may be lost by it.</summary>
    public static (string Why, string Cure, bool MayBeOutline) NotRead(string kind) => kind switch
    {
        "TEXT" or "MTEXT" or "ATTDEF" or "ATTRIB" or "RTEXT" or "ARCALIGNEDTEXT" =>
            ("text " + NotOutline, "Nothing, unless it was meant as one.", false),
        "DIMENSION" or "LEADER" or "MULTILEADER" or "MLEADER" or "TOLERANCE" or "ARC_DIMENSION" or "LARGE_RADIAL_DIMENSION" =>
            ("a dimension " + NotOutline, "Nothing.", false),
        "POINT" => ("a point " + NotOutline, "Nothing.", false),
        "XLINE" or "RAY" => ("a line without end " + NotOutline, "Trim it to a LINE if it bounds something.", true),
        "VIEWPORT" => ("a view of the sheet " + NotOutline, "Nothing.", false),
        "IMAGE" or "WIPEOUT" or "OLE2FRAME" or "OLEFRAME" or "PDFUNDERLAY" or "DWFUNDERLAY" or "DGNUNDERLAY" =>
            ("a picture " + NotOutline, "Trace it with lines and arcs.", false),
        "HATCH" or "MPOLYGON" => ("it fills an outline and is none", "Draw its boundary (recreate the boundary as polylines).", true),
        "SOLID" or "TRACE" or "3DFACE" => ("it is a filled face", "Draw its boundary as a closed polyline.", true),
        "REGION" or "3DSOLID" or "BODY" or "SURFACE" or "EXTRUDEDSURFACE" or "REVOLVEDSURFACE" or "PLANESURFACE" or "LOFTEDSURFACE" or "SWEPTSURFACE" =>
            ("solids and regions are stored in a closed format", "Explode it to lines and arcs, or export its section.", true),
        "MLINE" => ("it is a multiple line", "Explode it to lines and arcs.", true),
        "HELIX" or "MESH" or "POLYFACE" => ("it is a body in space", "Draw its section in the plane.", true),
        "ACAD_PROXY_ENTITY" => ("it belongs to a program extension", "Explode it, or export without extensions.", true),
        "ACAD_TABLE" => ("a table " + NotOutline, "Nothing.", false),
        "SHAPE" => ("a symbol of a font " + NotOutline, "Nothing, unless it was meant as one.", false),
        _ => ("this kind of entity is unknown", "Explode it to lines and arcs if it bounds something.", true),
    };

    /// <summary>True for line types of centre lines, which show where something is and bound nothing.</summary>
    public static bool IsCentreLine(string lineType)
    {
        ReadOnlySpan<string> beginnings = ["CENTER", "CENTRE", "DASHDOT", "ACAD_ISO04W", "ACAD_ISO10W"];
        foreach (string beginning in beginnings)
        {
            if (lineType.StartsWith(beginning, StringComparison.OrdinalIgnoreCase))
            {
                return true;
            }
        }

        return false;
    }
}
