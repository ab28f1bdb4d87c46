using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>What an R2000 drawing must hold around its entities: header, tables, the two spaces, layouts.</summary>
internal sealed class DxfSkeleton(DxfPairWriter pairs, IReadOnlyList<string> layers, int unit)
{
    /// <summary>Handle of the model space's block record.</summary>
    public const int ModelSpace = 0x1F;

    private const int PaperSpace = 0x1E;
    private const int RootDictionary = 0xC, Groups = 0xD, Layouts = 0x1A, ModelLayout = 0x22, PaperLayout = 0x23;
    private const int FirstLayer = 0x40;

    /// <summary>Handle of the first entity.</summary>
    public int FirstEntityHandle => FirstLayer + layers.Count;

    /// <summary>Everything before the entities.</summary>
    public void WriteBefore(int entities)
    {
        Header(entities);
        Section("CLASSES");
        End();
        Tables();
        Blocks();
        Section("ENTITIES");
    }

    /// <summary>Everything after the entities.</summary>
    public void WriteAfter()
    {
        End();
        Objects();
        pairs.Text(0, "EOF");
    }

    private void Section(string name) => pairs.Text(0, "SECTION").Text(2, name);

    private void End() => pairs.Text(0, "ENDSEC");

    private void Header(int entities)
    {
        Section("HEADER");
        pairs.Text(9, "$ACADVER").Text(1, "AC1015");
        pairs.Text(9, "$DWGCODEPAGE").Text(3, "ANSI_1252");
        pairs.Text(9, "$HANDSEED").Handle(5, FirstEntityHandle + entities);
        pairs.Text(9, "$INSUNITS").Whole(70, unit);
        pairs.Text(9, "$MEASUREMENT").Whole(70, DxfUnits.IsImperial(unit) ? 0 : 1);
        End();
    }

    private void Tables()
    {
        Section("TABLES");
        Table("VPORT", 0x8, 1);
        View();
        EndTable();
        Table("LTYPE", 0x5, 3);
        LineType("ByBlock", 0x14);
        LineType("ByLayer", 0x15);
        LineType("Continuous", 0x16);
        EndTable();
        Table("LAYER", 0x2, layers.Count);
        for (int i = 0; i < layers.Count; i++)
        {
            Record("LAYER", FirstLayer + i, 0x2, "AcDbLayerTableRecord")
                .Text(2, layers[i]).Whole(70, 0).Whole(62, 7).Text(6, "Continuous");
        }

        EndTable();
        Table("STYLE", 0x3, 1);
        Record("STYLE", 0x11, 0x3, "AcDbTextStyleTableRecord").Text(2, "Standard").Whole(70, 0)
            .Real(40, 0).Real(41, 1).Real(50, 0).Whole(71, 0).Real(42, 2.5).Text(3, "txt").Text(4, string.Empty);
        EndTable();
        Table("VIEW", 0x6, 0);
        EndTable();
        Table("UCS", 0x7, 0);
        EndTable();
        Table("APPID", 0x9, 1);
        Record("APPID", 0x12, 0x9, "AcDbRegAppTableRecord").Text(2, "ACAD").Whole(70, 0);
        EndTable();
        Table("DIMSTYLE", 0xA, 1);
        pairs.Text(100, "AcDbDimStyleTable").Whole(71, 1);
        pairs.Text(0, "DIMSTYLE").Handle(105, 0x27).Handle(330, 0xA).Text(100, "AcDbSymbolTableRecord")
            .Text(100, "AcDbDimStyleTableRecord").Text(2, "Standard").Whole(70, 0);
        EndTable();
        Table("BLOCK_RECORD", 0x1, 2);
        Record("BLOCK_RECORD", ModelSpace, 0x1, "AcDbBlockTableRecord").Text(2, "*Model_Space").Handle(340, ModelLayout);
        Record("BLOCK_RECORD", PaperSpace, 0x1, "AcDbBlockTableRecord").Text(2, "*Paper_Space").Handle(340, PaperLayout);
        EndTable();
        End();
    }

    private void Table(string name, int handle, int count) => pairs.Text(0, "TABLE").Text(2, name)
        .Handle(5, handle).Handle(330, 0).Text(100, "AcDbSymbolTable").Whole(70, count);

    private void EndTable() => pairs.Text(0, "ENDTAB");

    private DxfPairWriter Record(string name, int handle, int table, string subclass) => pairs.Text(0, name)
        .Handle(5, handle).Handle(330, table).Text(100, "AcDbSymbolTableRecord").Text(100, subclass);

    private void LineType(string name, int handle) => Record("LTYPE", handle, 0x5, "AcDbLinetypeTableRecord")
        .Text(2, name).Whole(70, 0).Text(3, string.Empty).Whole(72, 65).Whole(73, 0).Real(40, 0);

    private void View() => Record("VPORT", 0x29, 0x8, "AcDbViewportTableRecord").Text(2, "*Active").Whole(70, 0)
        .Flat(10, default).Flat(11, new Point(1, 1)).Flat(12, default).Flat(13, default)
        .Flat(14, new Point(10, 10)).Flat(15, new Point(10, 10)).Place(16, default).Real(36, 1).Place(17, default)
        .Real(40, 200).Real(41, 1.5).Real(42, 50).Real(43, 0).Real(44, 0).Real(50, 0).Real(51, 0)
        .Whole(71, 0).Whole(72, 100).Whole(73, 1).Whole(74, 3).Whole(75, 0).Whole(76, 0).Whole(77, 0).Whole(78, 0);

    private void Blocks()
    {
        Section("BLOCKS");
        Space("*Model_Space", ModelSpace, 0x20, onPaper: false);
        Space("*Paper_Space", PaperSpace, 0x24, onPaper: true);
        End();
    }

    private void Space(string name, int record, int handle, bool onPaper)
    {
        Part("BLOCK", handle, "AcDbBlockBegin").Text(2, name).Whole(70, 0).Place(10, default)
            .Text(3, name).Text(1, string.Empty);
        Part("ENDBLK", handle + 1, "AcDbBlockEnd");

        DxfPairWriter Part(string kind, int own, string subclass)
        {
            pairs.Text(0, kind).Handle(5, own).Handle(330, record).Text(100, "AcDbEntity");
            return (onPaper ? pairs.Whole(67, 1) : pairs).Text(8, "0").Text(100, subclass);
        }
    }

    private void Objects()
    {
        Section("OBJECTS");
        Dictionary(RootDictionary, 0).Text(3, "ACAD_GROUP").Handle(350, Groups).Text(3, "ACAD_LAYOUT").Handle(350, Layouts);
        Dictionary(Groups, RootDictionary);
        Dictionary(Layouts, RootDictionary).Text(3, "Model").Handle(350, ModelLayout).Text(3, "Layout1").Handle(350, PaperLayout);
        Layout("Model", ModelLayout, ModelSpace, 0);
        Layout("Layout1", PaperLayout, PaperSpace, 1);
        End();
    }

    private DxfPairWriter Dictionary(int handle, int owner) => pairs.Text(0, "DICTIONARY")
        .Handle(5, handle).Handle(330, owner).Text(100, "AcDbDictionary").Whole(281, 1);

    private void Layout(string name, int handle, int space, int order)
    {
        // Flag 1024 of the plot settings: the layout of the model.
        pairs.Text(0, "LAYOUT").Handle(5, handle).Handle(330, Layouts).Text(100, "AcDbPlotSettings")
            .Text(1, string.Empty).Text(2, string.Empty).Text(4, string.Empty).Text(6, string.Empty);
        for (int code = 40; code <= 49; code++)
        {
            pairs.Real(code, 0);
        }

        pairs.Real(140, 0).Real(141, 0).Real(142, 1).Real(143, 1).Whole(70, order == 0 ? 1024 : 0)
            .Whole(72, 0).Whole(73, 0).Whole(74, 5).Text(7, string.Empty).Whole(75, 16)
            .Real(147, 1).Real(148, 0).Real(149, 0);
        pairs.Text(100, "AcDbLayout").Text(1, name).Whole(70, 1).Whole(71, order)
            .Flat(10, default).Flat(11, new Point(420, 297)).Place(12, default)
            .Place(14, default).Place(15, default).Real(146, 0)
            .Place(13, default).Place(16, new Point(1, 0)).Place(17, new Point(0, 1))
            .Whole(76, 0).Handle(330, space);
    }
}
