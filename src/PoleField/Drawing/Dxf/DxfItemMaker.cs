namespace PoleField.Drawing;

/// <summary>Turns entities as written into curves and copies of blocks.</summary>
internal sealed class DxfItemMaker(List<DxfItem> items, DxfReport report, DxfLimits limits)
{
    private DxfPolyline? _open;
    private long _vertices;

    /// <summary>Takes the next entity of a section or block.</summary>
    public void Take(DxfRecord record)
    {
        if (_open is not null && record.Kind == "VERTEX")
        {
            Count(1, record);
            if (record.IsSound())
            {
                _open.Add(record);
            }

            return;
        }

        Finish();
        if (record.Kind == "SEQEND" || !record.IsSound())
        {
            return;
        }

        switch (record.Kind)
        {
            case "POLYLINE":
                _open = new DxfPolyline(record);
                break;
            case "VERTEX":
                report.Fault(
                    "stray-vertex",
                    $"VERTEX on layer {DxfReport.Shown(record.Layer)} belongs to no POLYLINE.",
                    "The file has lost a part; export it again.",
                    record.Place);
                break;
            case "INSERT":
                items.Add(DxfInserts.Make(record));
                break;
            case "LWPOLYLINE" or "SPLINE":
                Count(record.Numbers.Count(n => n.Code is 10 or 11), record);
                items.Add(DxfShapes.Make(record, limits));
                break;
            case "LINE" or "ARC" or "CIRCLE" or "ELLIPSE":
                items.Add(DxfShapes.Make(record, limits));
                break;
            default:
                items.Add(new DxfOther(record.Kind, record.Place)
                {
                    IsInvisible = record.IsInvisible,
                    IsOnPaper = record.IsOnPaper,
                });
                break;
        }
    }

    /// <summary>Ends a polyline that is still open.</summary>
    public void Finish()
    {
        if (_open is not null)
        {
            items.Add(_open.Finish());
            _open = null;
        }
    }

    private void Count(int vertices, DxfRecord record)
    {
        _vertices += vertices;
        if (_vertices > limits.Vertices)
        {
            throw report.Stop(
                "limit",
                FormattableString.Invariant($"The polylines and splines have more than {limits.Vertices} vertices."),
                "The file is damaged or hostile; export it again with coarser curves.",
                record.Place);
        }
    }
}
