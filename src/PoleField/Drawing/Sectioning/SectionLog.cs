using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Collects findings in the order they are made and says places in the drawing's own unit.</summary>
internal sealed class SectionLog(Sketch sketch)
{
    private const int MostFaults = 50;
    private const int MostNotesOfAKind = 200;
    private const double Listed = 1e-9; // metres

    private readonly List<Finding> _findings = [];
    private readonly Dictionary<(string What, string? Layer), int> _notes = [];
    private readonly SortedDictionary<string, int> _tiny = new(StringComparer.Ordinal); // closed gaps too small to list, by layer
    private int _faults;

    /// <summary>Unit of the sketch.</summary>
    public LengthUnit Unit => sketch.Unit;

    /// <summary>True when something was found that forbids a section.</summary>
    public bool HasFaults => _faults > 0;

    /// <summary>Everything found, with a last line where lists were cut.</summary>
    public IReadOnlyList<Finding> Findings
    {
        get
        {
            List<Finding> all = [.. _findings];
            if (_faults > MostFaults)
            {
                all.Add(new Finding(Severity.Note, "more-faults", Invariant($"{_faults - MostFaults} more faults are not shown."), "Mend these first.") { File = sketch.Name });
            }

            foreach ((string layer, int count) in _tiny)
            {
                string ends = count == 1 ? "1 joint" : Invariant($"{count} joints");
                all.Add(new Finding(
                    Severity.Note, "healed-joint", $"{ends} with less than {Length(Listed)} between the ends closed on layer {layer}.", "Nothing to do.")
                { File = sketch.Name, Layer = layer });
            }

            foreach (((string what, string? layer), int count) in _notes.Where(n => n.Value > MostNotesOfAKind))
            {
                all.Add(new Finding(
                    Severity.Note, what, Invariant($"{count - MostNotesOfAKind} more of this kind on layer {layer} are not listed."), "Nothing to do.")
                { File = sketch.Name, Layer = layer });
            }

            return all;
        }
    }

    /// <summary>Adds a finding about a place on a curve of the sketch.</summary>
    public void Add(Finding finding, Point? at = null, int source = -1)
    {
        SketchCurve? curve = source >= 0 ? sketch.Curves[source] : null;
        Finding full = finding with
        {
            File = sketch.Name,
            Layer = finding.Layer ?? curve?.Layer,
            Handle = curve?.Handle,
            Line = curve is { Line: > 0 } ? curve.Line : null,
            At = at,
            AtDrawing = at is Point p ? ToDrawing(p) : null,
        };
        if (full.Severity == Severity.Fault && ++_faults > MostFaults)
        {
            return;
        }

        if (full.Severity == Severity.Note)
        {
            (string, string?) kind = (full.What, full.Layer);
            _notes[kind] = _notes.GetValueOrDefault(kind) + 1;
            if (_notes[kind] > MostNotesOfAKind)
            {
                return;
            }
        }

        _findings.Add(full);
    }

    /// <summary>Adds a note about ends that were joined; gaps below a nanometre are only counted.</summary>
    public void AddHealed(Point at, double gap, int source)
    {
        if (gap > Listed)
        {
            Add(SectionMessages.HealedJoint(this, at, gap), at, source);
            return;
        }

        string layer = sketch.Curves[source].Layer;
        _tiny[layer] = _tiny.GetValueOrDefault(layer) + 1;
    }

    /// <summary>"(22.000, -14.05) mm", in drawing units, and in millimetres too where those differ.</summary>
    public string Place(Point metres)
    {
        Point d = ToDrawing(metres);
        string text = Pair(d) + " " + sketch.Unit.Name;
        return sketch.Unit.Metres == LengthUnit.Millimetre.Metres
            ? text
            : $"{text} = {Pair(1e3 * metres)} mm";
    }

    /// <summary>"LINE near line 212", "ARC, handle 3F"; empty when nothing is known.</summary>
    public string Entity(int source)
    {
        SketchCurve c = sketch.Curves[source];
        return c.Line > 0 ? Invariant($"{c.Kind} near line {c.Line}") : c.Handle is null ? c.Kind : $"{c.Kind}, handle {c.Handle}";
    }

    /// <summary>"LINE near line 212; LINE near line 340", "both of LWPOLYLINE near line 15".</summary>
    public string Entities(int a, int b)
    {
        (string first, string second) = (Entity(a), Entity(b));
        return first == second && first != sketch.Curves[a].Kind ? $"both of {first}" : $"{first}; {second}";
    }

    /// <summary>A length with a readable unit.</summary>
    public static string Length(double metres) => metres switch
    {
        0 => "0 mm",
        < 1e-7 => Invariant($"{metres * 1e9:g3} nm"),
        < 1e-5 => Invariant($"{metres * 1e6:g3} µm"),
        _ => Invariant($"{metres * 1e3:0.####} mm"),
    };

    /// <summary>An area in mm².</summary>
    public static string Area(double squareMetres) => Invariant($"{squareMetres * 1e6:g6} mm²");

    private Point ToDrawing(Point metres)
    {
        double perMetre = Math.Round(1 / sketch.Unit.Metres);
        bool whole = perMetre >= 1 && Math.Abs((perMetre * sketch.Unit.Metres) - 1) < 1e-15;
        double Scaled(double x) => whole ? x * perMetre : x / sketch.Unit.Metres;
        return new Point(Scaled(metres.Y), Scaled(metres.Z));
    }

    // Adding zero turns a rounded -0 into 0.
    private static string Pair(Point p) => Invariant($"({Math.Round(p.Y, 6) + 0.0:0.######}, {Math.Round(p.Z, 6) + 0.0:0.######})");

    private static string Invariant(FormattableString text) => FormattableString.Invariant(text);
}
