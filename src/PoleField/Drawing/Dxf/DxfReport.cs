using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Where in a drawing something was found.</summary>
internal readonly record struct DxfPlace(int Line, string? Layer = null, string? Handle = null, Point? At = null);

/// <summary>Gathers findings while a drawing is read; throws them when reading cannot go on.</summary>
internal sealed class DxfReport(string file, int mostFaults)
{
    private readonly List<Finding> _findings = [];
    private int _faults;

    /// <summary>All findings so far.</summary>
    public IReadOnlyList<Finding> Findings => _findings;

    /// <summary>Something worth telling.</summary>
    public void Note(string what, string text, string fix, DxfPlace place = default) =>
        _findings.Add(Make(Severity.Note, what, text, fix, place));

    /// <summary>Something a person should look at.</summary>
    public void Warn(string what, string text, string fix, DxfPlace place = default) =>
        _findings.Add(Make(Severity.Warning, what, text, fix, place));

    /// <summary>A fault; reading goes on to find others, up to the limit.</summary>
    /// <exception cref="InputException">The limit of faults is reached.</exception>
    public void Fault(string what, string text, string fix, DxfPlace place = default)
    {
        _findings.Add(Make(Severity.Fault, what, text, fix, place));
        if (++_faults >= mostFaults)
        {
            throw new InputException(
                [.. _findings, Make(Severity.Note, "more-faults", $"Reading stopped after {_faults} faults.", "Mend these first.", default)]);
        }
    }

    /// <summary>A fault after which nothing more can be read.</summary>
    public InputException Stop(string what, string text, string fix, DxfPlace place = default) =>
        new([.. _findings, Make(Severity.Fault, what, text, fix, place)]);

    /// <summary>Throws if there were faults.</summary>
    /// <exception cref="InputException">There were faults.</exception>
    public void ThrowIfFaulty()
    {
        if (_faults > 0)
        {
            throw new InputException(_findings);
        }
    }

    /// <summary>A text as it may appear in a message: printable and at most 60 characters.</summary>
    public static string Shown(string text)
    {
        const int most = 60;
        string printable = string.Concat(text.Take(most).Select(c => char.IsControl(c) || char.IsSurrogate(c) ? '?' : c));
        return text.Length > most ? printable + "..." : printable;
    }

    private Finding Make(Severity severity, string what, string text, string fix, DxfPlace place) =>
        new(severity, what, text, fix)
        {
            File = file,
            Line = place.Line > 0 ? place.Line : null,
            Layer = place.Layer,
            Handle = place.Handle,
            AtDrawing = place.At,
        };
}
