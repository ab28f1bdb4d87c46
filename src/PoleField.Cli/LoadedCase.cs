using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Drawing;
using PoleField.Magnetostatics;

namespace PoleField.Cli;

/// <summary>A case as far as it could be loaded, with everything that was found on the way.</summary>
internal sealed record LoadedCase
{
    /// <summary>Path as given on the command line.</summary>
    public required string Path { get; init; }

    public required IReadOnlyList<Finding> Findings { get; init; }

    /// <summary>Null when the case file has faults.</summary>
    public CaseFile? Case { get; init; }

    /// <summary>Null when the drawing could not be read.</summary>
    public Sketch? Sketch { get; init; }

    /// <summary>Null when there is no sketch, or faults of the case leave open what its layers are.</summary>
    public SectionReading? Reading { get; init; }

    /// <summary>Roles of the parts in the order of the case; empty when the case has faults.</summary>
    public IReadOnlyList<PartRole> Roles { get; init; } = [];

    /// <summary>SHA-256 of the case file, lower-case hexadecimal.</summary>
    public string CaseSha256 { get; init; } = string.Empty;

    /// <summary>SHA-256 of the drawing; empty when it could not be read.</summary>
    public string SketchSha256 { get; init; } = string.Empty;

    /// <summary>Case, sketch and curves that were read.</summary>
    public IReadOnlyList<InputFile> Inputs { get; init; } = [];

    /// <summary>Time it took to load, s.</summary>
    public double Seconds { get; init; }

    public bool HasFaults => Findings.Any(f => f.Severity == Severity.Fault);

    /// <summary>Name of the drawing unit, empty without a drawing.</summary>
    public string DrawingUnit => Sketch?.Unit.Name ?? string.Empty;

    /// <summary>Everything a solve needs.</summary>
    /// <exception cref="InputException">The case has faults.</exception>
    public (CaseFile Case, Magnet Magnet, Aperture Aperture) Ready()
    {
        if (HasFaults || Case is null || Reading?.Section is not { } section)
        {
            throw new InputException(Findings);
        }

        // The section may list its parts in another order than the case, and leave out layers that hold nothing.
        var byLayer = Roles.ToDictionary(r => r.Layer, StringComparer.OrdinalIgnoreCase);
        var magnet = new Magnet
        {
            Section = section,
            Roles = [.. section.Parts.Select(p => byLayer[p])],
            AppliedField = Case.Surroundings.AppliedField,
        };
        Aperture aperture = Case.Beam switch
        {
            BeamRectangle r => Aperture.Rectangle(r.Centre, r.Width, r.Height),
            _ => new Aperture(Reading.Beam ?? throw new InvalidOperationException("A sound section of a case with a beam layer has the beam's outline.")),
        };
        return (Case, magnet, aperture);
    }
}

/// <summary>A file that was read.</summary>
/// <param name="Name">Path as the case gives it.</param>
/// <param name="Sha256">SHA-256 of its bytes, lower-case hexadecimal.</param>
internal sealed record InputFile(string Name, string Sha256);
