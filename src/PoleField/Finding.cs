using PoleField.Geometry;

namespace PoleField;

/// <summary>How much a finding weighs.</summary>
public enum Severity
{
    /// <summary>Done or seen, and worth telling (a healed joint, an ignored layer).</summary>
    Note,

    /// <summary>The run goes on, but a person should look.</summary>
    Warning,

    /// <summary>The input cannot be used.</summary>
    Fault,
}

/// <summary>Something that was found in an input: what, where, and what to do about it.</summary>
/// <param name="Severity">Weight.</param>
/// <param name="What">Short fixed name of the kind of finding, such as "open-outline"; never changes its meaning.</param>
/// <param name="Text">One sentence: what was found and what is allowed, with numbers and units.</param>
/// <param name="Fix">One sentence: what to do.</param>
public sealed record Finding(Severity Severity, string What, string Text, string Fix)
{
    /// <summary>Name of the file, when the finding is about one.</summary>
    public string? File { get; init; }

    /// <summary>Line in the file, from 1.</summary>
    public int? Line { get; init; }

    /// <summary>Column in the line, from 1.</summary>
    public int? Column { get; init; }

    /// <summary>Layer of the drawing.</summary>
    public string? Layer { get; init; }

    /// <summary>Handle of the drawing's entity (hexadecimal).</summary>
    public string? Handle { get; init; }

    /// <summary>Place in drawing units.</summary>
    public Point? AtDrawing { get; init; }

    /// <summary>Place in metres.</summary>
    public Point? At { get; init; }

    /// <summary>Size of the thing (a gap's width, an overlap's depth), metres.</summary>
    public double? Size { get; init; }
}

/// <summary>An input cannot be used. Carries every fault that was found, not only the first.</summary>
public sealed class InputException : Exception
{
    /// <summary>Made from one or more findings, at least one of them a fault.</summary>
    public InputException(IReadOnlyList<Finding> findings)
        : base(string.Join(Environment.NewLine, findings.Where(f => f.Severity == Severity.Fault).Select(f => f.Text + " " + f.Fix)))
    {
        Findings = findings;
    }

    /// <summary>All that was found, faults and the rest.</summary>
    public IReadOnlyList<Finding> Findings { get; }
}
