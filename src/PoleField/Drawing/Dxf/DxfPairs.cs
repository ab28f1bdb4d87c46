namespace PoleField.Drawing;

/// <summary>The pairs of group code and value of a drawing, one at a time.</summary>
internal abstract class DxfPairs(DxfReport report, DxfLimits limits)
{
    private long _count;

    /// <summary>Group code of the present pair.</summary>
    public int Code { get; protected set; }

    /// <summary>Line of the present group code, from 1; 0 in binary files.</summary>
    public int Line { get; protected set; }

    /// <summary>Decoder of texts.</summary>
    public DxfText Texts { get; } = new();

    /// <summary>Value of the present pair as text, without blanks around it.</summary>
    public abstract string Text { get; }

    /// <summary>Where the present pair is, for messages about files without lines.</summary>
    public abstract string Where { get; }

    /// <summary>Findings.</summary>
    protected DxfReport Report => report;

    /// <summary>Limits.</summary>
    protected DxfLimits Limits => limits;

    /// <summary>Moves to the next pair; false at the end of the file.</summary>
    /// <exception cref="InputException">A pair is damaged.</exception>
    public bool Next()
    {
        if (++_count > limits.Pairs)
        {
            throw report.Stop(
                "limit",
                FormattableString.Invariant($"The file holds more than {limits.Pairs} pairs of group code and value."),
                "Draw the magnet's cross-section in a file of its own.",
                new DxfPlace(Line));
        }

        return Move();
    }

    /// <summary>Value of the present pair as a finite number; false when it is none.</summary>
    public abstract bool TryReal(out double value);

    /// <summary>Value of the present pair as an integer; false when it is none.</summary>
    public abstract bool TryInteger(out long value);

    /// <summary>Moves to the next pair.</summary>
    protected abstract bool Move();

    /// <summary>The fault of a file that ends too early.</summary>
    public InputException Truncated(string what) => report.Stop(
        "truncated",
        $"The file ends{Where}, {what}: it is cut short.",
        "Export or copy the drawing again.",
        new DxfPlace(Line));
}
