using System.Globalization;
using System.Text;
using static System.FormattableString;

namespace PoleField.Materials;

/// <summary>
/// Reads a magnetisation curve from text: a header row naming the columns with their units (<c>H_A_per_m,B_T</c>; also Oe, kA/m,
/// mT, G and the like, or J in place of B), then one pair per row, separated by commas, semicolons or tabs. Lines that start with
/// <c>#</c> are comments; <c># Js_T: 2.15</c> states the saturation polarisation, <c># material:</c>, <c># source:</c>,
/// <c># state:</c> and <c># caution:</c> are shown to the user. Numbers have a decimal point.
/// </summary>
public sealed class MaterialFile
{
    // A magnetisation table has tens of rows, a recorded loop a few thousand; what is longer is another kind of file.
    private const int MostLines = 20_000;

    private readonly string _name;
    private readonly List<Finding> _faults = [];
    private readonly Dictionary<string, (string Text, int Line)> _notes = new(StringComparer.OrdinalIgnoreCase);
    private readonly List<BhRow> _rows = [];
    private char _separator;
    private BhColumn?[] _columns = [];

    private MaterialFile(string name)
    {
        _name = name;
    }

    /// <summary>Reads a material.</summary>
    /// <param name="stream">UTF-8 text.</param>
    /// <param name="name">File name for messages; without its extension it is the material's name.</param>
    /// <param name="options">What may be done to the table; null takes it as it is.</param>
    /// <exception cref="InputException">The text cannot be read, or the table is no magnetisation curve; carries every fault with its line.</exception>
    public static Material Read(Stream stream, string name, BhCurveOptions? options = null)
    {
        MaterialFile file = new(name);
        file.ReadLines(stream);
        double? js = file.StatedSaturation();
        if (file._faults.Count > 0)
        {
            throw new InputException(file._faults);
        }

        BhCurve curve = BhCurve.FromTable(new BhTable(name, file._rows, js), options);
        string title = Path.GetFileNameWithoutExtension(name);
        return new Material(
            title,
            curve,
            file.Note("material") ?? title,
            file.Note("source") ?? "user's file " + name,
            file.Note("state") ?? "user's table")
        {
            Caution = file.Note("caution"),
        };
    }

    private void Fault(string what, string text, string fix, (int Line, int Column) at) =>
        _faults.Add(new Finding(Severity.Fault, what, text, fix) { File = _name, Line = at.Line, Column = at.Column });

    private string? Note(string key) => _notes.TryGetValue(key, out (string Text, int Line) note) ? note.Text : null;

    private void ReadLines(Stream stream)
    {
        using StreamReader reader = new(stream, Encoding.UTF8, detectEncodingFromByteOrderMarks: true, leaveOpen: true);
        int number = 0;
        while (reader.ReadLine() is { } line)
        {
            if (++number > MostLines)
            {
                Fault("bh-too-long", Invariant($"The file has more than {MostLines} lines."), "Give the magnetisation curve alone, as tens of rows.", (number, 1));
                return;
            }

            if (line.AsSpan().TrimStart().StartsWith("#", StringComparison.Ordinal))
            {
                TakeComment(line, number);
            }
            else if (!string.IsNullOrWhiteSpace(line))
            {
                if (_columns.Length == 0)
                {
                    if (!TakeHeader(line, number))
                    {
                        return;
                    }
                }
                else
                {
                    TakeRow(line, number);
                }
            }
        }

        if (_columns.Length == 0)
        {
            Fault("bh-columns", "The file holds no header row and no table.", "Start with a header such as 'H_A_per_m,B_T', then one pair per line.", (Math.Max(1, number), 1));
        }
    }

    private void TakeComment(string line, int number)
    {
        string text = line.TrimStart().TrimStart('#');
        int colon = text.IndexOf(':', StringComparison.Ordinal);
        if (colon > 0)
        {
            _notes.TryAdd(text[..colon].Trim(), (text[(colon + 1)..].Trim(), number));
        }
    }

    // Js_T: a number, then anything in words.
    private double? StatedSaturation()
    {
        if (!_notes.TryGetValue("Js_T", out (string Text, int Line) note))
        {
            return null;
        }

        string number = note.Text.Split(' ', '(', '\t')[0];
        if (TryNumber(number, out double js))
        {
            return js;
        }

        Fault("bh-saturation", $"The saturation polarisation '{note.Text}' is not a number in tesla.", "Write it like '# Js_T: 2.15'.", (note.Line, 1));
        return null;
    }

    private bool TakeHeader(string line, int number)
    {
        _separator = line.Contains('\t', StringComparison.Ordinal) ? '\t' : line.Contains(';', StringComparison.Ordinal) ? ';' : ',';
        (string Text, int Column)[] fields = Fields(line);
        _columns = new BhColumn?[fields.Length];
        for (int i = 0; i < fields.Length; i++)
        {
            char? quantity = BhColumn.TryParse(fields[i].Text, out _columns[i]);
            if (quantity is { } q && _columns[i] is null)
            {
                Fault(
                    "bh-unit",
                    $"The column '{fields[i].Text}' states no known unit; {q} may be in {BhColumn.UnitsOf(q)}.",
                    q == 'H' ? "Write it like 'H_A_per_m' or 'H (Oe)'." : $"Write it like '{q}_T' or '{q} (kG)'.",
                    (number, fields[i].Column));
            }
        }

        if (_faults.Count > 0)
        {
            return false;
        }

        int field = _columns.Count(c => c is { Quantity: 'H' });
        int flux = _columns.Count(c => c is { Quantity: 'B' or 'J' });
        if (field != 1 || flux != 1)
        {
            string found = fields.All(f => TryNumber(f.Text, out _)) ? "numbers" : $"'{line.Trim()}'";
            Fault(
                "bh-columns",
                $"The header must name one H column and one B (or J) column with their units; found {found}.",
                "Start the table with a header such as 'H_A_per_m,B_T'.",
                (number, 1));
        }

        return _faults.Count == 0;
    }

    private void TakeRow(string line, int number)
    {
        (string Text, int Column)[] fields = Fields(line);
        if (fields.Length != _columns.Length)
        {
            bool decimalCommas = _separator == ',' && fields.Length == 2 * _columns.Length;
            Fault(
                decimalCommas ? "bh-decimal-comma" : "bh-columns",
                Invariant($"The row has {fields.Length} fields; the header has {_columns.Length}."),
                decimalCommas ? "Write decimal points instead of decimal commas." : "Give one number per column.",
                (number, 1));
            return;
        }

        double h = double.NaN;
        double b = double.NaN;
        bool isPolarisation = false;
        for (int i = 0; i < fields.Length; i++)
        {
            if (_columns[i] is { } column && ReadNumber(fields[i], number) is { } value)
            {
                isPolarisation |= column.Quantity == 'J';
                (h, b) = column.Quantity == 'H' ? (value * column.Factor, b) : (h, value * column.Factor);
            }
        }

        if (double.IsFinite(h) && double.IsFinite(b))
        {
            _rows.Add(new BhRow(h, isPolarisation ? b + (PhysicalConstants.Mu0 * h) : b, number));
        }
    }

    private double? ReadNumber((string Text, int Column) field, int line)
    {
        if (TryNumber(field.Text, out double value))
        {
            return value;
        }

        bool comma = TryNumber(field.Text.Replace(',', '.'), out _);
        Fault(
            comma ? "bh-decimal-comma" : "bh-not-a-number",
            $"'{field.Text}' is not a number" + (comma ? " with a decimal point." : "."),
            comma ? "Write decimal points instead of decimal commas." : "Give a plain number such as 1.25 or 2.4e3, without a unit.",
            (line, field.Column));
        return null;
    }

    private static bool TryNumber(string text, out double value) =>
        double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out value) && double.IsFinite(value);

    private (string Text, int Column)[] Fields(string line)
    {
        string[] parts = line.Split(_separator);
        (string, int)[] fields = new (string, int)[parts.Length];
        int at = 0;
        for (int i = 0; i < parts.Length; i++)
        {
            int lead = parts[i].Length - parts[i].TrimStart().Length;
            fields[i] = (parts[i].Trim().Trim('"').Trim(), at + lead + 1);
            at += parts[i].Length + 1;
        }

        return fields;
    }
}
