using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Reads the sections of a drawing: strict on numbers and pairs, lenient on structure.</summary>
internal sealed class DxfParser(DxfPairs pairs, DxfReport report, DxfLimits limits)
{
    private readonly DxfDocument _document = new();
    private string? _codePage;
    private bool _anySection;
    private string _inside = string.Empty;

    /// <summary>Reads to the end mark.</summary>
    /// <exception cref="InputException">The file is damaged.</exception>
    public DxfDocument Parse()
    {
        bool more = Move("before its end mark (0, EOF)");
        while (!(pairs.Code == 0 && pairs.Text == "EOF"))
        {
            if (more && pairs.Code == 0 && pairs.Text == "SECTION")
            {
                _anySection = true;
                Section();
            }

            Move("before its end mark (0, EOF)");
        }

        if (!_anySection)
        {
            throw report.Stop(
                "not-dxf", "The file has no section: it is not a drawing.", "Export the drawing as DXF.", new DxfPlace(pairs.Line));
        }

        return _document;
    }

    private bool Move(string where) => pairs.Next() ? true : throw pairs.Truncated(where);

    private void Section()
    {
        string from = pairs.Line > 0 ? $" (from line {pairs.Line})" : string.Empty;
        Move("inside a section");
        string name = pairs.Code == 2 ? pairs.Text : string.Empty;
        _inside = $"inside section {DxfReport.Shown(name)}{from}";
        switch (name)
        {
            case "HEADER":
                Header();
                break;
            case "TABLES":
                Tables();
                break;
            case "BLOCKS":
                Blocks();
                break;
            case "ENTITIES":
                MoveInside();
                Entities(_document.Entities, "ENDSEC");
                break;
            default:
                Skip();
                break;
        }
    }

    // Moves on; a section that another section or the end interrupts was cut.
    private void MoveInside()
    {
        Move(_inside);
        if (pairs.Code == 0 && pairs.Text is ("EOF" or "SECTION"))
        {
            throw report.Stop(
                "truncated",
                $"The file has lost a part {_inside}: the section has no end mark (0, ENDSEC).",
                "Export or copy the drawing again.",
                new DxfPlace(pairs.Line));
        }
    }

    private bool AtEndOfSection => pairs.Code == 0 && pairs.Text == "ENDSEC";

    private void Skip()
    {
        while (!AtEndOfSection)
        {
            MoveInside();
        }
    }

    private void Header()
    {
        string variable = string.Empty;
        for (MoveInside(); !AtEndOfSection; MoveInside())
        {
            if (pairs.Code == 9)
            {
                variable = pairs.Text;
            }

            switch (variable, pairs.Code)
            {
                case ("$ACADVER", 1):
                    _document.Version = pairs.Text;
                    break;
                case ("$DWGCODEPAGE", 3):
                    _codePage = pairs.Text;
                    break;
                case ("$INSUNITS", 70):
                    _document.InsertUnits = HeaderInteger(variable);
                    break;
                case ("$MEASUREMENT", 70):
                    _document.Measurement = HeaderInteger(variable);
                    break;
            }
        }

        if (!pairs.Texts.Choose(_document.Version, _codePage))
        {
            report.Warn(
                "code-page",
                $"The code page \"{DxfReport.Shown(_codePage ?? string.Empty)}\" is unknown; letters beyond ASCII are guessed.",
                "Check the layer names below, or export as DXF 2007 or later.");
        }
    }

    private long? HeaderInteger(string variable)
    {
        if (pairs.TryInteger(out long value))
        {
            return value;
        }

        report.Fault(
            "bad-number",
            $"\"{DxfReport.Shown(pairs.Text)}\" is not a whole number ({variable}).",
            "Export the drawing again.",
            new DxfPlace(pairs.Line));
        return null;
    }

    private void Tables()
    {
        MoveInside();
        while (!AtEndOfSection)
        {
            if (pairs.Code == 0 && pairs.Text == "LAYER")
            {
                Layer();
            }
            else
            {
                MoveInside();
            }
        }
    }

    private void Layer()
    {
        string name = string.Empty, lineType = "CONTINUOUS";
        long flags = 0, color = 7;
        for (MoveInside(); pairs.Code != 0; MoveInside())
        {
            switch (pairs.Code)
            {
                case 2:
                    name = pairs.Text;
                    break;
                case 6:
                    lineType = pairs.Text;
                    break;
                case 70:
                    flags = HeaderInteger("flags of a layer") ?? 0;
                    break;
                case 62:
                    color = HeaderInteger("colour of a layer") ?? 0;
                    break;
            }
        }

        // Bit 1 of the flags is "frozen", a negative colour is "off" (format reference, LAYER).
        _document.Layers.TryAdd(name, new DxfLayer(name, (flags & 1) != 0, color < 0, lineType));
    }

    private void Blocks()
    {
        MoveInside();
        while (!AtEndOfSection)
        {
            if (pairs.Code == 0 && pairs.Text == "BLOCK")
            {
                Block();
            }
            else
            {
                MoveInside();
            }
        }
    }

    private void Block()
    {
        var head = new DxfRecord(report, limits);
        head.Begin("BLOCK", pairs.Line, wanted: true);
        for (MoveInside(); pairs.Code != 0; MoveInside())
        {
            head.Add(pairs);
        }

        head.IsSound();

        // Bits 4 and 8 of the flags: external reference, overlay.
        var block = new DxfBlock(
            head.Name ?? string.Empty,
            new Point(head.Real(10, 0), head.Real(20, 0)),
            (head.Integer(70) & 12) != 0);
        if (!_document.Blocks.TryAdd(block.Name, block))
        {
            report.Warn(
                "block-twice",
                $"Block {DxfReport.Shown(block.Name)} is defined twice; the first definition counts.",
                "Rename one of them.",
                new DxfPlace(head.Line));
        }

        Entities(block.Items, "ENDBLK");
    }

    // From the present group 0 to the end mark of the block or section.
    private void Entities(List<DxfItem> items, string endMark)
    {
        var record = new DxfRecord(report, limits);
        var maker = new DxfItemMaker(items, report, limits);
        while (pairs.Code != 0)
        {
            MoveInside();
        }

        while (pairs.Text != endMark)
        {
            if (AtEndOfSection)
            {
                throw report.Stop(
                    "truncated",
                    "A block has no end mark (0, ENDBLK): the file has lost a part.",
                    "Export or copy the drawing again.",
                    new DxfPlace(pairs.Line));
            }

            string kind = pairs.Text;
            record.Begin(kind, pairs.Line, DxfWords.IsRead(kind));
            for (MoveInside(); pairs.Code != 0; MoveInside())
            {
                record.Add(pairs);
            }

            maker.Take(record);
        }

        maker.Finish();
    }
}
