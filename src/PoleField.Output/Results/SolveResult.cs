using PoleField.Beam;

namespace PoleField.Output.Results;

/// <summary>Seconds of wall-clock time a run spent.</summary>
/// <param name="Read">Reading case, sketch and materials.</param>
/// <param name="Mesh">Meshing.</param>
/// <param name="Solve">Assembling and solving.</param>
/// <param name="Evaluate">Beam values, error bars and reports.</param>
/// <param name="Total">The whole run.</param>
public sealed record RunSeconds(double Read, double Mesh, double Solve, double Evaluate, double Total);

/// <summary>One line of the case's requirements and what was found.</summary>
/// <param name="Name">Key of the case file: "gradient_min", "spread_max", ...</param>
/// <param name="Unit">Unit of both numbers; "1" for ratios.</param>
/// <param name="Wanted">Limit, in the unit.</param>
/// <param name="Found">Value found, in the unit; not a number when it could not be found, which is not met.</param>
/// <param name="Met">True when the value keeps the limit.</param>
public sealed record RequirementResult(string Name, string Unit, double Wanted, double Found, bool Met);

/// <summary>Something a person should look at.</summary>
/// <param name="Where">File, layer or place, in words; may be empty.</param>
/// <param name="Text">What was seen and what to do.</param>
public sealed record ResultWarning(string Where, string Text);

/// <summary>Everything the result file of <c>solve</c> says, in SI units.</summary>
public sealed record SolveResult
{
    /// <summary>Title of the case.</summary>
    public required string Title { get; init; }

    /// <summary>SHA-256 of the case file, 64 hexadecimal digits.</summary>
    public required string CaseSha256 { get; init; }

    /// <summary>SHA-256 of the sketch, 64 hexadecimal digits.</summary>
    public required string SketchSha256 { get; init; }

    /// <summary>Version of the program that solved.</summary>
    public required string ProgramVersion { get; init; }

    /// <summary>The answer: beam, aperture, parts, circuit.</summary>
    public required BeamReport Report { get; init; }

    /// <summary>How the answer was reached.</summary>
    public required SolveRecord Record { get; init; }

    /// <summary>Time spent.</summary>
    public required RunSeconds Seconds { get; init; }

    /// <summary>Largest memory held, megabytes (10⁶ bytes).</summary>
    public required double PeakMemoryMB { get; init; }

    /// <summary>The case's requirements, checked.</summary>
    public IReadOnlyList<RequirementResult> Requirements { get; init; } = [];

    /// <summary>Materials of the parts, each once.</summary>
    public IReadOnlyList<Materials.Material> Materials { get; init; } = [];

    /// <summary>Heat, pull, energy and stray field; null when it was not worked out.</summary>
    public OperationReport? Operation { get; init; }

    /// <summary>What the numbers cannot know and what to mind around the magnet.</summary>
    public IReadOnlyList<string> Cautions { get; init; } = [];

    /// <summary>Doubts of this run.</summary>
    public IReadOnlyList<ResultWarning> Warnings { get; init; } = [];
}
