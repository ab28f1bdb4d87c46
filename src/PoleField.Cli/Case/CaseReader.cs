using PoleField.Drawing;

namespace PoleField.Cli.Case;

/// <summary>What a case file may refer to.</summary>
/// <param name="File">Name of the case file for messages.</param>
/// <param name="MaterialNames">Built-in materials, "air" included.</param>
/// <param name="FileExists">Tells whether a file named in the case exists.</param>
internal sealed record CaseSurroundings(string File, IReadOnlyCollection<string> MaterialNames, Func<string, bool> FileExists)
{
    /// <summary>Tells of a known material whether it carries flux; of the rest a coil may be made.</summary>
    public Func<string, bool> IsMagnetic { get; init; } = name => name != "air";
}

/// <summary>A case file read: the case, or everything that is wrong with it; and in any case what it asks of its drawing.</summary>
internal sealed record CaseReading(CaseFile? Case, SketchQuestion Question, IReadOnlyList<Finding> Findings);

/// <summary>Reads a case file whole and reports all its faults at once, in the order of the file.</summary>
internal static class CaseReader
{
    private const int Format = 1;

    // Tables that say what the layers of the drawing are.
    private static readonly string[] AskingTables = ["sketch", "parts", "surroundings", "symmetry"];

    // Two micrometres: below any pole's form error, above the rounding of drawing programs.
    private const double DefaultJoin = 2e-6;

    /// <summary>Reads a case.</summary>
    /// <param name="text">Text of the file.</param>
    /// <param name="around">What it may refer to.</param>
    /// <param name="changes">Values that take the place of the file's own.</param>
    public static CaseReading Read(string text, CaseSurroundings around, params IReadOnlyList<CaseChange> changes)
    {
        var faults = new Faults(around.File);
        TomlTable root = CaseValues.Changed(TomlDocument.Parse(text, around.File, faults), changes);
        (CaseFile file, bool isClear) = Bind(new TableReader(root, string.Empty, faults), around);
        SketchQuestion question = SketchQuestion.Of(file, isClear && !faults.HasBrokenSyntax);
        faults.DropConsequencesOfBrokenSyntax();
        return new CaseReading(faults.Count > 0 ? null : file, question, faults.Sorted);
    }

    // Also tells whether what the case asks of its drawing was read without a fault.
    private static (CaseFile File, bool IsClear) Bind(TableReader root, CaseSurroundings around)
    {
        bool isClear = true;
        CheckFormat(root);
        string title = root.Text("title") ?? Path.GetFileNameWithoutExtension(around.File);
        SketchSection sketch = Asking(() => ReadSketch(root, around));
        IReadOnlyList<PartSection> parts = PartReader.ReadAll(root, around);
        var layers = parts.Select(p => p.Layer).ToList();
        var file = new CaseFile
        {
            Title = title,
            Sketch = sketch,
            Parts = parts,
            Surroundings = Asking(() => ReadSurroundings(root, layers)),
            MirrorLeftRight = Asking(() => ReadMirror(root)),
            Beam = ReadBeam(root, layers),
            Operation = AnalysisReader.ReadOperation(root),
            Accuracy = ReadSingle(root, "accuracy", t => t.RequiredQuantity("relative", Dimension.Ratio, AccuracyRange)) ?? 1e-4,
            Require = LimitReader.ReadRequire(root),
            TwoWire = AnalysisReader.ReadTwoWire(root),
            Ramp = AnalysisReader.ReadRamp(root),
            Map = AnalysisReader.ReadMap(root),
            Tune = TuneReader.Read(root, layers),
            Tolerance = AnalysisReader.ReadTolerance(root),
            Flight = FlightReader.Read(root),
        };
        root.Close();
        isClear &= !root.Unknown.Any(key => NearestName.Of(key, AskingTables) is not null);
        return (file, isClear);

        T Asking<T>(Func<T> read)
        {
            int before = root.Faults.Count;
            T value = read();
            isClear &= root.Faults.Count == before;
            return value;
        }
    }

    /// <summary>Accuracies the solver can be asked for.</summary>
    public static Allowed AccuracyRange { get; } = new(1e-7, 1e-2);

    private static void CheckFormat(TableReader root)
    {
        switch (root.Find("format"))
        {
            case TomlNumber { IsInteger: true, Value: Format }:
                return;
            case null:
                root.Missing("format", "1");
                return;
            case var other:
                root.Faults.Add(
                    other.At, "unknown-format", $"format is {other.Kind}; this program reads format 1.", "Write format = 1.");
                return;
        }
    }

    private static SketchSection ReadSketch(TableReader root, CaseSurroundings around)
    {
        if (root.Table("sketch") is not { } table)
        {
            MissingTable(root, "sketch", "file = \"poles.dxf\"");
            return new SketchSection("?", null, DefaultJoin, root.At);
        }

        string file = table.RequiredText("file", "poles.dxf");
        if (file != "?" && !around.FileExists(file))
        {
            root.Faults.Add(
                table.SpotOf("file"), "missing-file", $"The sketch \"{file}\" is not there.", "Paths count from the folder of the case file.");
        }

        LengthUnit? unit = ReadUnit(table);
        double join = table.Quantity("join", Dimension.Length, Allowed.Positive) ?? DefaultJoin;
        table.Close();
        return new SketchSection(file, unit, join, table.SpotOf("file"));
    }

    private static LengthUnit? ReadUnit(TableReader table)
    {
        string? name = table.Text("unit");
        if (name is null or "?")
        {
            return null;
        }

        if (Dimension.Length.Find(name) is not { } unit)
        {
            table.Faults.Add(
                table.SpotOf("unit"), "unknown-unit", $"{table.Where("unit")} is \"{name}\".", $"Units of length are {Dimension.Length.Allowed}.");
            return null;
        }

        return new LengthUnit(unit.Name, unit.ToSi(1));
    }

    private static SurroundingsSection ReadSurroundings(TableReader root, List<string> layers)
    {
        if (root.Table("surroundings") is not { } table)
        {
            return new SurroundingsSection(null, default);
        }

        bool open = table.Flag("open") ?? !table.Has("rim");
        string? rim = table.Text("rim");
        if (open && rim is not null)
        {
            root.Faults.Add(
                table.SpotOf("rim"), "contradiction", "[surroundings] is open and has a rim.", "Write open = false to bound the model by the rim, or leave rim out.");
        }
        else if (!open && rim is null)
        {
            root.Faults.Add(
                table.SpotOf("open"), "missing-key", "[surroundings] is closed and has no rim.", "Add rim = \"LAYER\" with a closed outline, or write open = true.");
        }
        else if (rim is not null && layers.Contains(rim, StringComparer.OrdinalIgnoreCase))
        {
            root.Faults.Add(
                table.SpotOf("rim"), "contradiction", $"The layer \"{rim}\" is a part and the rim.", "Draw the rim on a layer of its own.");
        }

        Geometry.Point applied = table.Pair("applied_field", Dimension.Field) ?? default;
        table.Close();
        return new SurroundingsSection(rim, applied);
    }

    private static bool ReadMirror(TableReader root)
    {
        if (root.Table("symmetry") is not { } table)
        {
            return false;
        }

        string? mirror = table.Choice("mirror", "none", "left-right");
        table.Close();
        return mirror == "left-right";
    }

    private static BeamSection ReadBeam(TableReader root, List<string> layers)
    {
        if (root.Table("beam") is not { } table)
        {
            MissingTable(root, "beam", "layer = \"BEAM\", or centre, width and height");
            return new BeamOnLayer("?");
        }

        BeamSection beam;
        string? layer = table.Text("layer");
        bool rectangle = table.Has("centre") | table.Has("width") | table.Has("height");
        if (layer is not null && rectangle)
        {
            root.Faults.Add(
                table.SpotOf("layer"), "contradiction", "[beam] has a layer and a rectangle.", "Keep layer, or keep centre, width and height.");
        }

        if (layer is not null && layers.Contains(layer, StringComparer.OrdinalIgnoreCase))
        {
            root.Faults.Add(
                table.SpotOf("layer"), "contradiction", $"The layer \"{layer}\" is a part and the beam.", "Draw the beam's outline on a layer of its own.");
        }

        if (layer is not null)
        {
            beam = new BeamOnLayer(layer);
        }
        else
        {
            if (!table.Has("centre"))
            {
                table.Missing("centre", "[\"0 mm\", \"3.6 mm\"]");
            }

            beam = new BeamRectangle(
                table.Pair("centre", Dimension.Length) ?? default,
                table.RequiredQuantity("width", Dimension.Length, Allowed.Positive),
                table.RequiredQuantity("height", Dimension.Length, Allowed.Positive));
        }

        table.Close();
        return beam;
    }

    private static double? ReadSingle(TableReader root, string name, Func<TableReader, double> read)
    {
        if (root.Table(name) is not { } table)
        {
            return null;
        }

        double value = read(table);
        table.Close();
        return value;
    }

    internal static void MissingTable(TableReader root, string name, string content)
    {
        if (!root.Has(name))
        {
            root.Faults.Add(root.At, "missing-key", $"The case has no [{name}].", $"Add [{name}] with {content}.");
        }
    }
}
