using static System.FormattableString;

namespace PoleField.Materials;

/// <summary>
/// Judges a magnetisation table: everything wrong with it at once, or the nodes a lawful curve passes through, rising in
/// both coordinates from (0, 0) with every secant dH/dB in (0, 1/μ0), and a saturation polarisation above all of them.
/// </summary>
internal sealed class BhTableCheck
{
    private const double Mu0 = PhysicalConstants.Mu0;
    private const double Nu0 = PhysicalConstants.Nu0;

    // No material comes near: cobalt-iron, the highest, reaches 2.4 to 2.45 T (handbook value, recalled from memory).
    private const double HighestPolarisation = 2.45;
    private const double ImplausiblePolarisation = 3.0;
    private const double ImplausibleFluxDensity = 10.0;

    // Within this factor of μ0 the last rows are saturated and their slope is measuring error; the tail replaces them.
    private const double SaturatedSlope = 1.1;

    // Below this field strength the tail is a long extrapolation.
    private const double ShortTable = 5000;

    private readonly BhTable _table;
    private readonly BhCurveOptions _options;
    private readonly List<Finding> _findings = [];

    private BhTableCheck(BhTable table, BhCurveOptions options)
    {
        _table = table;
        _options = options;
    }

    /// <summary>Nodes of the curve.</summary>
    public BhRow[] Nodes { get; private set; } = [];

    /// <summary>Js, T.</summary>
    public double SaturationPolarisation { get; private set; }

    /// <summary>Notes and warnings.</summary>
    public IReadOnlyList<Finding> Findings => _findings;

    /// <summary>Judges the table.</summary>
    /// <exception cref="InputException">It cannot be used.</exception>
    public static BhTableCheck Run(BhTable table, BhCurveOptions options)
    {
        BhTableCheck check = new(table, options);
        check.JudgeValues();
        check.ThrowIfFaulty();
        check.Nodes = check.WithOrigin();
        check.JudgeOrder();
        bool ordered = !check.HasFaults;
        if (ordered)
        {
            check.DropSaturatedRows();
        }

        if (!check.HasFaults)
        {
            check.Treat();
            check.JudgeSlopes();
        }

        check.SettleSaturation(ordered);
        check.ThrowIfFaulty();
        return check;
    }

    /// <summary>The warning that the two sides of a node allow no common slope.</summary>
    public Finding KinkAt(BhRow node) => Make(
        Severity.Warning,
        "bh-kink",
        Invariant($"The curve bends too sharply at H = {node.FieldStrength:g6} A/m, B = {node.FluxDensity:g6} T for one common slope; it has a corner there."),
        "Add rows on both sides of the bend.",
        node.Line);

    private bool HasFaults => _findings.Exists(f => f.Severity == Severity.Fault);

    private void ThrowIfFaulty()
    {
        if (HasFaults)
        {
            throw new InputException(_findings);
        }
    }

    private Finding Make(Severity severity, string what, string text, string fix, int line = 0) =>
        new(severity, what, text, fix) { File = _table.Name, Line = line > 0 ? line : null };

    private void Fault(string what, string text, string fix, int line = 0) => _findings.Add(Make(Severity.Fault, what, text, fix, line));

    private void JudgeValues()
    {
        IReadOnlyList<BhRow> rows = _table.Rows;
        for (int i = 0; i < rows.Count; i++)
        {
            (double h, double b, int line) = rows[i];
            if (!double.IsFinite(h) || !double.IsFinite(b))
            {
                Fault("bh-not-a-number", Invariant($"Row {i + 1} is not a pair of finite numbers."), "Correct or remove the row.", line);
            }
            else if (h < 0 || b < 0)
            {
                Fault(
                    "bh-negative",
                    Invariant($"Row {i + 1} has H = {h:g6} A/m, B = {b:g6} T; both must be 0 or more."),
                    "Give the normal magnetisation curve from (0, 0) upwards, not a whole loop.",
                    line);
            }
        }

        if (HasFaults || rows.Count == 0)
        {
            return;
        }

        JudgeScale(rows);
    }

    private void JudgeScale(IReadOnlyList<BhRow> rows)
    {
        double highestB = rows.Max(r => r.FluxDensity);
        double highestH = rows.Max(r => r.FieldStrength);
        if (highestB <= ImplausibleFluxDensity)
        {
            return;
        }

        int line = rows.First(r => r.FluxDensity > ImplausibleFluxDensity).Line;
        if (highestH <= ImplausibleFluxDensity)
        {
            Fault(
                "bh-swapped",
                Invariant($"B reaches {highestB:g6} T while H reaches only {highestH:g6} A/m: the columns are swapped."),
                "Exchange the names of the H and B columns in the header.",
                line);
        }
        else
        {
            Fault(
                "bh-unit",
                Invariant($"B reaches {highestB:g6} T; magnetisation tables end below {ImplausibleFluxDensity:g3} T."),
                "State the unit of the column in the header (T, mT, G or kG).",
                line);
        }
    }

    private BhRow[] WithOrigin()
    {
        IReadOnlyList<BhRow> rows = _table.Rows;
        if (rows.Count > 0 && rows[0] is { FieldStrength: 0, FluxDensity: > 0 })
        {
            Fault(
                "bh-remanence",
                Invariant($"The first row has B = {rows[0].FluxDensity:g6} T at H = 0: a branch of a loop, not a magnetisation curve."),
                "Give the normal magnetisation curve, which starts at (0, 0).",
                rows[0].Line);
        }
        else if (rows.Count > 0 && (rows[0].FieldStrength != 0 || rows[0].FluxDensity != 0))
        {
            _findings.Add(Make(
                Severity.Note, "bh-origin-added", "The table does not start at (0, 0); the point was added.", "Nothing to do.", rows[0].Line));
            rows = [new BhRow(0, 0), .. rows];
        }

        if (rows.Count < 3)
        {
            Fault(
                "bh-too-few-rows",
                Invariant($"The table has {Math.Max(0, rows.Count - 1)} rows beyond (0, 0); at least 2 are needed."),
                "Give the whole curve, if possible into saturation.");
        }

        return [.. rows];
    }

    private void JudgeOrder()
    {
        for (int i = 1; i < Nodes.Length; i++)
        {
            BhRow a = Nodes[i - 1];
            BhRow b = Nodes[i];
            bool rises = b.FluxDensity > a.FluxDensity && (b.FieldStrength > a.FieldStrength || _options.Smooth);
            if (!rises)
            {
                string needed = _options.Smooth ? "B must rise from row to row" : "both must rise from row to row";
                Fault(
                    "bh-not-rising",
                    Invariant($"{Name(i)} (H = {b.FieldStrength:g6} A/m, B = {b.FluxDensity:g6} T) follows (H = {a.FieldStrength:g6} A/m, B = {a.FluxDensity:g6} T); {needed}."),
                    "Put the rows in rising order, drop repeated ones, or ask for smoothing if it is measuring noise in H.",
                    b.Line);
            }
        }
    }

    // Rows are counted as the writer of the table counts them: an added origin is not a row.
    private string Name(int node) => Invariant($"Row {node + 1 - (Nodes.Length - _table.Rows.Count)}");

    private static double Secant(BhRow a, BhRow b) => (b.FieldStrength - a.FieldStrength) / (b.FluxDensity - a.FluxDensity);

    private void DropSaturatedRows()
    {
        int count = Nodes.Length;
        while (count >= 3 && Secant(Nodes[count - 2], Nodes[count - 1]) * SaturatedSlope * Mu0 > 1)
        {
            count--;
        }

        int dropped = Nodes.Length - count;
        if (dropped == 0)
        {
            return;
        }

        if (count < 3)
        {
            Fault(
                "bh-below-vacuum",
                Invariant($"Nearly every row rises with a slope dB/dH below {SaturatedSlope:g2} times that of vacuum: the table shows no magnetic material."),
                "Check the units of the columns; for a non-magnetic part state a relative permeability instead.",
                Nodes[1].Line);
            return;
        }

        _findings.Add(Make(
            Severity.Note,
            "bh-rows-dropped",
            Invariant($"The last {dropped} rows (from H = {Nodes[count].FieldStrength:g6} A/m) were dropped: their slope dB/dH is below {SaturatedSlope:g2} times that of vacuum, within measuring error of saturation; the continuation to Js replaces them."),
            "Nothing to do.",
            Nodes[count].Line));
        Nodes = Nodes[..count];
    }

    private void Treat()
    {
        if (_options.Smooth)
        {
            (Nodes, int moved) = BhSmoothing.Unimodal(Nodes);
            if (moved > 0)
            {
                _findings.Add(Make(
                    Severity.Note, "bh-smoothed", Invariant($"{moved} rows were moved in H to smooth the slope, as asked."), "Compare the curve with the table."));
            }
        }

        if (_options.AnhystereticStart)
        {
            Nodes = BhSmoothing.AnhystereticStart(Nodes);
        }
    }

    private void JudgeSlopes()
    {
        for (int i = 1; i < Nodes.Length; i++)
        {
            BhRow a = Nodes[i - 1];
            BhRow b = Nodes[i];
            double secant = Secant(a, b);
            if (!(secant > 0 && secant < Nu0))
            {
                string fix = _options.Smooth ? "Check the units and the numbers." : "Check the units and the numbers, or ask for smoothing if it is measuring noise.";
                Fault(
                    "bh-below-vacuum",
                    Invariant($"Between H = {a.FieldStrength:g6} and {b.FieldStrength:g6} A/m the slope dB/dH is {1 / secant:g4} T·m/A; it must be above that of vacuum, {Mu0:g4} T·m/A."),
                    fix,
                    b.Line);
            }
        }
    }

    private void SettleSaturation(bool ordered)
    {
        double? stated = _options.SaturationPolarisation ?? _table.SaturationPolarisation;
        if (stated is { } js && !(js > 0 && js <= ImplausiblePolarisation))
        {
            Fault(
                "bh-saturation",
                Invariant($"The saturation polarisation is {js:g6} T; it must be above 0 and at most {ImplausiblePolarisation:g2} T."),
                "State Js in tesla (iron and low-carbon steel 2.13 to 2.16 T).");
            return;
        }

        if (!ordered || Nodes.Length < 3)
        {
            return;
        }

        BhRow last = Nodes[^1];
        SaturationPolarisation = stated ?? AssumedSaturation();
        BhRow[] above = [.. Nodes.Where(r => !(r.Polarisation < SaturationPolarisation))];
        if (above.Length > 0)
        {
            Fault(
                "bh-above-saturation",
                Invariant($"From H = {above[0].FieldStrength:g6} A/m on ({above.Length} rows) the polarisation J = B - mu0 H reaches {above.Max(r => r.Polarisation):g6} T; it must stay below the saturation polarisation, {SaturationPolarisation:g6} T."),
                "Check the units, the columns and Js; state a higher Js if the material has it.",
                above[0].Line);
        }

        if (last.FieldStrength < ShortTable)
        {
            _findings.Add(Make(
                Severity.Warning,
                "bh-short-table",
                Invariant($"The table ends at H = {last.FieldStrength:g6} A/m, B = {last.FluxDensity:g6} T; above that the curve is extrapolated to Js, within some tens of millitesla at best."),
                Invariant($"Use a table that reaches {ShortTable:g4} A/m or more if the iron works above {last.FluxDensity:g4} T."),
                last.Line));
        }
    }

    private double AssumedSaturation()
    {
        BhRow last = Nodes[^1];
        double rise = (1 / Secant(Nodes[^2], last)) - Mu0;
        double js = Math.Min(
            HighestPolarisation, Math.Max(last.Polarisation + (last.FieldStrength * rise), 1.02 * last.Polarisation));
        _findings.Add(Make(
            Severity.Warning,
            "bh-saturation-assumed",
            Invariant($"No saturation polarisation is stated; Js = {js:g4} T was assumed from the last rows."),
            "State it in the file as a line '# Js_T: 2.15' (iron and low-carbon steel 2.13 to 2.16 T)."));
        return js;
    }
}
